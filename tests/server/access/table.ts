import { randomUUID } from 'node:crypto';
import { may, roles, type Role } from '#shared/access/permissions.ts';
import { problemType, type ProblemBody } from '#shared/problems/problems.ts';
import { isPublic, type Route } from '#server/http/route.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import type { Answer, TestBrowser, TestWeb } from '#tests/support/web.ts';
import { actingFor } from '../caregivers/grants.ts';
import type { RouteFixture } from './fixture.ts';
import { routeFixtures } from './route-fixtures.ts';
import { relations, type Cast, type Relation, type Scene } from './scene.ts';

type Caller = Role | 'anonymous';
type Asked = Relation | 'missing' | 'none';
type AuditEntry = {
  action: string;
  clinicId: string;
  personId: string | null;
  patientId: string | null;
  detail: Record<string, unknown> | null;
};

/** One call: who asked for whose row, what was answered and what the audit kept of it. */
export type Cell = {
  caller: Caller;
  actor: Cast['actor'] | null;
  asked: Asked;
  /** The id in the address. */
  id: string | null;
  /** What else stood in the address. */
  also: Record<string, string>;
  answer: Answer;
  audit: AuditEntry[];
  expectedStatus: number;
  /** The answer asks why the chart is opened, and refuses nothing yet. */
  asksReason: boolean;
  /** Of a list: whose rows it showed. */
  sees: Relation[] | null;
};

export const keyOf = ({ contract }: Route): string => `${contract.method} ${contract.path}`;

const expectedStatus = (route: Route, fixture: RouteFixture, caller: Caller, asked: Asked): number => {
  const { status } = route.contract;
  if (isPublic(route)) return status;
  if (caller === 'anonymous') return 401;
  if (!may([caller], route.access.permission) || fixture.refuses?.(caller)) return 403;
  if (asked === 'missing') return 404;
  if (asked !== 'none' && fixture.door && !fixture.door(caller, asked)) return 404;
  if (asked !== 'none' && fixture.asksReason?.(caller, asked)) return 403;
  return status;
};

const askedOf = (fixture: RouteFixture): Asked[] => {
  if (fixture.param) return [...relations, 'missing'];
  return fixture.clientIds ? [...relations] : ['none'];
};

type Stage = { database: TestDatabase; web: TestWeb; scene: Scene };

const callCell = async (
  { database, web, scene }: Stage,
  route: Route,
  { caller, asked, browser }: { caller: Caller; asked: Asked; browser: TestBrowser },
): Promise<Cell> => {
  const fixture = routeFixtures[keyOf(route)]!;
  const cast = scene.casts[caller === 'anonymous' ? 'patient' : caller];
  const owner = cast.rowsOf[asked === 'none' || asked === 'missing' ? 'own' : asked];
  const worker = asked === "other clinic's" ? scene.otherTherapist : cast.actor;
  const isActing = caller === 'caregiver';
  const author = isActing && owner === cast.rowsOf.own ? cast.actor : owner;
  const made = await fixture.request(database, { actor: cast.actor, owner, worker, author, origin: web.url });
  const id = fixture.param ? (asked === 'missing' ? randomUUID() : made.id!) : null;
  await database.asSuperuser.query('delete from audit_entries');
  const { method, path } = route.contract;
  const also = made.also ?? {};
  const inPath = { ...also, ...(fixture.param ? { [fixture.param]: id ?? '' } : {}) };
  const address = Object.entries(inPath).reduce(
    (text, [name, value]) => text.replace(`:${name}`, value),
    path,
  );
  // A caregiver asks for everything as the one who looks after the patient of `own`.
  const headers = isActing ? actingFor(cast.rowsOf.own) : {};
  const answer = await browser.call(method, address, made.body, headers);
  const { rows: audit } = await database.asSuperuser.query<AuditEntry>(
    `select action, clinic_id as "clinicId", person_id as "personId", patient_id as "patientId", detail
     from audit_entries order by action`,
  );
  const shown = fixture.patientsIn && answer.status === 200 ? fixture.patientsIn(answer.body) : null;
  return {
    caller,
    actor: caller === 'anonymous' ? null : cast.actor,
    asked,
    id,
    also,
    answer,
    audit,
    expectedStatus: expectedStatus(route, fixture, caller, asked),
    asksReason: (answer.body as ProblemBody | null)?.type === problemType('reason-needed'),
    sees: shown && relations.filter((relation) => shown.includes(cast.rowsOf[relation].patientId)),
  };
};

/** Calls a route as everybody, for every row there is to ask for. */
export const callAsEverybody = async (stage: Stage, route: Route): Promise<Cell[]> => {
  const fixture = routeFixtures[keyOf(route)];
  if (!fixture) return [];
  const cells: Cell[] = [];
  for (const caller of ['anonymous', ...roles] as const) {
    const signIn = () =>
      caller === 'anonymous' ? stage.web.anonymous() : stage.web.signIn(stage.scene.casts[caller].actor);
    let browser = await browserFor(stage, caller, signIn);
    for (const asked of askedOf(fixture)) {
      cells.push(await callCell(stage, route, { caller, asked, browser }));
      if (fixture.endsSession) browser = await browserFor(stage, caller, signIn, true);
    }
  }
  return cells;
};

const browsers = new WeakMap<Scene, Map<Caller, TestBrowser>>();

/** One session a role serves the whole table, until a route ends it. */
const browserFor = async (
  { scene }: Stage,
  caller: Caller,
  signIn: () => Promise<TestBrowser> | TestBrowser,
  anew = false,
): Promise<TestBrowser> => {
  const known = browsers.get(scene) ?? new Map<Caller, TestBrowser>();
  browsers.set(scene, known);
  const found = anew ? undefined : known.get(caller);
  const browser = found ?? (await signIn());
  known.set(caller, browser);
  return browser;
};

const cellText = ({ answer, audit, sees }: Cell): string => {
  const entries = audit.map(({ action }) => action).join('+');
  const shown = sees === null ? '' : ` shows ${sees.join(', ') || 'nothing'}`;
  return `${answer.status}${entries ? ` ${entries}` : ''}${shown}`;
};

/** The table as text: a route a block, a role a line. */
export const tableText = (route: Route, cells: readonly Cell[]): string => {
  const access = isPublic(route) ? 'public' : route.access.permission;
  const audit = typeof route.audit === 'string' ? route.audit : 'no audit';
  const lines = [...new Set(cells.map(({ caller }) => caller))].map((caller) => {
    const row = cells.filter((cell) => cell.caller === caller);
    const columns = row.map((cell) =>
      cell.asked === 'none' ? cellText(cell) : `${cell.asked}: ${cellText(cell)}`,
    );
    return `  ${caller.padEnd(18)} ${columns.join(' | ')}`;
  });
  return [`${keyOf(route)} (${access}; ${audit})`, ...lines, ''].join('\n');
};
