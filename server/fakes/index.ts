import type { IncomingMessage, ServerResponse } from 'node:http';
import { createServer } from 'node:http';
import { json as readJson } from 'node:stream/consumers';
import { pino } from 'pino';
import { z } from 'zod';
import { endWithParent } from '#server/process/parent.ts';
import { openMailFile } from './mail-file.ts';
import { smtpFake } from './smtp.ts';

const env = z
  .object({
    SMTP_PORT: z.coerce.number().int(),
    OUTBOX_PORT: z.coerce.number().int(),
    FAKES_DIR: z.string().min(1),
  })
  .parse(process.env);
const refusal = z.object({ until: z.iso.datetime() });

const log = pino({ name: 'fakes' });
const mails = openMailFile(env.FAKES_DIR);
let refusesUntilMs = 0;

const smtp = smtpFake({ receive: mails.add, refusesUntilMs: () => refusesUntilMs });
smtp.on('error', (error) => log.warn({ error: error.message }, 'SMTP connection failed'));

function answer(response: ServerResponse, status: number, body: unknown): void {
  response.writeHead(status, { 'content-type': 'application/json' }).end(JSON.stringify(body));
}

async function handle(request: IncomingMessage, response: ServerResponse): Promise<void> {
  switch (`${request.method} ${request.url}`) {
    case 'GET /':
      return answer(response, 200, { status: 'ok' });
    case 'GET /mails':
      return answer(response, 200, mails.newestFirst());
    case 'POST /refuse': {
      const asked = refusal.safeParse(await readJson(request).catch(() => null));
      if (!asked.success)
        return answer(response, 400, { detail: 'Give "until" as an ISO 8601 instant in UTC.' });
      refusesUntilMs = Date.parse(asked.data.until);
      return answer(response, 200, asked.data);
    }
    default:
      return answer(response, 404, { detail: 'There is no such page.' });
  }
}

const outbox = createServer((request, response) => {
  handle(request, response).catch((error: unknown) => {
    log.error({ error }, 'a request failed');
    response.destroy();
  });
});

function end(): void {
  outbox.closeAllConnections();
  outbox.close(() => smtp.close(() => process.exit(0)));
}

process.once('SIGTERM', end);
endWithParent();
smtp.listen(env.SMTP_PORT, '127.0.0.1', () => {
  outbox.listen(env.OUTBOX_PORT, '127.0.0.1', () => log.info('fakes ready'));
});
