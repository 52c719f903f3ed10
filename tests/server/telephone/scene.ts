import { randomUUID } from 'node:crypto';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { NotificationChannel, NotificationKind } from '#shared/notifications/kinds.ts';
import { createApp } from '#server/app.ts';
import type { Channel } from '#server/notifications/channels.ts';
import { deliver } from '#server/notifications/delivery.ts';
import { openSms } from '#server/notifications/sms.ts';
import { openTelephone } from '#server/notifications/telephone.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import { fakeAccount, startFakes, type RunningFakes } from '../fakes/running.ts';

export const bounceToken = 'the-token-of-the-mail-server-that-reports-bounces';

type Row = {
  state: string;
  outcome: string | null;
  last_error: string | null;
  provider_id: string | null;
  acknowledged_at: Date | null;
  due_at: Date;
};

export type TelephoneScene = {
  database: TestDatabase;
  fakes: RunningFakes;
  /** Where the product answers, as the gateway knows it. */
  url: string;
  therapist: TestPerson;
  /** What the product takes for now. */
  now: { at: Date };
  channels: { phone: Channel; sms: Channel };
  plant: (over: {
    channel?: NotificationChannel;
    kind?: NotificationKind;
    createdAt?: Date;
  }) => Promise<string>;
  /** Sends what is due, as a worker does. */
  send: (id: string, phone?: Channel) => Promise<boolean>;
  row: (id: string) => Promise<Row>;
  stop: () => Promise<void>;
};

const noChannel: Channel = { send: () => Promise.reject(new Error('Not here.')), close: () => undefined };

/** A product with its hooks, the fake gateway beside it, and a therapist with a telephone. */
export const setTelephoneScene = async (): Promise<TelephoneScene> => {
  const database = await cloneDatabase();
  const fakes = await startFakes();
  const now = { at: new Date() };
  const server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const url = `http://localhost:${(server.address() as AddressInfo).port}`;
  const { app } = createApp({
    pools: database.pools,
    clock: () => now.at,
    log: silentLog,
    publicUrl: url,
    sessionSecret: 'test-session-secret-of-32-characters',
    ...testSecrets,
    buildId: 'test',
    outboxUrl: fakes.url,
    hookTokens: { telephone: fakeAccount.authToken, mailBounces: bounceToken },
    demoAuthenticators: [{ name: 'Noor Haddad', secret: 'GEZDGNBVGY3TQOJQGEZDGNBVGY3TQOJQ' }],
  });
  server.on('request', app);
  const clinicId = await makeClinic(database);
  const therapist = await makePerson(database, clinicId, ['therapist']);
  await database.asSuperuser.query('update people set phone = $1 where id = $2', [
    '+12025550111',
    therapist.personId,
  ]);
  const gateway = { ...fakeAccount, from: '+12025550100', apiUrl: fakes.url };
  const channels = {
    phone: openTelephone({ gateway, publicUrl: url }),
    sms: openSms({ gateway, publicUrl: url }),
  };
  const toolsWith = (phone: Channel) => ({
    pools: database.pools,
    channels: { ...channels, phone, email: noChannel, push: noChannel },
    tokenSecret: testSecrets.tokenSecret,
  });
  return {
    ...{ database, fakes, url, therapist, now, channels },
    plant: async ({ channel = 'phone', kind = 'new-emergency', createdAt = now.at }) => {
      const { rows } = await database.asSuperuser.query<{ id: string }>(
        `insert into notifications (clinic_id, person_id, channel, kind, occasion, path, created_at, due_at)
         values ($1, $2, $3, $4, $5, '/round', $6, $6) returning id`,
        [clinicId, therapist.personId, channel, kind, randomUUID(), createdAt],
      );
      return rows[0]!.id;
    },
    send: (id, phone = channels.phone) => deliver(toolsWith(phone), { clinicId, id }, () => now.at),
    row: async (id) => {
      const { rows } = await database.asSuperuser.query<Row>('select * from notifications where id = $1', [
        id,
      ]);
      return rows[0]!;
    },
    stop: async () => {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      await fakes.stop();
      await database.drop();
    },
  };
};
