import { randomUUID } from 'node:crypto';
import { withTx } from '#server/db/with-tx.ts';
import type { Channel } from '#server/notifications/channels.ts';
import type { DeliveryTools } from '#server/notifications/delivery.ts';
import { notify } from '#server/notifications/service.ts';
import type { TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';

/** Nobody here has a telephone or a device: whatever left by those would fail the test. */
const nowhere: Channel = {
  send: () => Promise.reject(new Error('Nobody is to be reached here.')),
  close: () => undefined,
};

export const toolsWith = ({ pools }: TestDatabase, email: Channel): DeliveryTools => ({
  pools,
  channels: { email, push: nowhere, sms: nowhere, phone: nowhere },
  tokenSecret: testSecrets.tokenSecret,
});

/** How many notifications and jobs are not done yet. */
export const waiting = async ({ asSuperuser }: TestDatabase): Promise<number> => {
  const { rows } = await asSuperuser.query<{ count: number }>(
    `select (select count(*) from notifications where state = 'pending')::int + (
       select count(*) from jobs.job where state::text in ('created', 'retry', 'active')
         and name in ('send-notification', 'evaluate-check-in'))::int as count`,
  );
  return rows[0]!.count;
};

/** As if it had been tried for a day: the next try is the last one. */
export const almostGivenUp = ({ asSuperuser }: TestDatabase, occasion: string) =>
  asSuperuser.query(
    `update notifications set attempts = 9, created_at = created_at - interval '1 day' where occasion = $1`,
    [occasion],
  );

export const rowOfOccasion = async ({ asSuperuser }: TestDatabase, occasion: string) => {
  const { rows } = await asSuperuser.query<Record<string, unknown>>(
    `select state, attempts, last_error, sent_at is not null as has_time, leased_until is not null as leased
     from notifications where occasion = $1`,
    [occasion],
  );
  return rows[0];
};

/** Connections on which a worker hears of new jobs. */
export const listeners = async ({ asSuperuser }: TestDatabase): Promise<number | null> => {
  const { rowCount } = await asSuperuser.query(
    `select from pg_stat_activity
     where datname = current_database() and application_name = 'espalier-jobs' and query like 'listen %'`,
  );
  return rowCount;
};

/** Tells somebody of a message; gives the occasion by which its row is found. */
export const tellOf = async (
  { pools }: TestDatabase,
  { clinicId, personId }: TestPerson,
): Promise<string> => {
  const occasion = `message:${randomUUID()}`;
  await withTx(pools.app, { kind: 'system', clinicId }, (tx) =>
    notify(tx, clinicId, [personId], { kind: 'new-message', occasion, path: '/messages/1' }, new Date()),
  );
  return occasion;
};

/** Nothing can be marked as sent until it is allowed again. A sequence remembers what its rollback undoes. */
export const refuseMarking = async ({ asSuperuser }: TestDatabase) => {
  await asSuperuser.query(
    `create sequence refusals;
     create function refuse_sent() returns trigger language plpgsql security definer as $$ begin
       if new.state = 'sent' then perform nextval('refusals'); raise 'cannot mark'; end if; return new; end $$;
     create trigger refuse_sent before update on notifications for each row execute function refuse_sent()`,
  );
  return {
    wasRefused: async (): Promise<boolean> => {
      const { rows } = await asSuperuser.query<{ is_called: boolean }>('select is_called from refusals');
      return rows[0]!.is_called;
    },
    allow: () => asSuperuser.query('drop trigger refuse_sent on notifications'),
  };
};
