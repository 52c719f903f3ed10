import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { FlagCase, FlagRow } from '#shared/triage/contract.ts';
import { afterMove, flagStates, type FlagMove, type FlagState } from '#shared/triage/lifecycle.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { plantFlag } from '../records.ts';

let database: TestDatabase;
let web: TestWeb;
let noor: TestPerson;
let callum: TestPerson;
let noorsDesk: TestBrowser;
let callumsDesk: TestBrowser;
let patient: TestPatient;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  const clinicId = await makeClinic(database);
  noor = await makePerson(database, clinicId, ['therapist'], 'Noor Haddad');
  callum = await makePerson(database, clinicId, ['therapist'], 'Callum Reyes');
  patient = await makePatient(database, clinicId, { lead: noor });
  noorsDesk = await web.signIn(noor);
  callumsDesk = await web.signIn(callum);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const closing = { outcome: 'advised-by-phone', worthRaising: 'yes' };
const claim = (desk: TestBrowser, flagId: string) => desk.call('post', `/api/flags/${flagId}/claim`);
const release = (desk: TestBrowser, flagId: string) => desk.call('post', `/api/flags/${flagId}/release`);
const close = (desk: TestBrowser, flagId: string, body: object = closing) =>
  desk.call('post', `/api/flags/${flagId}/close`, body);
const reply = (desk: TestBrowser, flagId: string, id = randomUUID(), text = 'I will ring you.') =>
  desk.call('post', `/api/flags/${flagId}/replies`, { id, text });
const rowOf = async (flagId: string) => {
  const { rows } = await database.asSuperuser.query<Record<string, unknown>>(
    `select state, claimed_by, claimed_at, closed_at, outcome, worth_raising,
      (select e.note from flag_events e where e.flag_id = flags.id and e.kind = 'closed') as outcome_note
    from flags where id = $1`,
    [flagId],
  );
  return rows[0]!;
};
const caseOf = async (flagId: string) =>
  (await noorsDesk.call('get', `/api/flags/${flagId}`)).body as FlagCase;

describe('a claim', () => {
  it('goes to one of two who claim each of fifty flags at once, and the other is told who has it', async () => {
    const flagIds: string[] = [];
    for (let i = 0; i < 50; i += 1) flagIds.push((await plantFlag(database, patient)).flagId);
    const races: Awaited<ReturnType<typeof claim>>[][] = [];
    // Ten requests at a time: as many as the pool has connections, so that all of them run at once.
    for (let from = 0; from < flagIds.length; from += 5) {
      const wave = flagIds
        .slice(from, from + 5)
        .map((flagId) => Promise.all([claim(noorsDesk, flagId), claim(callumsDesk, flagId)]));
      races.push(...(await Promise.all(wave)));
    }
    for (const [index, answers] of races.entries()) {
      expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
      const won = answers.find(({ status }) => status === 200)!.body as FlagRow;
      const holder = answers[0]!.status === 200 ? noor : callum;
      expect(won.claimedBy).toEqual({ personId: holder.personId, name: holder.name });
      expect(answers.find(({ status }) => status === 409)!.body).toMatchObject({
        type: 'urn:espalier:problem:claimed-by-other',
        detail: `${holder.name} has claimed this flag.`,
        claimedBy: holder.name,
      });
      expect(await rowOf(flagIds[index]!)).toMatchObject({ state: 'claimed', claimed_by: holder.personId });
    }
    const { rows } = await database.asSuperuser.query(
      `select flag_id from flag_events where kind = 'claimed' and flag_id = any($1)`,
      [flagIds],
    );
    expect(rows).toHaveLength(50);
  });

  it('of what one holds already changes nothing', async () => {
    const { flagId } = await plantFlag(database, patient);
    await claim(noorsDesk, flagId);
    const before = await rowOf(flagId);
    expect((await claim(noorsDesk, flagId)).status).toBe(200);
    expect(await rowOf(flagId)).toEqual(before);
  });

  it('is given back only by the one who holds it', async () => {
    const { flagId } = await plantFlag(database, patient, { claimedBy: noor });
    const refused = await release(callumsDesk, flagId);
    expect([refused.status, refused.body]).toMatchObject([409, { claimedBy: 'Noor Haddad' }]);
    expect((await release(noorsDesk, flagId)).body).toMatchObject({ state: 'open', claimedBy: null });
    expect((await claim(callumsDesk, flagId)).status).toBe(200);
  });
});

