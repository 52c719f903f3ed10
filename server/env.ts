import { z } from 'zod';

const port = z.coerce.number().int().min(0).max(65_535);

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
  /** Where the fakes show what was sent; only on a machine of one's own. */
  OUTBOX_URL: z.url().optional(),
  BUILD_ID: z.string().default('development'),
  /** The folder of the built client; without it only the API is served. */
  CLIENT_DIR: z.string().optional(),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
});

const workerEnv = z.object({
  APP_DATABASE_URL: z.string().min(1),
  GATE_DATABASE_URL: z.string().min(1),
  SMTP_URL: z.string().min(1),
  MAIL_FROM: z.string().default('Espalier <no-reply@espalier.example>'),
  PUBLIC_URL: z.url().default('http://localhost:4600'),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
});

export type WebEnv = z.output<typeof webEnv>;
export type WorkerEnv = z.output<typeof workerEnv>;

/** The environment is read here, once per entry point; a value that does not fit ends the start with its name. */
export const readWebEnv = (from: NodeJS.ProcessEnv): WebEnv => webEnv.parse(from);
export const readWorkerEnv = (from: NodeJS.ProcessEnv): WorkerEnv => workerEnv.parse(from);
