import { randomUUID } from 'node:crypto';
import { isStaff } from '#shared/access/permissions.ts';
import type { PersonActor } from '../../db/actor.ts';
import type { Tx } from '../../db/with-tx.ts';
import { notify } from '../../notifications/service.ts';

type Change =
  | 'passkey-added'
  | 'passkey-removed'
  | 'authenticator-added'
  | 'authenticator-removed'
  | 'recovery-codes'
  | 'password'
  | 'email-asked'
  | 'email';

/** Tells the owner of an account that a way into it changed, in case it was not they who did it. */
export const tellSignInChanged = async (
  tx: Tx,
  actor: PersonActor,
  change: Change,
  now: Date,
): Promise<void> => {
  await notify(
    tx,
    actor.clinicId,
    [actor.personId],
    {
      kind: 'sign-in-changed',
      occasion: `sign-in-changed:${change}:${randomUUID()}`,
      path: isStaff(actor.roles) ? '/clinic/account/sign-in' : '/account/sign-in',
    },
    now,
  );
};
