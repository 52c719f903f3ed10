import { timingSafeEqual } from 'node:crypto';
import type { IRouter, Request, Response } from 'express';
import type { z } from 'zod';
import { isStaff, may } from '#shared/access/permissions.ts';
import { Problem, type FieldError } from '#shared/problems/problems.ts';
import type { Pools } from '../db/pools.ts';
import { withTx } from '../db/with-tx.ts';
import { loadPersonActor } from '../features/accounts/queries.ts';
import { writeAudit } from '../features/audit/service.ts';
import { browserOf, type Browser, type BrowserKeys } from './browser.ts';
import type { Site } from './site.ts';
import { isPublic, type GuardedRoute, type PublicRoute, type Route } from './route.ts';

export type MountOptions = {
  pools: Pools;
  keys: BrowserKeys;
  clock: () => Date;
  /** The origin that pages are served from; writes from any other are refused. */
  publicOrigin: string;
  site: Site;
};

/** A proof of who somebody is holds for this long. */
const proofHoldsMs = 5 * 60_000;

/** Names the patient that a caregiver acts for. Without it a person acts on their own record. */
const patientHeader = 'x-espalier-patient';

const fieldErrors = (part: string, error: z.ZodError): FieldError[] =>
  error.issues.flatMap((issue): FieldError[] => {
    const at = (extra: string[]) => [...issue.path.map(String), ...extra].join('.') || part;
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) => ({ field: at([key]), message: 'This is not known here.' }));
    }
    return [{ field: at([]), message: issue.message }];
  });

/** What JSON can carry and PostgreSQL cannot keep: NUL, and half of a surrogate pair. */
const unstorable = (value: unknown, path: string[] = []): FieldError[] => {
  if (typeof value === 'string') {
    if (!value.includes('\0') && !/\p{Surrogate}/u.test(value)) return [];
    return [{ field: path.join('.'), message: 'This holds characters that cannot be kept.' }];
  }
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, inner]) => unstorable(inner, [...path, key]));
};

/** Parses every declared part and lists all fields that are not right, not only the first. */
const parseInput = ({ contract }: Route, req: Request): Record<string, unknown> => {
  const parts = { params: contract.params, query: contract.query, body: contract.body };
  const input: Record<string, unknown> = {};
  const errors: FieldError[] = [];
  for (const [part, schema] of Object.entries(parts)) {
    if (!schema) continue;
    const given: unknown = part === 'body' ? (req.body ?? {}) : req[part as 'params' | 'query'];
    const parsed = schema.safeParse(given);
    if (parsed.success) {
      input[part] = parsed.data;
      errors.push(...unstorable(parsed.data));
    }
    // An id that is none cannot name anything: the same answer as a missing one.
    else if (part === 'params') throw new Problem('not-found');
    else errors.push(...fieldErrors(part, parsed.error));
  }
  if (errors.length > 0) throw new Problem('invalid-input', undefined, { errors });
  return input;
};

const sameToken = (given: string | undefined, expected: string): boolean => {
  const a = Buffer.from(given ?? '');
  const b = Buffer.from(expected);
  return a.length === b.length && timingSafeEqual(a, b);
};

/** A write must come from our own page, as JSON, and from inside the session that it claims. */
const assertOwnWrite = (req: Request, browser: Browser, publicOrigin: string): void => {
  if (req.method === 'GET') return;
  if (req.headers.origin !== publicOrigin) throw new Problem('foreign-request');
  const hasBody = Number(req.headers['content-length'] ?? 0) > 0 || 'transfer-encoding' in req.headers;
  if (hasBody && !req.is('application/json')) throw new Problem('unsupported-content');
  const { signedIn } = browser;
  if (signedIn && !sameToken(req.get('x-espalier-session'), browser.writeToken(signedIn))) {
    throw new Problem('foreign-request');
  }
};

const servePublic = async (route: PublicRoute, req: Request, options: MountOptions): Promise<unknown> => {
  const now = options.clock();
  const browser = browserOf(req, options.keys, now);
  // Signing in replaces whatever session the browser held, so it needs no token of that one.
  assertOwnWrite(req, { ...browser, signedIn: null }, options.publicOrigin);
  return route.handler({ ...parseInput(route, req), pools: options.pools, now, browser, site: options.site });
};

/** Ids only: whatever else stood in an address stays out of the audit. */
const idsAskedFor = (req: Request): Record<string, string> =>
  Object.fromEntries(
    Object.entries(req.params).map(([name, value]) => [
      name,
      typeof value === 'string' && /^[0-9a-f-]{36}$/i.test(value) ? value : 'not an id',
    ]),
  );

const serveGuarded = async (route: GuardedRoute, req: Request, options: MountOptions): Promise<unknown> => {
  const now = options.clock();
  const browser = browserOf(req, options.keys, now);
  const { signedIn } = browser;
  if (!signedIn) throw new Problem('not-signed-in');
  assertOwnWrite(req, browser, options.publicOrigin);
  const person = { kind: 'person', clinicId: signedIn.clinicId, personId: signedIn.personId } as const;
  try {
    return await withTx(options.pools.app, person, async (tx) => {
      const actor = await loadPersonActor(tx, person, { caresFor: req.get(patientHeader), now });
      if (!actor) throw new Problem('not-signed-in');
      const { permission, proof, beforeSecondFactor } = route.access;
      if (!may(actor.roles, permission)) throw new Problem('forbidden');
      if (!beforeSecondFactor && isStaff(actor.roles) && signedIn.secondFactor === null) {
        throw new Problem('second-factor-needed');
      }
      if (proof && now.getTime() - signedIn.provenAt.getTime() > proofHoldsMs) {
        throw new Problem('proof-needed');
      }
      return route.handler({ ...parseInput(route, req), tx, actor, now, browser, site: options.site });
    });
  } catch (error) {
    if (error instanceof Problem && (error.code === 'not-found' || error.code === 'forbidden')) {
      // After the rollback, in a transaction of its own, alike for what is not theirs and what is not there.
      await withTx(options.pools.app, person, (tx) =>
        writeAudit(
          tx,
          person,
          {
            action: 'access.denied',
            detail: { route: `${route.contract.method} ${route.contract.path}`, ...idsAskedFor(req) },
          },
          now,
        ),
      );
    }
    throw error;
  }
};

const answer = (route: Route, res: Response, result: unknown): void => {
  const { status, output } = route.contract;
  if (!output) {
    res.status(status).end();
    return;
  }
  // Parsed on the way out too: a column that nobody declared cannot leak.
  res.status(status).json(output.parse(result));
};

/** The only place where a request meets a handler: identify, permission, parse, handle, parse the answer. */
export const mount = (router: IRouter, routes: readonly Route[], options: MountOptions): void => {
  for (const route of routes) {
    router[route.contract.method](route.contract.path, (req, res, next) => {
      const served = isPublic(route) ? servePublic(route, req, options) : serveGuarded(route, req, options);
      served.then((result) => answer(route, res, result)).catch(next);
    });
  }
};
