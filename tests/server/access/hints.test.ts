import { randomUUID } from 'node:crypto';
import { io } from 'socket.io-client';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { hintEvent, type Hint } from '#shared/realtime/hints.ts';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import { withTx } from '#server/db/with-tx.ts';
import { announcePersonChange, hintChannel } from '#server/realtime/announce.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { plantGrant } from '../caregivers/grants.ts';
import { checkInBody } from '../check-ins/bodies.ts';
import { plantAlert, plantCheckIn, plantFlag, plantThread } from '../records.ts';

type Listener = Awaited<ReturnType<TestBrowser['socket']>> & { person: TestPerson };

let database: TestDatabase;
let web: TestWeb;
let patient: TestPatient;
let phone: TestBrowser;
let desk: TestBrowser;
const listeners = new Map<string, Listener>();

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  const [here, there] = [await makeClinic(database), await makeClinic(database)];
  const therapist = await makePerson(database, here, ['therapist']);
  patient = await makePatient(database, here, { lead: therapist });
  const caregiver = await makePerson(database, here, ['caregiver']);
  await plantGrant(database, patient, caregiver);
  const foreignTherapist = await makePerson(database, there, ['therapist']);
  const people: Record<string, TestPerson> = {
    'the patient': patient,
    'another patient': await makePatient(database, here, { lead: therapist }),
    "the patient's caregiver": caregiver,
    'caregiver of nobody': await makePerson(database, here, ['caregiver']),
    'therapist on the care team': therapist,
    'therapist not on it': await makePerson(database, here, ['therapist']),
    'on-call-clinician': await makePerson(database, here, ['on-call-clinician']),
    'clinical-lead': await makePerson(database, here, ['clinical-lead']),
    administrator: await makePerson(database, here, ['administrator']),
    billing: await makePerson(database, here, ['billing']),
    "other clinic's patient": await makePatient(database, there, { lead: foreignTherapist }),
    "other clinic's therapist": foreignTherapist,
    "other clinic's on-call-clinician": await makePerson(database, there, ['on-call-clinician']),
    "other clinic's clinical-lead": await makePerson(database, there, ['clinical-lead']),
    "other clinic's administrator": await makePerson(database, there, ['administrator']),
  };
  for (const [who, person] of Object.entries(people)) {
    const browser = await web.signIn(person);
    listeners.set(who, { ...(await browser.socket()), person });
    if (who === 'the patient') phone = browser;
    if (who === 'therapist on the care team') desk = browser;
  }
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

/** Hints arrive in the order announced: once a later one is there, every earlier one has arrived or never will. */
const everyEarlierHintIsIn = async (): Promise<void> => {
  const alertId = randomUUID();
  for (const { person } of listeners.values()) {
    await database.asSuperuser.query('select pg_notify($1, $2)', [
      hintChannel,
      JSON.stringify({ to: { person: person.personId }, hint: { topic: 'alert', alertId } }),
    ]);
  }
  const isMarker = (hint: Hint) => hint.topic === 'alert' && hint.alertId === alertId;
  await Promise.all([...listeners.values()].map((listener) => listener.nextHint(isMarker)));
  for (const { hints } of listeners.values()) hints.splice(hints.findIndex(isMarker), 1);
};

/** Who hears of which topics while something happens. */
const whoHears = async (happens: () => Promise<void>): Promise<Map<string, Hint[]>> => {
  await everyEarlierHintIsIn();
  for (const { hints } of listeners.values()) hints.length = 0;
  await happens();
  await everyEarlierHintIsIn();
  return new Map(
    [...listeners].filter(([, { hints }]) => hints.length > 0).map(([who, { hints }]) => [who, [...hints]]),
  );
};

const flagOf = async (): Promise<string> => {
  const { flagId, checkInClientId } = await plantFlag(database, patient);
  await plantAlert(database, patient, { checkInClientId });
  return flagId;
};

