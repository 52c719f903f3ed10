import { randomUUID } from 'node:crypto';
import { createServer, type IncomingMessage, type Server } from 'node:http';
import { join } from 'node:path';
import type { SMTPServer } from 'smtp-server';
import { z } from 'zod';
import { openLinesFile } from './lines-file.ts';
import { pushService } from './push-service.ts';
import { openRefusals } from './refusals.ts';
import { jsonOf, notThere, type FakeAnswer } from './requests.ts';
import type { Sent } from './sent.ts';
import { smtpFake } from './smtp.ts';
import { telephoneService, type TelephoneAccount } from './telephone-service.ts';

type FakesOptions = {
  /** Where they keep what arrived, so that a restart still shows it. */
  folder: string;
  telephone: TelephoneAccount;
  onError: (error: unknown) => void;
};

const key = z.object({ digit: z.string().regex(/^[0-9*#]$/) });

/** Mail server, push service and telephone gateway for a machine of one's own: nothing leaves it. */
export function openFakes({ folder, telephone, onError }: FakesOptions): { smtp: SMTPServer; http: Server } {
  const sent = openLinesFile<Sent>(join(folder, 'sent.jsonl'));
  const refusals = openRefusals();
  const push = pushService({ folder, refusals, keep: sent.put });
  const gateway = telephoneService(telephone, { refusals, keep: sent.put, find: sent.get });
  const smtp = smtpFake({
    receive: (mail) => sent.put({ kind: 'mail', id: randomUUID(), ...mail }),
    refusesUntilMs: () => refusals.untilMs('mail'),
  });
  smtp.on('error', onError);

  async function handle(request: IncomingMessage): Promise<FakeAnswer> {
    const asked = `${request.method} ${request.url}`;
    const [, first = '', second = '', third = ''] = (request.url ?? '').split('/');
    if (asked === 'GET /') return { status: 200, body: { status: 'ok' } };
    if (asked === 'GET /sent') return { status: 200, body: sent.newestFirst() };
    if (request.method !== 'POST') return notThere;
    if (asked === 'POST /refuse') {
      const set = refusals.set(await jsonOf(request));
      if (set) return { status: 200, body: set };
      return { status: 400, body: { detail: 'Give "until" as an ISO 8601 instant in UTC.' } };
    }
    if (asked === 'POST /push-devices') return push.addDevice();
    if (first === 'push') return push.receive(second, request);
    if (first === 'calls' && third === 'keys') {
      const pressed = key.safeParse(await jsonOf(request));
      return pressed.success ? gateway.pressKey(second, pressed.data.digit) : { status: 400 };
    }
    if (first === 'calls' && third === 'ring-out') return gateway.ringOut(second);
    const [, sid, what] =
      /^\/2010-04-01\/Accounts\/(\w+)\/(Calls|Messages)\.json$/.exec(request.url ?? '') ?? [];
    return sid && what ? gateway.create(sid, what, request) : notThere;
  }

  const http = createServer((request, response) => {
    handle(request)
      .then(({ status, body }) => {
        response.writeHead(status, body === undefined ? {} : { 'content-type': 'application/json' });
        response.end(body === undefined ? undefined : JSON.stringify(body));
      })
      .catch((error: unknown) => {
        onError(error);
        response.writeHead(500).end();
      });
  });
  return { smtp, http };
}
