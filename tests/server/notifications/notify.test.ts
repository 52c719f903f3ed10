import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { notificationKinds } from '#shared/notifications/kinds.ts';
import { withTx } from '#server/db/with-tx.ts';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import { notify } from '#server/notifications/service.ts';
import { mailFor } from '#server/notifications/mail-page.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import { plantCheckIn, plantThread } from '../records.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  clinicId = await makeClinic(database);
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
});

const notified = async () => {
  const { rows } = await database.asSuperuser.query<{ id: string; person_id: string; kind: string }>(
    'select id, person_id, kind from notifications where clinic_id = $1 order by created_at',
    [clinicId],
  );
  return rows;
};
const jobsOf = async (ids: string[]) => {
  const { rows } = await database.asSuperuser.query<{ data: Record<string, unknown> }>(
    `select data from jobs.job where name = 'send-notification' and data ->> 'notificationId' = any($1)`,
    [ids],
  );
  return rows.map(({ data }) => data);
};

describe('a notification', () => {
  it('is one row and one job a person and occasion, however often it is reported', async () => {
    const callum = await makePerson(database, clinicId, ['therapist']);
    const occasion = { kind: 'new-flag', occasion: 'flag:1:urgent', path: '/round/1' } as const;
    const report = () =>
      withTx(database.pools.app, { kind: 'system', clinicId }, (tx) =>
        notify(tx, clinicId, [noor.personId, noor.personId, callum.personId], occasion, new Date()),
      );
    await Promise.all([report(), report(), report()]);
    await report();
    const rows = await notified();
    expect(rows.map(({ person_id }) => person_id).sort()).toEqual([noor.personId, callum.personId].sort());
    const jobs = await jobsOf(rows.map(({ id }) => id));
    expect(jobs).toHaveLength(2);
    for (const job of jobs) expect(Object.keys(job).sort()).toEqual(['clinicId', 'notificationId']);
  });

  it('is not there when what it tells of was not kept', async () => {
    const failing = withTx(database.pools.app, { kind: 'system', clinicId }, async (tx) => {
      const occasion = { kind: 'new-flag', occasion: 'flag:2:urgent', path: '/round/2' } as const;
      await notify(tx, clinicId, [noor.personId], occasion, new Date());
      throw new Error('rolled back');
    });
    await expect(failing).rejects.toThrow('rolled back');
    expect(await notified()).toEqual([]);
  });
});

describe('who is told', () => {
  it.each([
    ['same day', { symptoms: ['fall' as const] }, 'new-flag', ['lead']],
    ['urgent', { symptoms: ['changed-shape' as const] }, 'new-urgent', ['lead', 'onCall']],
    ['emergency', { danger: ['bleeding' as const] }, 'new-emergency', ['lead', 'onCall']],
  ])('of a flag for %s', async (_urgency, answers, kind, who) => {
    const onCall = await makePerson(database, clinicId, ['on-call-clinician']);
    await makePerson(database, clinicId, ['therapist']);
    await makePerson(database, clinicId, ['administrator']);
    const patient = await makePatient(database, clinicId, { lead: noor });
    await plantCheckIn(database, patient, { answers, evaluated: false });
    await sweepUnevaluated(database.pools.app, new Date(Date.now() + 11_000), silentLog);
    const people = { lead: noor.personId, onCall: onCall.personId } as const;
    const rows = await notified();
    expect(rows.map(({ person_id }) => person_id).sort()).toEqual(
      who.map((one) => people[one as keyof typeof people]).sort(),
    );
    expect(new Set(rows.map((row) => row.kind))).toEqual(new Set([kind]));
  });

  it.each([
    ['has no care team', false],
    ['has one that has left', true],
  ])('of a flag is every clinician where the patient %s and nobody is on call', async (_what, hadTeam) => {
    const gone = await makePerson(database, clinicId, ['therapist']);
    const clinicians = [noor, await makePerson(database, clinicId, ['clinical-lead'])];
    await makePerson(database, clinicId, ['administrator']);
    const patient = await makePatient(database, clinicId, hadTeam ? { lead: gone } : {});
    await database.asSuperuser.query('update people set active = false where id = $1', [gone.personId]);
    await plantCheckIn(database, patient, { answers: { danger: ['bleeding'] }, evaluated: false });
    await sweepUnevaluated(database.pools.app, new Date(Date.now() + 11_000), silentLog);
    expect((await notified()).map(({ person_id }) => person_id).sort()).toEqual(
      clinicians.map(({ personId }) => personId).sort(),
    );
  });

  it('of a message is the other side, and never the one who wrote it', async () => {
    const patient = await makePatient(database, clinicId, { lead: noor });
    const { threadId } = await plantThread(database, patient);
    const [phone, desk] = [await web.signIn(patient), await web.signIn(noor)];
    const post = (who: typeof phone) =>
      who.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'Hello.' });
    await post(phone);
    expect((await notified()).map(({ person_id }) => person_id)).toEqual([noor.personId]);
    await post(desk);
    expect((await notified()).map(({ person_id }) => person_id)).toEqual([noor.personId, patient.personId]);
  });
});

describe('the wording', () => {
  it.each(notificationKinds)('of %s is the same for everybody but for the link', (kind) => {
    const [one, other] = ['https://espalier.example/round/1', 'https://espalier.example/messages/2'];
    const [a, b] = [mailFor(kind, one), mailFor(kind, other)];
    expect(a.subject).toBe(b.subject);
    expect(a.text.replaceAll(one, '')).toBe(b.text.replaceAll(other, ''));
    expect(a.html.replaceAll(one, '')).toBe(b.html.replaceAll(other, ''));
    expect(a.text).toContain(one);
    expect(a.html).toContain(`href="${one}"`);
  });
});
