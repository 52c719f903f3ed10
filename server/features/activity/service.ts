import type { ActivityLine } from '#shared/caregivers/contract.ts';
import { coveringReason } from '#shared/caregivers/activity-codes.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Tx } from '../../db/with-tx.ts';
import { auditOpening } from '../audit/service.ts';
import { ownRecord } from '../caregivers/limits.ts';
import { reasonHoldsMs } from '../patients/door.ts';
import { entriesOf, reasonsOf, relationsOf, type Entry } from './queries.ts';
import { shownActions } from './words.ts';

const pageSize = 50;

type Known = Awaited<ReturnType<typeof relationsOf>> & {
  patientPersonId: string;
  reasons: Awaited<ReturnType<typeof reasonsOf>>;
};

const actedAs = ({ personId, action }: Entry, known: Known): ActivityLine['as'] => {
  if (personId === null) return 'system';
  if (personId === known.patientPersonId) return 'you';
  const cares = known.relationships.has(personId);
  // A therapist may care for her father: what only the patient's side does, she did as his daughter.
  if (cares && (shownActions[action]?.side === 'patient' || !known.staff.has(personId))) return 'caregiver';
  return known.team.has(personId) ? 'care-team' : 'clinic';
};

const whoIs = ({ personId, name, credential }: Entry, as: ActivityLine['as'], known: Known): string => {
  if (personId === null || name === null) return 'Espalier';
  const title = as === 'caregiver' ? known.relationships.get(personId) : credential;
  return as === 'you' || !title ? name : `${name}, ${title}`;
};

/** Why somebody outside the care team was there: in their own words, or that they covered for it. */
const reasonFor = (entry: Entry, as: ActivityLine['as'], { reasons }: Known): string | null => {
  const given =
    entry.action === 'chart.opened-outside-team'
      ? reasons.find(({ id }) => id === entry.subjectId)
      : reasons.findLast(
          ({ personId, at }) =>
            personId === entry.personId &&
            at <= entry.at &&
            entry.at.getTime() - at.getTime() < reasonHoldsMs,
        );
  if (entry.action === 'chart.opened-outside-team') return given?.reason ?? null;
  if (as !== 'clinic') return null;
  if (entry.action === 'patient.opened') return given?.reason ?? null;
  return shownActions[entry.action]?.covers ? coveringReason : null;
};

const toLines = (entries: readonly Entry[], known: Known): ActivityLine[] =>
  entries.flatMap((entry) => {
    const what = shownActions[entry.action]?.code;
    if (!what) return [];
    const as = actedAs(entry, known);
    return [
      {
        id: entry.id,
        at: entry.at.toISOString(),
        who: whoIs(entry, as, known),
        as,
        what,
        reason: reasonFor(entry, as, known),
      },
    ];
  });

/** Who opened or changed the patient's own record, newest first. */
export const activityFor = async (
  tx: Tx,
  actor: PersonActor,
  { before, others }: { before?: string | undefined; others: 'true' | 'false' },
  now: Date,
): Promise<{ lines: ActivityLine[]; more: boolean }> => {
  const patientId = ownRecord(actor);
  const { clinicId, personId } = actor;
  const { entries, more } = await entriesOf(
    tx,
    {
      clinicId,
      patientId,
      without: others === 'true' ? personId : null,
      before: before === undefined ? null : new Date(before),
    },
    pageSize,
  );
  const known: Known = {
    ...(await relationsOf(tx, clinicId, patientId)),
    patientPersonId: personId,
    reasons: await reasonsOf(tx, clinicId, patientId),
  };
  await auditOpening(tx, actor, { action: 'activity.listed', subjectId: patientId, patientId }, now);
  return { lines: toLines(entries, known), more };
};