describe('closing', () => {
  it("of a colleague's claim is refused, and says whose it is", async () => {
    const { flagId } = await plantFlag(database, patient, { claimedBy: noor });
    const refused = await close(callumsDesk, flagId);
    expect([refused.status, refused.body]).toMatchObject([
      409,
      { type: 'urn:espalier:problem:claimed-by-other', claimedBy: 'Noor Haddad' },
    ]);
    expect(await rowOf(flagId)).toMatchObject({ state: 'claimed', claimed_by: noor.personId, outcome: null });
  });

  it('is refused also when the colleague claims in the very moment between reading and closing', async () => {
    const { flagId } = await plantFlag(database, patient, { claimedBy: noor });
    const colleague = await database.asSuperuser.connect();
    await colleague.query('begin');
    await colleague.query('update flags set claimed_by = $1 where id = $2', [callum.personId, flagId]);
    const closed = close(noorsDesk, flagId);
    await expect
      .poll(
        async () =>
          (
            await database.asSuperuser.query(
              `select from pg_stat_activity where datname = current_database()
               and application_name = 'espalier-app' and wait_event_type = 'Lock'`,
            )
          ).rowCount,
      )
      .toBe(1);
    await colleague.query('commit');
    colleague.release();
    expect((await closed).status).toBe(409);
    expect(await rowOf(flagId)).toMatchObject({ state: 'claimed', claimed_by: callum.personId });
  });

  it.each([
    ['surgeons-office-informed', 'Name the person you spoke to.'],
    ['no-action-needed', 'Say why no action is needed.'],
  ])('as %s needs a note, and blanks are none', async (outcome, need) => {
    const { flagId } = await plantFlag(database, patient);
    for (const note of [undefined, '', '   ']) {
      const refused = await close(noorsDesk, flagId, { outcome, worthRaising: 'no', note });
      expect(refused.status).toBe(422);
      expect(refused.body).toMatchObject({ errors: [{ field: 'note', message: need }] });
    }
    expect(await rowOf(flagId)).toMatchObject({ state: 'open', outcome: null });
    const note = 'Dr. Mbeki-Stone, 08:40.';
    expect((await close(noorsDesk, flagId, { outcome, worthRaising: 'no', note })).status).toBe(200);
    expect(await rowOf(flagId)).toMatchObject({
      state: 'closed',
      outcome,
      outcome_note: note,
      worth_raising: 'no',
    });
  });

  it('names every field that is missing, and takes no outcome that is not one', async () => {
    const { flagId } = await plantFlag(database, patient);
    const empty = await close(noorsDesk, flagId, {});
    expect(empty.body).toMatchObject({ errors: [{ field: 'outcome' }, { field: 'worthRaising' }] });
    const other = await close(noorsDesk, flagId, { ...closing, outcome: 'forgotten' });
    expect(other.body).toMatchObject({ errors: [{ field: 'outcome', message: 'Choose an outcome.' }] });
    const nul = await close(noorsDesk, flagId, { ...closing, note: 'a\u0000b' });
    expect([nul.status, nul.body]).toMatchObject([422, { errors: [{ field: 'note' }] }]);
    expect(await rowOf(flagId)).toMatchObject({ state: 'open' });
  });

  it('at the same moment by two is one closing', async () => {
    const { flagId } = await plantFlag(database, patient);
    const answers = await Promise.all([close(noorsDesk, flagId), close(callumsDesk, flagId)]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    const { events } = await caseOf(flagId);
    expect(events.filter(({ kind }) => kind === 'closed')).toHaveLength(1);
  });
});

describe('the life of a flag', () => {
  const moves: Record<FlagMove, (desk: TestBrowser, flagId: string) => ReturnType<typeof claim>> = {
    claim,
    release,
    close,
  };
  const cases = flagStates.flatMap((state) =>
    (['claim', 'release', 'close'] as const).map((move) => ({ state, move, to: afterMove(state, move) })),
  );
  const plantIn = (state: FlagState) =>
    plantFlag(database, patient, state === 'claimed' ? { claimedBy: noor } : { state });

  it.each(cases)('a flag that is $state has for "$move" the next state $to', async ({ state, move, to }) => {
    const { flagId } = await plantIn(state);
    const answer = await moves[move](noorsDesk, flagId);
    // Claiming what one holds already is no move and no refusal.
    const stays = state === 'claimed' && move === 'claim';
    expect(answer.status, answer.text).toBe(to !== null || stays ? 200 : 409);
    expect((await rowOf(flagId)).state).toBe(to ?? state);
  });
});

describe('a reply', () => {
  let flagId: string;
  beforeEach(async () => {
    ({ flagId } = await plantFlag(database, patient));
  });

  it('claims an open flag, and the history reads in the order in which it happened', async () => {
    expect((await reply(noorsDesk, flagId)).status).toBe(201);
    expect(await rowOf(flagId)).toMatchObject({ state: 'claimed', claimed_by: noor.personId });
    const { events, threadId } = await caseOf(flagId);
    expect(events.map(({ kind }) => kind)).toEqual(['raised', 'claimed', 'replied']);
    expect(threadId).not.toBeNull();
  });

  it('sent again is one message and one event', async () => {
    const id = randomUUID();
    const answers = [
      await reply(noorsDesk, flagId, id),
      ...(await Promise.all([reply(noorsDesk, flagId, id), reply(noorsDesk, flagId, id)])),
    ];
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201]);
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
    const { events } = await caseOf(flagId);
    expect(events.filter(({ kind }) => kind === 'replied')).toHaveLength(1);
    expect((await reply(noorsDesk, flagId, id, 'Something else.')).status).toBe(409);
  });

  it('by several at once stands in one thread', async () => {
    const answers = await Promise.all(
      [noorsDesk, callumsDesk, noorsDesk, callumsDesk].map((desk) => reply(desk, flagId)),
    );
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201]);
    const bodies = answers.map(({ body }) => body as { threadId: string; sequence: number });
    expect(new Set(bodies.map(({ threadId }) => threadId)).size).toBe(1);
    expect(bodies.map(({ sequence }) => sequence).sort()).toEqual([1, 2, 3, 4]);
    expect((await caseOf(flagId)).events.filter(({ kind }) => kind === 'claimed')).toHaveLength(1);
  });

  it("leaves a colleague's claim theirs", async () => {
    await claim(callumsDesk, flagId);
    expect((await reply(noorsDesk, flagId)).status).toBe(201);
    expect(await rowOf(flagId)).toMatchObject({ state: 'claimed', claimed_by: callum.personId });
  });
});
