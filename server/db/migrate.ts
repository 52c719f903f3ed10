import { fileURLToPath } from 'node:url';
import { z } from 'zod';
import { migrateDatabase } from './migrations.ts';

const env = z
  .object({
    OWNER_DATABASE_URL: z.string().min(1),
    APP_DATABASE_PASSWORD: z.string().min(1),
    GATE_DATABASE_PASSWORD: z.string().min(1),
    /** Beside the sources by default; a bundle lies two folders below the top. */
    MIGRATIONS_DIR: z.string().default(fileURLToPath(new URL('../../drizzle', import.meta.url))),
  })
  .parse(process.env);

await migrateDatabase(
  env.OWNER_DATABASE_URL,
  { app: env.APP_DATABASE_PASSWORD, gate: env.GATE_DATABASE_PASSWORD },
  env.MIGRATIONS_DIR,
);
