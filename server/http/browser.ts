import type { Request } from 'express';
import type pg from 'pg';
import type { Authenticator } from './passport.ts';
import { revokeSession, startSession, touchSession, writeTokenFor, type SignedIn } from './sessions.ts';

/**
 * What a handler may do with the browser that asks: see who is signed in, sign somebody in, sign out.
 * It hides the request, so that a handler never reads anything that was not parsed.
 */
export type Browser = {
  signedIn: SignedIn | null;
  /** Checks an e-mail and a password through Passport's strategy; null where they do not match. */
  authenticate: (email: string, password: string) => Promise<{ clinicId: string; personId: string } | null>;
  /** Starts a session; the one that this browser held before is over. */
  start: (
    person: { clinicId: string; personId: string; isStaff: boolean },
    staySignedIn: boolean,
  ) => Promise<SignedIn>;
  /** Starts the idle clock anew; null where the session has ended in the meantime. */
  touch: () => Promise<SignedIn | null>;
  end: () => Promise<void>;
  writeToken: (session: SignedIn) => string;
};

export type BrowserKeys = { gate: pg.Pool; secret: string; authenticator: Authenticator };

const failure = (error: unknown): Error => (error instanceof Error ? error : new Error(String(error)));

export const browserOf = (
  req: Request,
  { gate, secret, authenticator }: BrowserKeys,
  now: Date,
): Browser => ({
  signedIn: req.user?.session ?? null,
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
    const userAgent = req.headers['user-agent']?.slice(0, 300) ?? null;
    const session = await startSession(gate, { ...person, staySignedIn, userAgent }, now);
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
  end: async () => {
    const sessionId = req.user?.session?.sessionId;
    if (sessionId) await revokeSession(gate, sessionId, now);
    await new Promise<void>((resolve, reject) => {
      req.session.destroy((error: unknown) => {
        if (error) reject(failure(error));
        else resolve();
      });
    });
  },
  writeToken: (session) => writeTokenFor(secret, session.sessionId),
});
