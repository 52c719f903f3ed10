import { randomUUID } from 'node:crypto';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { io, type Socket } from 'socket.io-client';
import type { Me, SignInStep } from '#shared/accounts/contract.ts';
import type { Method } from '#shared/http/contract.ts';
import { hintEvent, sessionEndedEvent, type Hint } from '#shared/realtime/hints.ts';
import { createApp } from '#server/app.ts';
import { codeHashOf } from '#server/features/accounts/one-time-tokens.ts';
import { listenForHints } from '#server/realtime/bridge.ts';
import { openSockets } from '#server/realtime/sockets.ts';
import { testPassword } from './clinic.ts';
import { testSecrets } from './secrets.ts';
import { silentLog, type TestDatabase } from './database.ts';

export type Answer = { status: number; headers: Headers; body: unknown; text: string };

export type TestWeb = {
  url: string;
  anonymous: () => TestBrowser;
  signIn: (person: { email: string }) => Promise<TestBrowser>;
  stop: () => Promise<void>;
};

export type TestBrowser = {
  me: Me | null;
  cookie: string;
  /** `headers` win over what a well-behaved page sends. */
  call: (method: Method, path: string, body?: unknown, headers?: Record<string, string>) => Promise<Answer>;
  /** A socket with this browser's session, and every hint that reaches it. */
  socket: () => Promise<{
    socket: Socket;
    hints: Hint[];
    nextHint: (fits: (hint: Hint) => boolean) => Promise<Hint>;
    ended: Promise<void>;
  }>;
};

/** Plants a recovery code for whoever has a second factor, and gives it. */
const giveRecoveryCode = async (
  { asSuperuser }: TestDatabase,
  browser: TestBrowser,
  email: string,
  pendingId: string,
): Promise<void> => {
  const code = randomUUID();
  await asSuperuser.query(
    `insert into recovery_codes (clinic_id, person_id, code_hash)
     select clinic_id, person_id, $2 from credentials where email = $1`,
    [email, codeHashOf(testSecrets.sealSecret, code)],
  );
  const answer = { way: 'recovery-code', code };
  const given = await browser.call('post', '/api/session/second-factor', { pendingId, answer });
  if (given.status !== 201) throw new Error(`The second factor failed: ${given.status} ${given.text}`);
};

/** A whole web in this process, over a test's own database, with a clock that the test may move. */
export const startWeb = async (
  database: TestDatabase,
  options: { clock?: () => Date; buildId?: string } = {},
): Promise<TestWeb> => {
  const { pools, urls } = database;
  const clock = options.clock ?? (() => new Date());
  const server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const url = `http://localhost:${(server.address() as AddressInfo).port}`;
  const { app, identity } = createApp({
    pools,
    clock,
    log: silentLog,
    publicUrl: url,
    sessionSecret: 'test-session-secret-of-32-characters',
    ...testSecrets,
    buildId: options.buildId ?? 'test',
  });
  server.on('request', app);
  const sockets = openSockets(server, { pools, clock, publicUrl: url, identity, log: silentLog });
  const hints = listenForHints(
    urls.app,
    { onAnnouncement: sockets.deliver, onGap: sockets.deliverGap },
    silentLog,
  );
  await hints.ready;
  const openedSockets: Socket[] = [];

  const browser = (): TestBrowser => {
    const self: TestBrowser = {
      me: null,
      cookie: '',
      call: async (method, path, body, headers = {}) => {
        const answer = await fetch(new URL(path, url), {
          method: method.toUpperCase(),
          headers: {
            ...(self.cookie ? { cookie: self.cookie } : {}),
            ...(method === 'get' ? {} : { origin: url }),
            ...(body === undefined ? {} : { 'content-type': 'application/json' }),
            ...(self.me ? { 'x-espalier-session': self.me.writeToken } : {}),
            ...headers,
          },
          ...(body === undefined ? {} : { body: typeof body === 'string' ? body : JSON.stringify(body) }),
        });
        const setCookie = answer.headers.getSetCookie()[0];
        if (setCookie) self.cookie = setCookie.split(';')[0] ?? '';
        const text = await answer.text();
        const isJson = answer.headers.get('content-type')?.includes('json') ?? false;
        return {
          status: answer.status,
          headers: answer.headers,
          text,
          body: isJson ? JSON.parse(text) : null,
        };
      },
      socket: async () => {
        const received: Hint[] = [];
        const waiting: { fits: (hint: Hint) => boolean; resolve: (hint: Hint) => void }[] = [];
        const socket = io(url, {
          extraHeaders: { cookie: self.cookie, origin: url },
          transports: ['websocket'],
          reconnection: false,
          forceNew: true,
        });
        openedSockets.push(socket);
        socket.on(hintEvent, (hint: Hint) => {
          received.push(hint);
          for (const one of waiting.filter(({ fits }) => fits(hint))) one.resolve(hint);
        });
        const ended = new Promise<void>((resolve) => {
          socket.on(sessionEndedEvent, () => resolve());
          socket.on('disconnect', () => resolve());
        });
        await new Promise<void>((resolve, reject) => {
          socket.on('connect', resolve);
          socket.on('connect_error', reject);
        });
        return {
          socket,
          hints: received,
          ended,
          nextHint: (fits) =>
            new Promise((resolve) => {
              const early = received.find(fits);
              if (early) resolve(early);
              else waiting.push({ fits, resolve });
            }),
        };
      },
    };
    return self;
  };

  return {
    url,
    anonymous: browser,
    signIn: async ({ email }) => {
      const self = browser();
      const answer = await self.call('post', '/api/session', { email, password: testPassword });
      if (answer.status !== 201) throw new Error(`Signing in failed: ${answer.status} ${answer.text}`);
      const step = answer.body as SignInStep;
      if (step.next === 'second-factor') await giveRecoveryCode(database, self, email, step.pendingId);
      // The second factor has tests of its own; here staff have given it.
      await database.asSuperuser.query(
        `update signed_in_sessions set second_factor = 'authenticator'
         where second_factor is null and person_id = (select person_id from credentials where email = $1)`,
        [email],
      );
      const session = await self.call('get', '/api/session');
      self.me = (session.body as { me: Me }).me;
      return self;
    },
    stop: async () => {
      for (const socket of openedSockets) socket.disconnect();
      await sockets.close();
      await hints.stop();
    },
  };
};
