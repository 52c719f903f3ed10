import type { Request } from 'express';
import { Passport } from 'passport';
import { Strategy } from 'passport-local';
import type { Pools } from '../db/pools.ts';
import { liveSession } from './sessions.ts';

const dayMs = 24 * 60 * 60 * 1000;

/**
 * Whoever holds a session that is over. Passport takes `false` for an answer too, and then forgets which session
 * this browser held: what that one left here, such as push, could no longer be taken away.
 */
const nobody: Express.User = { clinicId: '', personId: '' };

export type VerifyPassword = (
  email: string,
  password: string,
  /** The address of the visitor who asks. */
  from: string,
) => Promise<{ clinicId: string; personId: string } | null>;

/** Passport with the local strategy; what it keeps in the browser's session is the id of our own session row. */
export const configurePassport = (pools: Pools, clock: () => Date, verifyPassword: VerifyPassword) => {
  const authenticator = new Passport();
  authenticator.use(
    new Strategy({ usernameField: 'email', passReqToCallback: true }, (req, email, password, done) => {
      verifyPassword(email, password, req.ip ?? '').then(
        (person) => done(null, person ?? false),
        (error: unknown) => done(error),
      );
    }),
  );
  authenticator.serializeUser<string, Request>((req, user, done) => {
    if (!user.session) return done(new Error('Only a started session is kept.'));
    const { sessionId, endsAt, lastActivityAt } = user.session;
    // Longer than a day only where a patient chose to stay: then the cookie outlives the browser.
    const stays = endsAt.getTime() - lastActivityAt.getTime() > dayMs;
    if (stays) req.session.cookie.expires = endsAt;
    done(null, sessionId);
  });
  authenticator.deserializeUser<string>((sessionId, done) => {
    liveSession(pools.gate, sessionId, clock()).then(
      (session) =>
        done(null, session ? { clinicId: session.clinicId, personId: session.personId, session } : nobody),
      (error: unknown) => done(error),
    );
  });
  return authenticator;
};

export type Authenticator = ReturnType<typeof configurePassport>;
