import type { PatientRecord } from '#shared/patients/contract.ts';
import { movesFrom } from '#shared/patients/states.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { auditOpening } from '../audit/service.ts';
import { cardsForClinic } from '../caregivers/cards.ts';
import { invitationCardsOf } from '../people/inviting.ts';
import { chartOf } from '../plans/queries.ts';
import { nameOf } from '../triage/queries.ts';
import { chartVisibleTo } from './door.ts';
import { toLine } from './list.ts';
import { changesOf, countOpenFlags, lineOf, teamOf } from './queries.ts';
import { revisionOf, storedFields } from './stored.ts';

/** The record as the clinic's screens show it. The caller's door has decided that it may be read. */
export const recordOf = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  patientId: string,
  now: Date,
): Promise<PatientRecord> => {
  const { clinicId } = actor;
  const row = await lineOf(tx, actor, patientId);
  const chart = await chartOf(tx, clinicId, patientId);
  const { consentOn, consentHow, consentBy } = chart.patient;
  const cards = await invitationCardsOf(tx, site, clinicId, [row.personId], now);
  const team = await teamOf(tx, clinicId, patientId);
  const stored = storedFields(chart, row.email, team);
  const line = toLine(row, cards.get(row.personId) ?? null, now);
  return {
    ...line,
    ...stored,
    careTeam: team,
    revision: revisionOf(stored),
    consent:
      consentOn && consentHow
        ? {
            on: consentOn,
            how: consentHow,
            recordedBy: consentBy ? await nameOf(tx, clinicId, consentBy) : null,
          }
        : null,
    changes: (await changesOf(tx, clinicId, patientId)).map((change) => ({
      ...change,
      at: change.at.toISOString(),
    })),
    moves: movesFrom(line.state),
    caregivers: await cardsForClinic(tx, site, clinicId, patientId, now),
    openFlags: await countOpenFlags(tx, clinicId, patientId),
  };
};

/** Opens a patient's record. It is on record, and the patient sees it. */
export const openRecord = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  patientId: string,
  now: Date,
): Promise<PatientRecord> => {
  await chartVisibleTo(tx, actor, patientId, now);
  await auditOpening(tx, actor, { action: 'patient.opened', subjectId: patientId, patientId }, now);
  return recordOf(tx, site, actor, patientId, now);
};
