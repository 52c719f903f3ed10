import { and, eq } from 'drizzle-orm';
import { isStaff } from '#shared/access/permissions.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../db/actor.ts';
import { people } from '../db/schema/people.ts';
import type { Tx } from '../db/with-tx.ts';
import { writeAudit } from '../features/audit/service.ts';
import { notify } from './service.ts';

/** Sends a test to oneself. A telephone rings for a test once in five minutes, as for anything else. */
export const testOwnChannel = async (
  tx: Tx,
  actor: PersonActor,
  channel: 'email' | 'sms' | 'phone',
  now: Date,
): Promise<void> => {
  const { clinicId, personId } = actor;
  const rows = await tx
    .select({ phone: people.phone })
    .from(people)
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId)));
  if (channel !== 'email' && !rows[0]?.phone) {
    throw new Problem('invalid-input', undefined, {
      errors: [
        { field: 'channel', message: 'There is no telephone number of yours to try. Enter and save one.' },
      ],
    });
  }
  const written = await notify(
    tx,
    clinicId,
    [personId],
    {
      kind: 'test',
      occasion: `test:${now.getTime()}`,
      path: isStaff(actor.roles) ? '/clinic/account/notifications' : '/account/notifications',
    },
    now,
    { channels: [channel] },
  );
  if (written.length === 0 && channel !== 'email') {
    throw new Problem(
      'too-many-attempts',
      'A test went out less than five minutes ago. Please wait a little.',
      {
        retryAfter: 5 * 60,
      },
    );
  }
  await writeAudit(
    tx,
    actor,
    { action: 'notification.tested', subjectId: personId, detail: { channel } },
    now,
  );
};
