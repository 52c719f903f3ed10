import { z } from 'zod';
import { roles } from '../access/permissions.ts';
import { clinicCard } from '../clinic/contract.ts';
import { contract } from '../http/contract.ts';

export const signInBody = z.strictObject({
  email: z.string().trim().min(1, 'Enter your e-mail.').max(254, 'That e-mail is too long.'),
  password: z.string().min(1, 'Enter your password.').max(1024, 'That password is too long.'),
  /** Patients only: 30 days on a phone of their own. Staff sessions ignore it. */
  staySignedIn: z.boolean().default(false),
});

export const sessionTimes = z.object({
  /** When the session ends unless the person does something. Null where the person chose to stay signed in. */
  idleEndsAt: z.iso.datetime().nullable(),
  /** When it ends whatever happens. */
  endsAt: z.iso.datetime(),
});

export const me = z.object({
  personId: z.uuid(),
  name: z.string(),
  roles: z.array(z.enum(roles)),
  clinic: clinicCard,
  /** Present for a patient: which arm was operated on, and towards which side the free hand reaches. */
  patient: z
    .object({ id: z.uuid(), arm: z.enum(['left', 'right']), controlsTowards: z.enum(['left', 'right']) })
    .nullable(),
  session: sessionTimes,
  /** Goes into the `x-espalier-session` header of every write; bound to this session. */
  writeToken: z.string(),
});

export type Me = z.output<typeof me>;

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
  summary: 'Sign in with e-mail and password.',
  status: 201,
  body: signInBody,
  output: z.object({ me }),
});

export const signOut = contract({
  method: 'delete',
  path: '/api/session',
  summary: 'End this session and its sockets.',
  status: 204,
});

export const noteActivity = contract({
  method: 'post',
  path: '/api/session/activity',
  summary: 'The person did something: the idle clock starts anew.',
  status: 200,
  output: sessionTimes,
});
