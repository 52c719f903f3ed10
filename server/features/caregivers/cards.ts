import type { CaregiverCard, ClinicCaregiverCard } from '#shared/patients/contract.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { normaliseEmail } from '../accounts/service.ts';
import { invitationCardsOf } from '../people/inviting.ts';
import { grantsOf, type CaregiverRow } from './queries.ts';

type GrantWithNames = Awaited<ReturnType<typeof grantsOf>>[number];

const toCard = ({ grant, email, grantedBy, firstOpenedAt }: GrantWithNames): CaregiverCard => ({
  id: grant.id,
  name: grant.calledName,
  email: normaliseEmail(email),
  relationship: grant.relationship,
  mayCheckIn: grant.mayCheckIn,
  mayMessage: grant.mayMessage,
  until: grant.untilDate,
  grantedBy,
  byClinic: grant.consent !== null,
  consent: grant.consent,
  createdAt: grant.createdAt.toISOString(),
  endedAt: grant.endedAt?.toISOString() ?? null,
  firstOpenedAt: firstOpenedAt?.toISOString() ?? null,
});

/** Everybody who was let in, also those who no longer are, as the patient may know them. */
export const cardsForPatient = async (
  tx: Tx,
  clinicId: string,
  patientId: string,
): Promise<CaregiverCard[]> => (await grantsOf(tx, clinicId, patientId)).map(toCard);

/** The same people as the clinic knows them, with the invitations that their grants made. */
export const cardsForClinic = async (
  tx: Tx,
  site: Site,
  clinicId: string,
  patientId: string,
  now: Date,
): Promise<ClinicCaregiverCard[]> => {
  const rows = await grantsOf(tx, clinicId, patientId);
  const personIds = rows.map(({ grant }) => grant.personId);
  const invitations = await invitationCardsOf(tx, site, clinicId, personIds, now, 'caregiver');
  return rows.map((row) => {
    const card = toCard(row);
    const invitation = invitations.get(row.grant.personId);
    const isOfGrant = invitation !== undefined && invitation.createdAt >= card.createdAt;
    return { ...card, name: row.name, invitation: isOfGrant ? invitation : null };
  });
};

const pick = <Card extends { id: string }>(cards: readonly Card[], { id }: CaregiverRow): Card => {
  const card = cards.find((one) => one.id === id);
  if (!card) throw new Error('A grant that was just written is not there.');
  return card;
};

export const cardForPatient = async (tx: Tx, grant: CaregiverRow): Promise<CaregiverCard> =>
  pick(await cardsForPatient(tx, grant.clinicId, grant.patientId), grant);

export const cardForClinic = async (
  tx: Tx,
  site: Site,
  grant: CaregiverRow,
  now: Date,
): Promise<ClinicCaregiverCard> =>
  pick(await cardsForClinic(tx, site, grant.clinicId, grant.patientId, now), grant);
