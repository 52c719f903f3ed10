import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { notificationChannels, notificationKinds } from '#shared/notifications/kinds.ts';
import { openEmail } from '#server/notifications/email.ts';
import { openPush } from '#server/notifications/push.ts';
import { createSender } from '#server/notifications/sender.ts';
import { openSms } from '#server/notifications/sms.ts';
import { openTelephone } from '#server/notifications/telephone.ts';
import { makeClinic, makePatient, type TestPatient } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { testSecrets, testVapidPrivateKey } from '#tests/support/secrets.ts';
import { fakeAccount, startFakes, type RunningFakes } from '../server/fakes/running.ts';
import { change, tell } from '../server/notifications/outgoing.ts';

/** Words that stand nowhere else, in every field of a patient's record. */
const canaries = ['Zebedee', 'Quillfeather', 'gooseberry', 'bartleby', 'quinoxaline', 'tamarind', 'wormwood'];
const publicUrl = 'https://espalier.example';

let database: TestDatabase;
let fakes: RunningFakes;
/** Two patients; what each was sent, by kind and channel. */
const arrived: Map<string, string>[] = [];

/** Everything that differs by who it goes to: ids, secrets of links, addresses and numbers. */
const withoutIds = (text: string): string =>
  text
    .replace(/[0-9a-f-]{36}\.[\w-]{43}/g, 'secret')
    .replace(/[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}/g, 'id')
    .replace(/\+1518555\d{4}/g, 'number')
    .replace(/"topic":"[\w-]+"|"at":"[^"]+"|"sid":"\w+"|(CA|SM)[0-9a-f]{32}/g, 'gateway');

const issueToken = async ({ clinicId, personId }: TestPatient, kind: string): Promise<string> => {
  const { rows } = await database.asSuperuser.query<{ id: string }>(
    `insert into one_time_tokens (clinic_id, person_id, kind, created_at, expires_at)
     values ($1, $2, $3, now(), now() + interval '1 hour') returning id`,
    [clinicId, personId, kind],
  );
  return rows[0]!.id;
};

const everything = async () =>
  (await Promise.all((['mail', 'push', 'call', 'sms'] as const).map((kind) => fakes.sent(kind)))).flat();

/** Tells somebody of every kind on every channel, and waits until the fakes have it all. */
const tellAll = async (patient: TestPatient): Promise<Map<string, string>> => {
  const { endpoint, p256dh, auth } = await fakes.addDevice();
  await database.asSuperuser.query(
    `insert into push_subscriptions (clinic_id, person_id, session_id, endpoint, p256dh, auth, device_name, created_at)
     values ($1, $2, gen_random_uuid(), $3, $4, $5, 'Firefox', now())`,
    [patient.clinicId, patient.personId, endpoint, p256dh, auth],
  );
  const gateway = { ...fakeAccount, from: '+15185550100', apiUrl: fakes.url };
  const channels = {
    email: openEmail({ smtpUrl: fakes.smtpUrl, from: 'Espalier <no-reply@espalier.example>', publicUrl }),
    push: openPush({
      vapid: {
        publicKey: testSecrets.vapidPublicKey,
        privateKey: testVapidPrivateKey,
        subject: 'mailto:no-reply@espalier.example',
      },
      fakeUrl: fakes.url,
    }),
    sms: openSms({ gateway, publicUrl }),
    phone: openTelephone({ gateway, publicUrl }),
  };
  const sender = createSender(
    { pools: database.pools, channels, tokenSecret: testSecrets.tokenSecret },
    { clock: () => new Date(), log: silentLog },
  );
  const byKind = new Map<string, string>();
  const today = new Intl.DateTimeFormat('en-CA', { timeZone: 'America/New_York' }).format(new Date());
  for (const kind of notificationKinds) {
    for (const channel of notificationChannels) {
      const isLink = kind === 'invitation' || kind === 'password-reset' || kind === 'email-change';
      const path = isLink ? `/link#${await issueToken(patient, kind)}` : `/there/${randomUUID()}`;
      const occasion = kind === 'check-in-reminder' ? `reminder:${today}` : `made:${randomUUID()}`;
      const before = new Set((await everything()).map(({ id }) => id));
      await tell(database, patient, { kind, path, occasion }, new Date(), { channels: [channel] });
      sender.wake();
      await sender.idle();
      const news = (await everything()).filter(({ id }) => !before.has(id));
      expect(news, `${kind} by ${channel}`).toHaveLength(1);
      byKind.set(`${kind} by ${channel}`, JSON.stringify(news[0]));
    }
  }
  for (const channel of Object.values(channels)) channel.close();
  return byKind;
};

beforeAll(async () => {
  database = await cloneDatabase();
  fakes = await startFakes();
  const clinicId = await makeClinic(database);
  const full = await makePatient(database, clinicId, {
    name: 'Zebedee Quillfeather',
    patient: {
      address: '3 Gooseberry Row',
      emergencyContact: 'Bartleby',
      bloodThinner: 'quinoxaline',
      allergies: 'tamarind',
      mainMedicines: 'wormwood',
    },
  });
  const other = await makePatient(database, clinicId, { name: 'Ada Moreau' });
  for (const [patient, phone] of [
    [full, '+15185550123'],
    [other, '+15185550124'],
  ] as const) {
    await change(database, patient, { phone });
    arrived.push(await tellAll(patient));
  }
}, 120_000);

afterAll(async () => {
  await fakes.stop();
  await database.drop();
});

describe('every kind on every channel', () => {
  it('arrived, so that there was something to leak', () => {
    const count = notificationKinds.length * notificationChannels.length;
    expect(arrived.map(({ size }) => size)).toEqual([count, count]);
    // A push that only its maker's service could read would hide what it says.
    for (const [name, text] of arrived[0]!) {
      if (name.endsWith('by push')) expect(JSON.parse(text)).not.toMatchObject({ payload: null });
    }
    expect(fakes.errors).toEqual([]);
  });

  it('holds no word of the record', () => {
    const all = [...arrived[0]!.values()].join('\n').toLowerCase();
    for (const canary of canaries) expect(all).not.toContain(canary.toLowerCase());
  });

  it('says the same to everybody, but for ids, addresses and the link', () => {
    for (const [name, text] of arrived[0]!) {
      expect(withoutIds(text), name).toBe(withoutIds(arrived[1]!.get(name)!));
    }
  });
});
