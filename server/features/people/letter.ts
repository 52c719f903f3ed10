import { and, eq } from 'drizzle-orm';
import QRCode from 'qrcode';
import { may } from '#shared/access/permissions.ts';
import type { InvitationLetter } from '#shared/people/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { invitations } from '../../db/schema/invitations.ts';
import { patients } from '../../db/schema/patients.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { linkTokenOf, shortCodeOf } from '../accounts/one-time-tokens.ts';
import { writeAudit } from '../audit/service.ts';
import { clinicOf } from '../clinic/queries.ts';
import { usedTokensAmong } from './gate.ts';
import { invitationStateAt } from './inviting.ts';

/** Of this clinic; one for staff is there for its administrators alone. */
const letterVisibleTo = async (tx: Tx, actor: PersonActor, invitationId: string) => {
  const { clinicId } = actor;
  const [found] = await tx
    .select({ invitation: invitations, name: people.name, patientId: patients.id })
    .from(invitations)
    .innerJoin(people, and(eq(people.clinicId, clinicId), eq(people.id, invitations.personId)))
    .leftJoin(patients, and(eq(patients.clinicId, clinicId), eq(patients.personId, invitations.personId)))
    .where(and(eq(invitations.clinicId, clinicId), eq(invitations.id, invitationId)));
  if (!found || (found.invitation.kind === 'staff' && !may(actor.roles, 'person:manage'))) {
    throw new Problem('not-found');
  }
  return found;
};

const pictureOf = async (link: string): Promise<string> => {
  const svg = await QRCode.toString(link, { type: 'svg', errorCorrectionLevel: 'M', margin: 4 });
  return `data:image/svg+xml;base64,${Buffer.from(svg).toString('base64')}`;
};

/** The secret is made anew each time from the id; nothing of the letter is kept. */
export const openLetter = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  invitationId: string,
  now: Date,
): Promise<InvitationLetter> => {
  const { invitation, name, patientId } = await letterVisibleTo(tx, actor, invitationId);
  const isUsed = (await usedTokensAmong(site.gate, [invitation.id])).size > 0;
  if (isUsed || invitationStateAt(invitation, now) !== 'open') {
    throw new Problem('state-conflict', 'This invitation can no longer be used. Make a new one.');
  }
  const { name: clinicName, phone, emergencyNumber } = await clinicOf(tx, actor.clinicId);
  const link = `${site.publicUrl}/invitation#${linkTokenOf(site.tokenSecret, invitation.id)}`;
  await writeAudit(
    tx,
    actor,
    {
      action: 'invitation.letter-opened',
      subjectId: invitation.id,
      ...(patientId !== null && invitation.kind === 'patient' ? { patientId } : {}),
    },
    now,
  );
  return {
    name,
    clinic: { name: clinicName, phone, emergencyNumber },
    startAddress: `${site.publicUrl}/start`,
    code: shortCodeOf(site.tokenSecret, invitation.id),
    picture: await pictureOf(link),
    link,
    expiresAt: invitation.expiresAt.toISOString(),
  };
};
