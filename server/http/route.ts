import type { Permission } from '#shared/access/permissions.ts';
import type { Contract, InputOf, OutputOf } from '#shared/http/contract.ts';
import type { PersonActor } from '../db/actor.ts';
import type { Pools } from '../db/pools.ts';
import type { Tx } from '../db/with-tx.ts';
import type { Browser } from './browser.ts';
import type { Site } from './site.ts';

/** What a handler behind a permission works with: one transaction, and who acts in it. */
export type GuardedContext = {
  tx: Tx;
  actor: PersonActor;
  now: Date;
  browser: Browser;
  site: Site;
};

/** What a public handler works with. There is no actor: it cannot act as anybody. */
export type PublicContext = { pools: Pools; now: Date; browser: Browser; site: Site };

/** What a guarded route asks for beside the permission. */
type GuardedAccess = {
  permission: Permission;
  /** A sensitive act: the person proved who they are within the last five minutes. */
  proof?: true;
  /** Staff may do it before they have given a second factor, in order to set one up. */
  beforeSecondFactor?: true;
};

export type GuardedRoute = {
  contract: Contract;
  access: GuardedAccess;
  /** The action that its one audit entry carries; or why it writes none. */
  audit: string | { none: string };
  handler: (input: Record<string, unknown> & GuardedContext) => Promise<unknown>;
};

export type PublicRoute = {
  contract: Contract;
  access: { public: string };
  audit: { none: string };
  handler: (input: Record<string, unknown> & PublicContext) => Promise<unknown>;
};

export type Route = GuardedRoute | PublicRoute;

export const isPublic = (route: Route): route is PublicRoute => 'public' in route.access;

/** A contract with what only the server knows. Access is a required field; a public route says why it is one. */
export function route<C extends Contract>(
  contract: C,
  definition: {
    access: GuardedAccess;
    audit: string | { none: string };
    handler: (context: InputOf<C> & GuardedContext) => Promise<OutputOf<C>>;
  },
): Route;
export function route<C extends Contract>(
  contract: C,
  definition: {
    access: { public: string };
    audit: { none: string };
    handler: (context: InputOf<C> & PublicContext) => Promise<OutputOf<C>>;
  },
): Route;
export function route(contract: Contract, definition: object): Route {
  // The overloads above are the check; inside, every route is one shape for the code that mounts it.
  return { contract, ...definition } as Route;
}
