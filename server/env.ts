import { z } from 'zod';

const port = z.coerce.number().int().min(0).max(65_535);

/** Present together or not at all: a telephone gateway that is half set up fails when it is needed most. */
const telephoneEnv = {
  TWILIO_ACCOUNT_SID: z.string().startsWith('AC').optional(),
  TWILIO_AUTH_TOKEN: z.string().min(1).optional(),
  /** The number that calls and messages come from, E.164. */
  TWILIO_FROM: z
    .string()
    .regex(/^\+[1-9]\d{6,14}$/)
    .optional(),
  /** The local fake in the gateway's place; only on a machine of one's own. */
  TWILIO_API_URL: z.url().optional(),
};

const demoAuthenticators = z.array(z.object({ name: z.string(), secret: z.string() }));

const webEnv = z.object({
  NODE_ENV: z.enum(['production', 'development', 'test']).default('production'),
  PORT: port.default(4600),
  HOST: z.string().default('127.0.0.1'),
  PUBLIC_URL: z.url().default('http://localhost:4600'),
  /** How many proxies stand in front, or the names Express knows; none by default. */
  TRUST_PROXY: z.string().default(''),
  APP_DATABASE_URL: z.string().min(1),
  GATE_DATABASE_URL: z.string().min(1),
  SESSION_SECRET: z.string().min(32),
  /** Makes the secrets of one-time links and codes; the worker has the same. */
  TOKEN_SECRET: z.string().min(32),
  /** Seals what must be read again, such as the secrets of authenticator apps. */
  SEAL_SECRET: z.string().min(32),
  /** The key by which browsers know this server for push (RFC 8292), base64url. */
  VAPID_PUBLIC_KEY: z.string().min(80),
  /** Checks what the telephone gateway tells us; without it there are no hooks for it. */
  TWILIO_AUTH_TOKEN: z.string().min(1).optional(),
  /** The bearer token of whoever hands in mails that came back; without it there is no hook for them. */
  MAIL_BOUNCE_TOKEN: z.string().min(32).optional(),
  /** Where the fakes show what was sent; only on a machine of one's own. */
  OUTBOX_URL: z.url().optional(),
  /** The published authenticator apps of the demo's staff, whose codes the outbox shows. */
  DEMO_AUTHENTICATORS: z
    .string()
    .default('[]')
    .transform((text) => demoAuthenticators.parse(JSON.parse(text))),
  BUILD_ID: z.string().default('development'),
  /** The folder of the built client; without it only the API is served. */
  CLIENT_DIR: z.string().optional(),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
});

const workerEnv = z.object({
  APP_DATABASE_URL: z.string().min(1),
  GATE_DATABASE_URL: z.string().min(1),
  SMTP_URL: z.string().min(1),
  TOKEN_SECRET: z.string().min(32),
  VAPID_PUBLIC_KEY: z.string().min(80),
  VAPID_PRIVATE_KEY: z.string().min(40),
  /** How a push service reaches whoever runs this server (RFC 8292): a mailto: or https: address. */
  VAPID_SUBJECT: z.url({ protocol: /^(mailto|https)$/ }).default('mailto:no-reply@espalier.example'),
  /** The local fake in the place of the push services; only on a machine of one's own. */
  PUSH_FAKE_URL: z.url().optional(),
  ...telephoneEnv,
  MAIL_FROM: z.string().default('Espalier <no-reply@espalier.example>'),
  PUBLIC_URL: z.url().default('http://localhost:4600'),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
});

const together = ['TWILIO_ACCOUNT_SID', 'TWILIO_AUTH_TOKEN', 'TWILIO_FROM'] as const;

const wholeWorkerEnv = workerEnv.refine(
  (env) => new Set(together.map((name) => env[name] === undefined)).size === 1,
  { path: ['TWILIO_FROM'], message: `Set ${together.join(', ')} together, or none of them.` },
);

export type WebEnv = z.output<typeof webEnv>;
export type WorkerEnv = z.output<typeof wholeWorkerEnv>;

/** The environment is read here, once per entry point; a value that does not fit ends the start with its name. */
export const readWebEnv = (from: NodeJS.ProcessEnv): WebEnv => webEnv.parse(from);
export const readWorkerEnv = (from: NodeJS.ProcessEnv): WorkerEnv => wholeWorkerEnv.parse(from);
