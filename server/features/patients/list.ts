import type { PatientLine, patientFilters } from '#shared/patients/contract.ts';
import { consequences, neverStarted, stateOn } from '#shared/patients/states.ts';
import { dayPostOp, localDateIn } from '#shared/plans/calendar.ts';
import type { InvitationCard } from '#shared/people/contract.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { auditOpening } from '../audit/service.ts';
import { invitationCardsOf } from '../people/inviting.ts';
import { linesOf, type LineRow } from './queries.ts';

const isoOf = (text: string | null): string | null => (text === null ? null : new Date(text).toISOString());

type Line = PatientLine & { personId: string };

/** A row as it stands today, by the patient's own calendar. */
export const toLine = (row: LineRow, invitation: InvitationCard | null, now: Date): Line => {
  const today = localDateIn(row.timeZone, now);
  const state = stateOn(row.state, row.surgeryDate, today);
  return {
    id: row.id,
    personId: row.personId,
    name: row.name,
    chartNumber: row.chartNumber,
    state,
    stateSince: isoOf(row.stateSince),
    backOn: state === 'paused' ? row.backOn : null,
    day: dayPostOp(row.surgeryDate, today),
    leadName: row.leadName,
    mine: row.mine,
    invitation,
    firstSignedInAt: row.firstSignedInAt?.toISOString() ?? null,
    firstCheckInAt: isoOf(row.firstCheckInAt),
    emailBounced: row.emailBouncedAt !== null,
  };
};

const hasNotStarted = ({ state, day, firstCheckInAt }: PatientLine): boolean =>
  neverStarted(state, day, firstCheckInAt !== null);

type Filter = (typeof patientFilters)[number];

const fits: Record<Filter, (line: PatientLine) => boolean> = {
  all: () => true,
  mine: ({ mine }) => mine,
  'never-started': hasNotStarted,
  paused: ({ state }) => state === 'paused',
  // Ended ones among them: the clinic watches neither.
  discharged: ({ state }) => !consequences[state].watched,
};

/** The clinic's patients by name and state, and how many never started whatever is shown. */
export const patientsFor = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { filter }: { filter: Filter },
  now: Date,
): Promise<{ patients: PatientLine[]; neverStarted: number }> => {
  const lines = (await linesOf(tx, actor)).map((row) => toLine(row, null, now));
  const shown = lines.filter(fits[filter]);
  const cards = await invitationCardsOf(
    tx,
    site,
    actor.clinicId,
    shown.map(({ personId }) => personId),
    now,
  );
  const fact = { action: 'patients.listed', subjectId: actor.clinicId, detail: { filter } };
  await auditOpening(tx, actor, fact, now);
  return {
    patients: shown.map((line) => ({ ...line, invitation: cards.get(line.personId) ?? null })),
    neverStarted: lines.filter(hasNotStarted).length,
  };
};
