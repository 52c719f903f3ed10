import { randomUUID } from 'node:crypto';
import { beforeEach, describe, expect, it } from 'vitest';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import { silentLog } from '#tests/support/database.ts';
import { type TestBrowser } from '#tests/support/web.ts';
import { alertBody, checkInBody } from '../check-ins/bodies.ts';
import { plantThread } from '../records.ts';
import { patientScene } from './scene.ts';

const { scene, move } = patientScene();

describe('a discharged patient', () => {
  let threadId: string;
  let phone: TestBrowser;
  const post = (who: TestBrowser) =>
    who.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'One more thing.' });

  beforeEach(async () => {
    ({ threadId } = await plantThread(scene.database, scene.patient));
    phone = await scene.web.signIn(scene.patient);
    expect((await move('discharge')).status).toBe(200);
  });

  it('is told once that the clinic no longer watches, and their threads are closed', async () => {
    const { rows } = await scene.database.asSuperuser.query(
      `select distinct kind, path from notifications where person_id = $1`,
      [scene.patient.personId],
    );
    expect(rows).toEqual([{ kind: 'watching-ended', path: '/today' }]);
    expect((await phone.call('get', `/api/threads/${threadId}`)).body).toMatchObject({ state: 'closed' });
  });

  it('writes nothing that nobody would read, and is told whom to call', async () => {
    const started = await phone.call('post', '/api/threads', {
      id: randomUUID(),
      subject: 'Washing',
      message: { id: randomUUID(), text: 'May I?' },
    });
    for (const answer of [await post(phone), started]) {
      expect(answer.status).toBe(409);
      expect(answer.body).toMatchObject({ type: 'urn:espalier:problem:not-watched' });
      expect(answer.text).toContain('555-0100');
      expect(answer.text).toContain('911');
    }
    const { rows } = await scene.database.asSuperuser.query('select 1 from threads where patient_id = $1', [
      scene.patient.patientId,
    ]);
    expect(rows).toHaveLength(1);
  });

  it('gets no answer from staff before being taken back', async () => {
    const refused = await post(scene.desk);
    expect(refused.body).toMatchObject({ type: 'urn:espalier:problem:not-watched' });
    expect(refused.text).toContain('Take the patient back first');
    await move('take-back');
    expect((await phone.call('get', `/api/threads/${threadId}`)).body).toMatchObject({ state: 'closed' });
    expect((await post(scene.desk)).status).toBe(201);
  });

  it('loses no check-in and no alert: both are kept and evaluated', async () => {
    const alert = alertBody();
    expect((await phone.call('post', '/api/alerts', alert)).status).toBe(201);
    const sent = checkInBody({ answers: { danger: ['bleeding'] }, id: alert.checkInId });
    expect((await phone.call('post', '/api/check-ins', sent)).status).toBe(201);
    await sweepUnevaluated(scene.database.pools.app, new Date(Date.now() + 11_000), silentLog);
    const { rows } = await scene.database.asSuperuser.query(
      'select urgency from flags where patient_id = $1',
      [scene.patient.patientId],
    );
    expect(rows).toEqual([{ urgency: 'emergency' }]);
  });
});

it('keeps a message that was sent before the discharge when it is sent again after it', async () => {
  const { threadId } = await plantThread(scene.database, scene.patient);
  const phone = await scene.web.signIn(scene.patient);
  const message = { id: randomUUID(), text: 'Thank you.' };
  const first = await phone.call('post', `/api/threads/${threadId}/messages`, message);
  await move('discharge');
  const again = await phone.call('post', `/api/threads/${threadId}/messages`, message);
  expect(again.status).toBe(201);
  expect(again.body).toEqual(first.body);
});

it('leaves no thread open that nobody watches, whatever is written while a patient is discharged', async () => {
  const phone = await scene.web.signIn(scene.patient);
  const { threadId } = await plantThread(scene.database, scene.patient);
  const start = () =>
    phone.call('post', '/api/threads', {
      id: randomUUID(),
      subject: 'Washing',
      message: { id: randomUUID(), text: 'May I?' },
    });
  const answers = await Promise.all([
    start(),
    phone.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'And?' }),
    move('discharge'),
    scene.desk.call('post', `/api/threads/${threadId}/close`),
    start(),
    phone.call('post', `/api/threads/${threadId}/messages`, { id: randomUUID(), text: 'Hello?' }),
  ]);
  for (const { status } of answers) expect([200, 201, 409]).toContain(status);
  const { rows } = await scene.database.asSuperuser.query(
    `select 1 from threads where patient_id = $1 and state <> 'closed'`,
    [scene.patient.patientId],
  );
  expect(rows).toEqual([]);
});
