import type { Contract, Method, OutputOf, RequestOf } from '#shared/http/contract.ts';
import type { ProblemBody } from '#shared/problems/problems.ts';
import { ApiProblem, Unreachable } from './problem.ts';
import { noteServerDate } from './server-clock.ts';
import { createSignal } from './signal.ts';

/** Long enough for a poor mobile line; after it the request counts as not answered and may be repeated. */
const timeoutMs = 20_000;

let writeToken: string | null = null;

/** The token of the session that is signed in here; every write carries it. */
export function setWriteToken(token: string | null): void {
  writeToken = token;
}

let carriedRecord: string | null = null;

/** The record of somebody else that calls are about from now on; null for one's own. */
export function setActingFor(recordId: string | null): void {
  carriedRecord = recordId;
}

export const actingFor = (): string | null => carriedRecord;

/** The server runs another build than the one this tab was loaded from. Carries the server's build. */
export const buildAnnounced = createSignal<string>();

/**
 * The server did not accept this tab's session: it is over, or another one has taken its place. Or it found
 * nothing on the record of somebody else, which may no longer be open to this person.
 */
export const sessionDoubted = createSignal<'not-signed-in' | 'foreign-request' | 'not-found'>();

type Parts = { params?: unknown; query?: unknown; body?: unknown };

type Options = {
  signal?: AbortSignal | undefined;
  /** Another record than the one this tab is on now; null for one's own. */
  record?: string | null;
};

function textsOf(part: unknown): [string, string][] {
  return Object.entries((part ?? {}) as Record<string, unknown>)
    .filter(([, value]) => value !== undefined)
    .map(([name, value]) => [name, String(value)]);
}

function addressOf(path: string, { params, query }: Parts): string {
  const filled = textsOf(params).reduce(
    (address, [name, value]) => address.replace(`:${name}`, encodeURIComponent(value)),
    path,
  );
  const search = new URLSearchParams(textsOf(query)).toString();
  return search === '' ? filled : `${filled}?${search}`;
}

async function send(
  method: Method,
  path: string,
  parts: Parts,
  signal: AbortSignal | undefined,
  record: string | null,
) {
  const headers = new Headers({ accept: 'application/json' });
  if (record !== null) headers.set('x-espalier-patient', record);
  // A write always declares JSON: the server takes nothing else, and no foreign page can send it.
  if (method !== 'get') headers.set('content-type', 'application/json');
  if (method !== 'get' && writeToken !== null) headers.set('x-espalier-session', writeToken);
  const timeout = AbortSignal.timeout(timeoutMs);
  try {
    return await fetch(addressOf(path, parts), {
      method: method.toUpperCase(),
      headers,
      body: parts.body === undefined ? undefined : JSON.stringify(parts.body),
      cache: 'no-store',
      redirect: 'error',
      signal: signal ? AbortSignal.any([signal, timeout]) : timeout,
    });
  } catch (error) {
    if (signal?.aborted) throw error;
    throw new Unreachable(error);
  }
}

async function readJson(response: Response): Promise<unknown> {
  // A hotel's sign-in page answers 200 in HTML: that is not an answer of ours, and nothing was kept.
  if (!/[/+]json\b/.test(response.headers.get('content-type') ?? '')) throw new Unreachable();
  try {
    return await response.json();
  } catch (error) {
    throw new Unreachable(error);
  }
}

/**
 * Calls one route. The contract is given as a type only (`call<typeof getToday>('get', '/api/today', {})`), so
 * that no schema gets into the client's bundle; method, path, parts and answer are checked against it.
 * Throws `ApiProblem` when the server refused and `Unreachable` when it did not answer.
 */
export async function call<C extends Contract>(
  method: C['method'],
  path: C['path'],
  input: RequestOf<C>,
  { signal, record = carriedRecord }: Options = {},
): Promise<OutputOf<C>> {
  const response = await send(method, path, input, signal, record);
  noteServerDate(response.headers.get('date'));
  const build = response.headers.get('x-espalier-build');
  if (build !== null && build !== __BUILD_ID__) buildAnnounced.emit(build);
  if (response.ok) return (response.status === 204 ? undefined : await readJson(response)) as OutputOf<C>;
  const problem = new ApiProblem((await readJson(response)) as ProblemBody);
  const { code } = problem;
  if (code === 'not-signed-in' || code === 'foreign-request') sessionDoubted.emit(code);
  if (code === 'not-found' && record !== null) sessionDoubted.emit(code);
  throw problem;
}
