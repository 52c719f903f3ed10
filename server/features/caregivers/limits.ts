import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Tx } from '../../db/with-tx.ts';
import { clinicOf } from '../clinic/queries.ts';

/** The record that this request is about: the actor's own, or that of the patient they care for. */
export const actedRecord = ({ caring, patientId, roles }: PersonActor): string => {
  if (!patientId || (!caring && !roles.includes('patient'))) {
    throw new Problem('forbidden', 'Choose the person whom you look after first.');
  }
  return patientId;
};

/** What only the patient decides, such as whom to let in. Nobody does it for them. */
export const ownRecord = (actor: PersonActor): string => {
  if (actor.caring) throw new Problem('forbidden', 'Only the patient does this.');
  return actedRecord(actor);
};

/**
 * The record that somebody checks in for. Alerts are part of it. A caregiver whom the patient has not let check
 * in is told whom to call, since they may be looking at an emergency.
 */
export const checkInRecord = async (tx: Tx, actor: PersonActor): Promise<string> => {
  const patientId = actedRecord(actor);
  if (!actor.caring || actor.caring.mayCheckIn) return patientId;
  const { emergencyNumber, phone } = await clinicOf(tx, actor.clinicId);
  throw new Problem(
    'forbidden',
    `You may not check in for this person. In an emergency call ${emergencyNumber}; else call the clinic on ${phone}.`,
  );
};

/** The record whose threads somebody reads and writes on the patient's side; null where there is none for them. */
export const messageRecord = ({
  caring,
  patientId,
}: Pick<PersonActor, 'caring' | 'patientId'>): string | null =>
  caring && !caring.mayMessage ? null : patientId;
