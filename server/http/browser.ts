import type { Request } from 'express';
import type pg from 'pg';
import type { Authenticator } from './passport.ts';
import {
  proveSession,
  revokeSession,
  startSession,
  touchSession,
  writeTokenFor,
  type SecondFactor,
  type SignedIn,
} from './sessions.ts';

/**
 * What a handler may do with the browser that asks: see who is signed in, sign somebody in, sign out.
 * It hides the request, so that a handler never reads anything that was not parsed.
 */
export type Browser = {
  signedIn: SignedIn | null;
  /** The session that this browser last held, alive or not: what it left here is nobody else's. */
  formerSessionId: string | null;
  /** Where the request comes from, for counting tries; behind a proxy as TRUST_PROXY says. */
  address: string;
  /** What the browser says of itself. */
  userAgent: string | null;
  /** Checks an e-mail and a password through Passport's strategy; null where they do not match. */
  authenticate: (email: string, password: string) => Promise<{ clinicId: string; personId: string } | null>;
  /** Starts a session; the one that this browser held before is over. */
  start: (
    person: {
      clinicId: string;
      personId: string;
      isStaff: boolean;
      secondFactor: SecondFactor | null;
    },
    staySignedIn: boolean,
  ) => Promise<SignedIn>;
  /** Starts the idle clock anew; null where the session has ended in the meantime. */
  touch: () => Promise<SignedIn | null>;
  /** The person proved again who they are; null where the session has ended in the meantime. */
  prove: (secondFactor?: SecondFactor) => Promise<SignedIn | null>;
  /** Ends the session, and has the browser forget what it kept of this site. */
  end: () => Promise<void>;
  writeToken: (session: SignedIn) => string;
};

export type BrowserKeys = { gate: pg.Pool; secret: string; authenticator: Authenticator };

const failure = (error: unknown): Error => (error instanceof Error ? error : new Error(String(error)));

/** What Passport keeps in the browser's session is the id of our own row. */
const heldBefore = (req: Request): string | null => {
  const { passport } = req.session as { passport?: { user?: unknown } };
  return typeof passport?.user === 'string' ? passport.user : null;
};

const userAgentOf = (req: Request): string | null => req.headers['user-agent']?.slice(0, 300) ?? null;

export const browserOf = (
  req: Request,
  { gate, secret, authenticator }: BrowserKeys,
  now: Date,
): Browser => ({
  signedIn: req.user?.session ?? null,
  formerSessionId: heldBefore(req),
  address: req.ip ?? 'unknown',
  userAgent: userAgentOf(req),
  authenticate: (email, password) =>
    new Promise((resolve, reject) => {
      const done = (error: unknown, person: Express.User | false | null) => {
        if (error) reject(failure(error));
        else resolve(person || null);
      };
      req.body = { email, password };
      const check = authenticator.authenticate('local', { session: false }, done) as (
        req: Request,
        res: unknown,
        next: (error: unknown) => void,
      ) => void;
      check(req, req.res, (error) => done(error, null));
    }),
  start: async (person, staySignedIn) => {
    const replaced = req.user?.session?.sessionId;
    const session = await startSession(gate, { ...person, staySignedIn, userAgent: userAgentOf(req) }, now);
    // Passport makes a new browser session here, so an id planted before sign-in is worth nothing after it.
    await new Promise<void>((resolve, reject) => {
      req.logIn({ clinicId: person.clinicId, personId: person.personId, session }, (error: unknown) => {
        if (error) reject(failure(error));
        else resolve();
      });
    });
    if (replaced) await revokeSession(gate, replaced, now);
    return session;
  },
  touch: async () => {
    const sessionId = req.user?.session?.sessionId;
    return sessionId ? touchSession(gate, sessionId, now) : null;
  },
  prove: async (secondFactor) => {
    const sessionId = req.user?.session?.sessionId;
    return sessionId ? proveSession(gate, sessionId, secondFactor ?? null, now) : null;
  },
  end: async () => {
    const sessionId = req.user?.session?.sessionId;
    if (sessionId) await revokeSession(gate, sessionId, now);
    // Caches, storage and the service worker of this site go, also where the page's own clearing fails.
    req.res?.setHeader('Clear-Site-Data', '"cache", "storage"');
    await new Promise<void>((resolve, reject) => {
      req.session.destroy((error: unknown) => {
        if (error) reject(failure(error));
        else resolve();
      });
    });
  },
  writeToken: (session) => writeTokenFor(secret, session.sessionId),
});
