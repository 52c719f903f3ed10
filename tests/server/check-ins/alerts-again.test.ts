import { describe, expect, it } from 'vitest';
import type { AlertReceipt } from '#shared/check-ins/contract.ts';
import { markTold } from '../records.ts';
import { alertScene } from './alert-scene.ts';

const { scene, sweep, flagsOfPatient, caseOf, send, finish, callMistake } = alertScene();

describe('a tick after the flag was closed', () => {
  const close = (flagId: string) =>
    scene.desk.call('post', `/api/flags/${flagId}/close`, {
      outcome: 'entered-by-mistake',
      worthRaising: 'no',
      note: '',
    });
  const mails = async () => {
    const { rows } = await scene.database.asSuperuser.query<{ count: number }>(
      'select count(*)::int as count from notifications where person_id = $1',
      [scene.noor.personId],
    );
    return rows[0]?.count ?? 0;
  };
  const stateOf = async (flagId: string) => (await caseOf(flagId)).state;

  it('opens it again and tells again, though the same was called a mistake before', async () => {
    const first = await send({ answers: { danger: ['chest-or-breathing'] } });
    await sweep();
    await callMistake(first.id);
    const flagId = (await flagsOfPatient())[0]!.id;
    expect((await close(flagId)).status).toBe(200);
    await markTold(scene.database);
    const before = await mails();

    await send({ checkInId: first.checkInId, answers: { danger: ['chest-or-breathing'] } });
    await sweep();
    expect(await stateOf(flagId)).toBe('open');
    expect(await mails()).toBe(before + 1);
  });

  it('opens it again when the same rule now says something worse', async () => {
    const low = { symptoms: ['low-mood' as const] };
    const { checkInId } = await send({ answers: { ...low, selfHarm: 'not-sure' } });
    await sweep();
    const flagId = (await flagsOfPatient())[0]!.id;
    await close(flagId);
    await send({ checkInId, answers: { ...low, selfHarm: 'yes' } });
    await sweep();
    expect(await stateOf(flagId)).toBe('open');
    expect((await caseOf(flagId)).reasons.map(({ title }) => title)).toContain('Thoughts of self-harm');
  });
});

it('is not told as seen by a look that came before it', async () => {
  const first = await send();
  await sweep();
  const flagId = (await flagsOfPatient())[0]!.id;
  await scene.desk.call('post', `/api/flags/${flagId}/seen`);
  const seenOf = async (id: string) =>
    ((await scene.phone.call('get', `/api/alerts/${id}`)).body as AlertReceipt).seen;
  expect(await seenOf(first.id)).toMatchObject({ by: 'Noor Haddad' });

  const second = await send({ checkInId: first.checkInId, answers: { danger: ['bleeding', 'cold-hand'] } });
  expect(await seenOf(second.id)).toBeNull();
  await sweep();
  expect(await seenOf(second.id)).toBeNull();
  expect((await scene.phone.call('get', '/api/today')).body).toMatchObject({ openFlag: { seenBy: null } });
  await scene.desk.call('post', `/api/flags/${flagId}/seen`);
  expect(await seenOf(second.id)).toMatchObject({ by: 'Noor Haddad' });
});

it('keeps what it said when the finished check-in says something milder', async () => {
  const { checkInId } = await send({
    answers: {
      danger: ['chest-or-breathing', 'fainted-or-coughed-blood'],
      chestWhen: 'now',
      faintedWhen: 'now',
    },
  });
  await sweep();
  await finish(checkInId, { answers: { danger: ['chest-or-breathing'], chestWhen: 'earlier' } });
  await sweep();
  const [flag] = await flagsOfPatient();
  expect(flag).toMatchObject({ urgency: 'emergency' });
  const { reasons } = await caseOf(flag!.id);
  expect(reasons[0]?.title).toContain('Fainted or coughed up blood, now');
});
