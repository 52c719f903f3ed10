import { randomUUID } from 'node:crypto';
import type { NotificationChannel } from '#shared/notifications/kinds.ts';
import { withTx } from '#server/db/with-tx.ts';
import type { Channel, Outgoing, Sent } from '#server/notifications/channels.ts';
import type { DeliveryTools } from '#server/notifications/delivery.ts';
import { notify, type Occasion } from '#server/notifications/service.ts';
import type { TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';

export type World = {
  tools: DeliveryTools;
  /** What the outside took, in order. */
  taken: Outgoing[];
  /** How often it was asked. */
  tries: () => number;
  /** What the outside answers on a channel from now on. */
  answer: (channel: NotificationChannel, send: (outgoing: Outgoing) => Promise<Sent>) => void;
};

/** The outside world in the place of mail servers, push services and telephones. */
export const outsideWorld = (database: TestDatabase): World => {
  const taken: Outgoing[] = [];
  let tries = 0;
  const take = async (outgoing: Outgoing): Promise<Sent> => {
    taken.push(outgoing);
    return { providerId: null };
  };
  const answers: Record<NotificationChannel, (outgoing: Outgoing) => Promise<Sent>> = {
    push: take,
    email: take,
    sms: take,
    phone: take,
  };
  const channel = (name: NotificationChannel): Channel => ({
    send: (outgoing) => {
      tries += 1;
      return answers[name](outgoing);
    },
    close: () => undefined,
  });
  return {
    tools: {
      pools: database.pools,
      tokenSecret: testSecrets.tokenSecret,
      channels: {
        push: channel('push'),
        email: channel('email'),
        sms: channel('sms'),
        phone: channel('phone'),
      },
    },
    taken,
    tries: () => tries,
    answer: (name, send) => {
      answers[name] = send;
    },
  };
};

export const tell = (
  database: TestDatabase,
  { clinicId, personId }: TestPerson,
  occasion: Partial<Occasion> & Pick<Occasion, 'kind'>,
  now: Date,
  options?: Parameters<typeof notify>[5],
): Promise<string[]> =>
  withTx(database.pools.app, { kind: 'system', clinicId }, (tx) =>
    notify(
      tx,
      clinicId,
      [personId],
      { occasion: `made:${randomUUID()}`, path: '/here', ...occasion },
      now,
      options,
    ),
  );

export const addDevice = async (
  database: TestDatabase,
  { clinicId, personId }: TestPerson,
): Promise<string> => {
  const { rows } = await database.asSuperuser.query<{ id: string }>(
    `insert into push_subscriptions (clinic_id, person_id, session_id, endpoint, p256dh, auth, device_name, created_at)
     values ($1, $2, gen_random_uuid(), $3, 'key', 'secret', 'Firefox', now()) returning id`,
    [clinicId, personId, `https://push.example/${randomUUID()}`],
  );
  return rows[0]!.id;
};

export const change = async (
  database: TestDatabase,
  { personId }: TestPerson,
  columns: Record<string, unknown>,
): Promise<void> => {
  const names = Object.keys(columns);
  await database.asSuperuser.query(
    `update people set ${names.map((name, index) => `${name} = $${index + 2}`).join(', ')} where id = $1`,
    [personId, ...Object.values(columns)],
  );
};

type NotificationRow = {
  id: string;
  channel: NotificationChannel;
  kind: string;
  occasion: string;
  target: string;
  state: string;
  attempts: number;
  last_error: string | null;
  due_at: Date;
  sent_at: Date | null;
  outcome: string | null;
};

export const rowsOf = async (
  database: TestDatabase,
  { personId }: TestPerson,
): Promise<NotificationRow[]> => {
  const { rows } = await database.asSuperuser.query<NotificationRow>(
    'select * from notifications where person_id = $1 order by created_at, channel, target',
    [personId],
  );
  return rows;
};
