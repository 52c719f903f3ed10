import {
  askPasskeyProof,
  askPasskeySecondFactor,
  askPasskeySignIn,
  endOtherSessions,
  endSession,
  getSession,
  giveSecondFactor,
  listSessions,
  noteActivity,
  proveSession,
  signIn,
  signInByPasskey,
  signOut,
} from '#shared/accounts/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { withTx } from '../../db/with-tx.ts';
import { route } from '../../http/route.ts';
import { timesOf } from '../../http/sessions.ts';
import { writeAudit } from '../audit/service.ts';
import { askAssertion } from './passkey-assertions.ts';
import { askForProof, proveAgain } from './proving.ts';
import { loadPersonActor } from './queries.ts';
import { describeMe } from './service.ts';
import { endOwnOtherSessions, endOwnSession, ownSessions, settleEndedSession } from './session-list.ts';
import {
  askForPendingPasskey,
  enterByPasskey,
  finishWithSecondFactor,
  signInWithPassword,
} from './signing-in.ts';

/** Where nobody is known yet, the one session.started is written once it is known who came in. */
const wayIn = {
  access: { public: 'This is the way in.' },
  audit: { none: 'The entry session.started is written once it is known who signed in.' },
} as const;

const question = { none: 'A question changes nothing.' } as const;

const ownSession = { permission: 'session:own', beforeSecondFactor: true } as const;

export const sessionRoutes = [
  route(getSession, {
    access: { public: 'A page must be able to ask whether anybody is signed in before it shows anything.' },
    audit: { none: 'Reads only the session itself.' },
    handler: async ({ pools, browser, now }) => {
      const { signedIn } = browser;
      if (!signedIn) return { me: null };
      const person = { kind: 'person', clinicId: signedIn.clinicId, personId: signedIn.personId } as const;
      return withTx(pools.app, person, async (tx) => {
        const actor = await loadPersonActor(tx, person);
        if (!actor) return { me: null };
        return { me: await describeMe(tx, actor, signedIn, browser.writeToken(signedIn), now) };
      });
    },
  }),
  route(signIn, { ...wayIn, handler: (context) => signInWithPassword(context, context.body) }),
  route(askPasskeySecondFactor, {
    ...wayIn,
    audit: question,
    handler: (context) => askForPendingPasskey(context, context.body.pendingId),
  }),
  route(giveSecondFactor, {
    ...wayIn,
    handler: async (context) => ({ me: await finishWithSecondFactor(context, context.body) }),
  }),
  route(askPasskeySignIn, {
    ...wayIn,
    audit: question,
    handler: ({ site, now }) => askAssertion(site, { purpose: 'sign-in', personId: null }, now),
  }),
  route(signInByPasskey, {
    ...wayIn,
    handler: async (context) => ({ me: await enterByPasskey(context, context.body) }),
  }),
  route(signOut, {
    access: ownSession,
    audit: 'session.ended',
    handler: async ({ tx, actor, browser, now }) => {
      const sessionId = browser.signedIn?.sessionId;
      if (!sessionId) throw new Problem('not-signed-in');
      await browser.end();
      await writeAudit(tx, actor, { action: 'session.ended', subjectId: sessionId }, now);
      await settleEndedSession(tx, actor.clinicId, sessionId);
    },
  }),
  route(noteActivity, {
    access: ownSession,
    audit: { none: 'It says only that somebody is at the screen.' },
    handler: async ({ browser }) => {
      const session = await browser.touch();
      if (!session) throw new Problem('not-signed-in');
      return timesOf(session);
    },
  }),
  route(askPasskeyProof, { access: ownSession, audit: question, handler: askForProof }),
  route(proveSession, {
    access: ownSession,
    audit: 'session.proven',
    handler: (context) => proveAgain(context, context.body),
  }),
  route(listSessions, {
    access: { permission: 'session:own' },
    audit: { none: 'Reads only one’s own sessions.' },
    handler: ownSessions,
  }),
  route(endSession, {
    access: { permission: 'session:own' },
    audit: 'session.ended-elsewhere',
    handler: (context) => endOwnSession(context, context.params.sessionId),
  }),
  route(endOtherSessions, {
    access: { permission: 'session:own' },
    audit: 'sessions.ended-elsewhere',
    handler: async (context) => ({ ended: await endOwnOtherSessions(context) }),
  }),
];
