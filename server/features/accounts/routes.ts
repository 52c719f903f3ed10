import { getSession, noteActivity, signIn, signOut } from '#shared/accounts/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import { withTx } from '../../db/with-tx.ts';
import { route } from '../../http/route.ts';
import { timesOf } from '../../http/sessions.ts';
import { announceSessionEnd } from '../../realtime/announce.ts';
import { writeAudit } from '../audit/service.ts';
import { loadPersonActor } from './queries.ts';
import { describeMe } from './service.ts';

export const accountRoutes = [
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
  route(signIn, {
    access: { public: 'This is the way in.' },
    audit: { none: 'The handler writes session.started once it knows who signed in.' },
    handler: async ({ body, pools, browser, now }) => {
      const found = await browser.authenticate(body.email, body.password);
      if (!found) throw new Problem('wrong-sign-in');
      const person = { kind: 'person', ...found } as const;
      const actor = await withTx(pools.app, person, (tx) => loadPersonActor(tx, person));
      if (!actor) throw new Problem('wrong-sign-in');
      const isStaff = actor.roles.some((role) => role !== 'patient' && role !== 'caregiver');
      const replaced = browser.signedIn;
      const session = await browser.start({ ...found, isStaff }, body.staySignedIn);
      return withTx(pools.app, person, async (tx) => {
        await writeAudit(tx, person, { action: 'session.started', subjectId: session.sessionId }, now);
        if (replaced) await announceSessionEnd(tx, replaced.sessionId);
        return { me: await describeMe(tx, actor, session, browser.writeToken(session), now) };
      });
    },
  }),
  route(signOut, {
    access: { permission: 'session:own' },
    audit: 'session.ended',
    handler: async ({ tx, actor, browser, now }) => {
      const sessionId = browser.signedIn?.sessionId;
      if (!sessionId) throw new Problem('not-signed-in');
      await browser.end();
      await writeAudit(tx, actor, { action: 'session.ended', subjectId: sessionId }, now);
      await announceSessionEnd(tx, sessionId);
    },
  }),
  route(noteActivity, {
    access: { permission: 'session:own' },
    audit: { none: 'It says only that somebody is at the screen.' },
    handler: async ({ browser }) => {
      const session = await browser.touch();
      if (!session) throw new Problem('not-signed-in');
      return timesOf(session);
    },
  }),
];