/** Something that happens for each topic; a new topic without one does not compile. */
const occasions = {
  today: async () => {
    expect((await phone.call('post', '/api/check-ins', checkInBody())).status).toBe(201);
  },
  flags: async () => {
    await plantCheckIn(database, patient, { answers: { symptoms: ['fall'] }, evaluated: false });
    const later = new Date(Date.now() + 11_000);
    expect(await sweepUnevaluated(database.pools.app, later, silentLog)).toBeGreaterThan(0);
  },
  alert: async () => {
    expect((await desk.call('post', `/api/flags/${await flagOf()}/seen`)).status).toBe(204);
  },
  thread: async () => {
    const { threadId } = await plantThread(database, patient);
    const body = { id: randomUUID(), text: 'One more thing.' };
    expect((await phone.call('post', `/api/threads/${threadId}/messages`, body)).status).toBe(201);
  },
  session: async () => {
    const actor = { kind: 'system', clinicId: patient.clinicId } as const;
    await withTx(database.pools.app, actor, (tx) => announcePersonChange(tx, patient.personId));
  },
  everything: async () => {
    await database.asSuperuser.query(
      `select pg_terminate_backend(pid) from pg_stat_activity
       where application_name = 'espalier-hints' and datname = current_database()`,
    );
    const heard = [...listeners.values()].map(({ nextHint }) =>
      nextHint(({ topic }) => topic === 'everything'),
    );
    await Promise.all(heard);
  },
} satisfies Record<Hint['topic'], () => Promise<void>>;

const heardBy = new Map<Hint['topic'], Map<string, Hint[]>>();

describe('who hears which hints', () => {
  beforeAll(async () => {
    for (const [topic, happens] of Object.entries(occasions)) {
      heardBy.set(topic as Hint['topic'], await whoHears(happens));
    }
  });

  it('is the committed table, by topic and listener', async () => {
    const lines = [...heardBy].flatMap(([topic, heard]) => [
      `when something happens to ${topic}`,
      ...[...heard].map(
        ([who, hints]) =>
          `  ${who.padEnd(32)} ${[...new Set(hints.map((hint) => hint.topic))].sort().join(', ')}`,
      ),
      '',
    ]);
    await expect(lines.join('\n')).toMatchFileSnapshot('hints.snapshot.txt');
  });

  it.each(['today', 'flags', 'alert', 'thread'] as const)(
    'reaches nobody of another clinic when something happens to %s',
    (topic) => {
      const heard = heardBy.get(topic)!;
      expect(heard.size).toBeGreaterThan(0);
      expect([...heard.keys()].filter((who) => who.startsWith('other clinic'))).toEqual([]);
    },
  );

  it('holds ids and numbers only, whatever the topic', () => {
    const hints = [...heardBy.values()].flatMap((heard) => [...heard.values()].flat());
    const values = hints.flatMap((hint) =>
      Object.entries(hint).flatMap(([key, value]) => (key === 'topic' ? [] : [String(value)])),
    );
    expect(values.length).toBeGreaterThan(0);
    for (const value of values) {
      expect(value).toMatch(/^(\d+|[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12})$/);
    }
  });
});

describe('who may listen at all', () => {
  const connect = (headers: Record<string, string>) =>
    new Promise<string>((resolve) => {
      const socket = io(web.url, {
        extraHeaders: headers,
        transports: ['websocket'],
        reconnection: false,
        forceNew: true,
      });
      socket.on(hintEvent, () => resolve('a hint'));
      socket.on('connect', () => resolve('connected'));
      socket.on('connect_error', (error) => {
        socket.disconnect();
        resolve(error.message);
      });
    });

  it('lets nobody listen who is not signed in', async () => {
    expect(await connect({ origin: web.url })).toBe('not-signed-in');
    expect(await connect({ origin: web.url, cookie: 'espalier=s%3Ainvented.signature' })).toBe(
      'not-signed-in',
    );
  });

  it('lets no page of another origin listen with the cookie of somebody who is', async () => {
    const { cookie } = await web.signIn(patient);
    expect(await connect({ origin: 'http://elsewhere.example', cookie })).not.toBe('connected');
  });
});
