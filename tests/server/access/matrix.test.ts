import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { may, roles } from '#shared/access/permissions.ts';
import { isPublic, type Route } from '#server/http/route.ts';
import { allRoutes } from '#server/routes.ts';
import type { ActingAs } from '#server/db/actor.ts';
import { withTx } from '#server/db/with-tx.ts';
import { notShown, shownActions } from '#server/features/activity/words.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestWeb } from '#tests/support/web.ts';
import { plantFlag, plantThread } from '../records.ts';
import { fencedTables, plantWholeClinic, type WholeClinic } from '../whole-clinic.ts';
import { routeFixtures } from './route-fixtures.ts';
import { relations, setScene, type Scene } from './scene.ts';
import { callAsEverybody, keyOf, tableText, type Cell } from './table.ts';

const routes = allRoutes(async () => null);
const keys = routes.map(keyOf);
const cellsByRoute = new Map<string, Cell[]>();

let database: TestDatabase;
let web: TestWeb;
let scene: Scene;

beforeAll(async () => {
  database = await cloneDatabase();
  // One instant for all: two openings of a chart can never fall on the two sides of a five-minute window.
  const now = new Date();
  web = await startWeb(database, { clock: () => now });
  scene = await setScene(database);
  for (const relation of relations) {
    for (const { rowsOf } of Object.values(scene.casts)) {
      await plantFlag(database, rowsOf[relation]);
      await plantThread(database, rowsOf[relation]);
    }
  }
  // Lists first: later calls make people take part in threads that they would not see otherwise.
  const isList = (route: Route) => Number(routeFixtures[keyOf(route)]?.patientsIn !== undefined);
  for (const route of routes.toSorted((a, b) => isList(b) - isList(a))) {
    cellsByRoute.set(keyOf(route), await callAsEverybody({ database, web, scene }, route));
  }
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

const cellsOf = (key: string): Cell[] => cellsByRoute.get(key) ?? [];
const nameOf = ({ caller, asked }: Cell): string => `${caller}, ${asked}`;
const byName = <T>(cells: readonly Cell[], value: (cell: Cell) => T) =>
  Object.fromEntries(cells.map((cell) => [nameOf(cell), value(cell)]));

it('has a fixture for every route, and none for a route that is gone', () => {
  expect(Object.keys(routeFixtures).sort()).toEqual([...keys].sort());
});

describe.each(routes.map((route) => ({ key: keyOf(route), route })))('$key', ({ key, route }) => {
  it('answers success, 401, 403 and 404 as grants and doors say', () => {
    const cells = cellsOf(key);
    expect(cells.length).toBeGreaterThan(0);
    expect(byName(cells, ({ answer }) => answer.status)).toEqual(
      byName(cells, ({ expectedStatus }) => expectedStatus),
    );
  });

  it('writes its declared audit entry once for a success, one denial for what was refused, else none', () => {
    const cells = cellsOf(key);
    const declared = typeof route.audit === 'string' ? route.audit : (routeFixtures[key]?.writes ?? null);
    const expected = (cell: Cell): string[] => {
      if (cell.answer.status < 300) return declared === null ? [] : [declared].flat();
      return cell.caller === 'anonymous' || cell.asksReason ? [] : ['access.denied'];
    };
    expect(byName(cells, ({ audit }) => audit.map(({ action }) => action))).toEqual(byName(cells, expected));
    for (const { actor, audit } of cells.filter((cell) => cell.actor !== null)) {
      for (const entry of audit) {
        expect(entry).toMatchObject({ personId: actor!.personId, clinicId: actor!.clinicId });
      }
    }
  });

  it('names the route and the id asked for in each denial', () => {
    const denied = cellsOf(key).filter(({ audit }) => audit.some(({ action }) => action === 'access.denied'));
    // What everybody may do about their own is denied to nobody.
    const isOwn =
      !isPublic(route) &&
      routeFixtures[key]?.param === undefined &&
      roles.every((role) => may([role], route.access.permission));
    expect(denied.length > 0).toBe(!isPublic(route) && !isOwn);
    for (const { audit, id, also } of denied) {
      const isId = (value: string) => /^[0-9a-f-]{36}$/.test(value);
      expect(audit[0]?.detail).toEqual({
        route: key,
        ...(id === null ? {} : { [routeFixtures[key]!.param!]: id }),
        ...Object.fromEntries(
          Object.entries(also).map(([name, value]) => [name, isId(value) ? value : 'not an id']),
        ),
      });
    }
  });

  it('answers for what is not theirs with the same bytes as for what is not there', () => {
    for (const missing of cellsOf(key).filter(({ asked }) => asked === 'missing')) {
      const others = cellsOf(key).filter(
        ({ caller, answer }) => caller === missing.caller && answer.status === missing.answer.status,
      );
      for (const other of others) expect(bytesOf(other), nameOf(other)).toEqual(bytesOf(missing));
    }
  });
});

const bytesOf = ({ answer }: Cell) => ({
  text: answer.text,
  headers: Object.fromEntries(
    [...answer.headers].filter(([name]) => name !== 'x-request-id' && name !== 'date'),
  ),
});

it('shows in each list the rows that the one who asks may open, and none of another clinic', () => {
  const seenBy = (key: string) =>
    Object.fromEntries(
      cellsOf(key)
        .filter(({ sees }) => sees !== null)
        .map(({ caller, sees }) => [caller, sees]),
    );
  const wholeClinic = ['own', "colleague's", "other patient's"];
  expect(seenBy('get /api/flags')).toEqual({
    therapist: wholeClinic,
    'on-call-clinician': wholeClinic,
    'clinical-lead': wholeClinic,
  });
  expect(seenBy('get /api/patients')).toEqual({
    therapist: wholeClinic,
    'on-call-clinician': wholeClinic,
    'clinical-lead': wholeClinic,
    administrator: wholeClinic,
  });
  expect(seenBy('get /api/threads')).toEqual({
    patient: ['own'],
    caregiver: ['own'],
    therapist: ['own'],
    'on-call-clinician': wholeClinic,
    'clinical-lead': wholeClinic,
  });
});

it('has a word of the patient’s activity, or a reason for none, for every act on a patient’s record', () => {
  const acts = [...cellsByRoute.values()].flatMap((cells) =>
    cells.flatMap(({ audit }) => audit.filter(({ patientId }) => patientId !== null)),
  );
  const actions = [...new Set(acts.map(({ action }) => action))];
  expect(actions.length).toBeGreaterThan(20);
  const known = [...Object.keys(shownActions), ...Object.keys(notShown)];
  expect(actions.filter((action) => !known.includes(action))).toEqual([]);
});

it('is the committed table: a changed grant is a changed line', async () => {
  const text = routes.map((route) => tableText(route, cellsOf(keyOf(route)))).join('\n');
  await expect(text).toMatchFileSnapshot('matrix.snapshot.txt');
});

it('joins two openings of a chart within five minutes into one audit entry', async () => {
  const { actor, rowsOf } = scene.casts.therapist;
  const { flagId } = await plantFlag(database, rowsOf.own);
  const desk = await web.signIn(actor);
  expect((await desk.call('get', `/api/flags/${flagId}`)).status).toBe(200);
  expect((await desk.call('get', `/api/flags/${flagId}`)).status).toBe(200);
  const { rows } = await database.asSuperuser.query(
    `select 1 from audit_entries where action = 'case.opened' and subject_id = $1`,
    [flagId],
  );
  expect(rows).toHaveLength(1);
});

describe('the fence under the routes', () => {
  let here: WholeClinic;
  let there: WholeClinic;

  beforeAll(async () => {
    here = await plantWholeClinic(database);
    there = await plantWholeClinic(database);
  });

  const as = (actor: ActingAs, text: string, values: unknown[] = []) =>
    withTx(database.pools.app, actor, async (tx) => {
      const { rows } = await tx.$client.query<{ clinic: string }>(text, values);
      return rows.map(({ clinic }) => clinic);
    });
  const somebody = ({ clinicId, therapist }: WholeClinic): ActingAs => ({
    kind: 'person',
    clinicId,
    personId: therapist.personId,
  });

  // The audit cannot even be read: what row security does to it is shown below by what may be written.
  it.each(['clinics', ...fencedTables].filter((table) => table !== 'audit_entries'))(
    'shows in %s the rows of the clinic that acts, and no other',
    async (table) => {
      const text = `select distinct ${table === 'clinics' ? 'id' : 'clinic_id'} as clinic from ${table}`;
      expect(await as(somebody(here), text)).toEqual([here.clinicId]);
      expect(await as({ kind: 'system', clinicId: there.clinicId }, text)).toEqual([there.clinicId]);
      expect(await as({ kind: 'anonymous' }, text)).toEqual([]);
    },
  );

  it('takes audit entries of the clinic that acts, and of no other', async () => {
    const text = `insert into audit_entries (clinic_id, at, actor_kind, action) values ($1, now(), 'system', 'probe')`;
    await expect(as(somebody(here), text, [here.clinicId])).resolves.toEqual([]);
    await expect(as(somebody(here), text, [there.clinicId])).rejects.toThrow('row-level security');
    await expect(as({ kind: 'anonymous' }, text, [here.clinicId])).rejects.toThrow('row-level security');
  });
});
