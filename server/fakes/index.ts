import { pino } from 'pino';
import { z } from 'zod';
import { endWithParent } from '#server/process/parent.ts';
import { openFakes } from './fakes.ts';

const env = z
  .object({
    SMTP_PORT: z.coerce.number().int(),
    OUTBOX_PORT: z.coerce.number().int(),
    FAKES_DIR: z.string().min(1),
    TWILIO_ACCOUNT_SID: z.string().min(1),
    TWILIO_AUTH_TOKEN: z.string().min(1),
  })
  .parse(process.env);

const log = pino({ name: 'fakes' });
const { smtp, http } = openFakes({
  folder: env.FAKES_DIR,
  telephone: { accountSid: env.TWILIO_ACCOUNT_SID, authToken: env.TWILIO_AUTH_TOKEN },
  onError: (error) => log.warn({ error: error instanceof Error ? error.message : error }, 'a request failed'),
});

function end(): void {
  http.closeAllConnections();
  http.close(() => smtp.close(() => process.exit(0)));
}

process.once('SIGTERM', end);
endWithParent();
smtp.listen(env.SMTP_PORT, '127.0.0.1', () => {
  http.listen(env.OUTBOX_PORT, '127.0.0.1', () => log.info('fakes ready'));
});
