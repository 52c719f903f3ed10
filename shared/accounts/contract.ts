import { z } from 'zod';
import { roles } from '../access/permissions.ts';
import { clinicCard } from '../clinic/contract.ts';
import { contract } from '../http/contract.ts';
import { patientStates } from '../patients/states.ts';
import { passkeyAnswer, passkeyQuestion } from './fields.ts';

export const signInBody = z.strictObject({
  email: z.string().trim().min(1, 'Enter your e-mail.').max(254, 'That e-mail is too long.'),
  password: z.string().min(1, 'Enter your password.').max(1024, 'That password is too long.'),
  /** Patients and caregivers only: 30 days on a phone of their own. Staff sessions ignore it. */
  staySignedIn: z.boolean().default(false),
});

export const sessionTimes = z.object({
  /** When the session ends unless the person does something. Null where the person chose to stay signed in. */
  idleEndsAt: z.iso.datetime().nullable(),
  /** When it ends whatever happens. */
  endsAt: z.iso.datetime(),
});

const armAndHand = {
  arm: z.enum(['left', 'right']),
  controlsTowards: z.enum(['left', 'right']),
};

/** A record that somebody may act on: their own, or that of a patient who let them in. */
export const recordCard = z.object({
  id: z.uuid(),
  ...armAndHand,
  state: z.enum(patientStates),
  /** Since when the state holds, where somebody changed it. */
  stateSince: z.iso.datetime().nullable(),
});

/** A patient whom the person looks after. */
export const caredForCard = recordCard.extend({
  name: z.string(),
  mayCheckIn: z.boolean(),
  mayMessage: z.boolean(),
  until: z.iso.date().nullable(),
});
export type CaredFor = z.output<typeof caredForCard>;

export const me = z.object({
  personId: z.uuid(),
  name: z.string(),
  email: z.string(),
  roles: z.array(z.enum(roles)),
  clinic: clinicCard,
  /** Present for a patient: which arm was operated on, and towards which side the free hand reaches. */
  patient: recordCard.nullable(),
  /** Whose records this person may act on as a caregiver, by name. */
  caresFor: z.array(caredForCard),
  /** Staff: `missing` lets them do nothing but set one up. Others: `not-needed`. */
  secondFactor: z.enum(['given', 'missing', 'not-needed']),
  session: sessionTimes,
  /** Goes into the `x-espalier-session` header of every write; bound to this session. */
  writeToken: z.string(),
});

export type Me = z.output<typeof me>;

/** Signed in; or the password was right and a second factor is to come. */
const signInStep = z.discriminatedUnion('next', [
  z.object({ next: z.literal('none'), me }),
  z.object({
    next: z.literal('second-factor'),
    /** Names the half-done sign-in for five minutes and five tries. */
    pendingId: z.uuid(),
    ways: z.array(z.enum(['passkey', 'authenticator', 'recovery-code'])),
  }),
]);
export type SignInStep = z.output<typeof signInStep>;

export const getSession = contract({
  method: 'get',
  path: '/api/session',
  summary: 'Who is signed in here, if anyone.',
  status: 200,
  output: z.object({ me: me.nullable() }),
});

export const signIn = contract({
  method: 'post',
  path: '/api/session',
  summary: 'Sign in with e-mail and password; staff then give a second factor.',
  status: 201,
  body: signInBody,
  output: signInStep,
});

const code = z.string().trim().min(6, 'Enter the code.').max(40, 'That is too long for a code.');

/** One of the ways to give a second factor. */
const secondFactorAnswer = z.discriminatedUnion('way', [
  z.strictObject({ way: z.literal('authenticator'), code }),
  z.strictObject({ way: z.literal('recovery-code'), code }),
  z.strictObject({ way: z.literal('passkey'), passkey: passkeyAnswer }),
]);

export const giveSecondFactorBody = z.strictObject({ pendingId: z.uuid(), answer: secondFactorAnswer });

export const giveSecondFactor = contract({
  method: 'post',
  path: '/api/session/second-factor',
  summary: 'Finish a sign-in with the second factor.',
  status: 201,
  body: giveSecondFactorBody,
  output: z.object({ me }),
});

export const askPasskeySecondFactor = contract({
  method: 'post',
  path: '/api/session/second-factor/passkey-question',
  summary: 'The question that a passkey answers as a second factor.',
  status: 200,
  body: z.strictObject({ pendingId: z.uuid() }),
  output: passkeyQuestion,
});

export const askPasskeySignIn = contract({
  method: 'post',
  path: '/api/session/passkey-question',
  summary: 'The question that a passkey answers to sign in, without naming anybody.',
  status: 200,
  output: passkeyQuestion,
});

export const signInByPasskey = contract({
  method: 'post',
  path: '/api/session/passkey',
  summary: 'Sign in with a passkey. It opens staff accounts too where it verified the person itself.',
  status: 201,
  body: z.strictObject({ passkey: passkeyAnswer, staySignedIn: z.boolean().default(false) }),
  output: z.object({ me }),
});

export const signOut = contract({
  method: 'delete',
  path: '/api/session',
  summary: 'End this session, its sockets, and what its browser kept.',
  status: 204,
});

export const noteActivity = contract({
  method: 'post',
  path: '/api/session/activity',
  summary: 'The person did something: the idle clock starts anew.',
  status: 200,
  output: sessionTimes,
});

/** How a person proves again who they are before a sensitive act: good for five minutes. */
export const proveBody = z.discriminatedUnion('way', [
  z.strictObject({
    way: z.literal('password'),
    password: z.string().min(1, 'Enter your password.').max(1024),
  }),
  z.strictObject({ way: z.literal('authenticator'), code }),
  z.strictObject({ way: z.literal('passkey'), passkey: passkeyAnswer }),
]);

export const proveSession = contract({
  method: 'post',
  path: '/api/session/proof',
  summary: 'Prove again who is signed in, before a sensitive act.',
  status: 204,
  body: proveBody,
});

export const askPasskeyProof = contract({
  method: 'post',
  path: '/api/session/proof/passkey-question',
  summary: 'The question that a passkey answers as a proof.',
  status: 200,
  output: passkeyQuestion,
});

/** A live session of one's own, named by what its browser said of itself. */
export const sessionCard = z.object({
  id: z.uuid(),
  device: z.string(),
  startedAt: z.iso.datetime(),
  lastActivityAt: z.iso.datetime(),
  /** The one that asks. */
  current: z.boolean(),
  staysSignedIn: z.boolean(),
  /** This browser lets itself be woken by push. */
  push: z.boolean(),
});

export const listSessions = contract({
  method: 'get',
  path: '/api/sessions',
  summary: 'One’s own live sessions, newest activity first.',
  status: 200,
  output: z.object({ sessions: z.array(sessionCard) }),
});

export const endSession = contract({
  method: 'delete',
  path: '/api/sessions/:sessionId',
  summary: 'Sign one of one’s own devices out.',
  status: 204,
  params: z.object({ sessionId: z.uuid() }),
});

export const endOtherSessions = contract({
  method: 'delete',
  path: '/api/sessions',
  summary: 'Sign every other device of one’s own out.',
  status: 200,
  output: z.object({ ended: z.number().int() }),
});
