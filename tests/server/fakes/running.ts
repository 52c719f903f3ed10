import { mkdtempSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { openFakes } from '#server/fakes/fakes.ts';
import type { Sent } from '#server/fakes/sent.ts';

export type FakeDevice = { endpoint: string; p256dh: string; auth: string };

export type RunningFakes = {
  url: string;
  smtpUrl: string;
  /** What went wrong inside them, which no test expects. */
  errors: unknown[];
  post: (path: string, body?: unknown) => Promise<Response>;
  sent: <Kind extends Sent['kind']>(kind: Kind) => Promise<Extract<Sent, { kind: Kind }>[]>;
  addDevice: () => Promise<FakeDevice>;
  /** Down from now on, or up again. */
  refuse: (channel: 'mail' | 'push' | 'gateway', status: number | null) => Promise<void>;
  stop: () => Promise<void>;
};

export const fakeAccount = {
  accountSid: 'AC0123456789abcdef0123456789abcdef',
  authToken: 'the-token-of-the-fake-gateway',
};

/** The fakes in this process, on free ports of loopback. */
export const startFakes = async (): Promise<RunningFakes> => {
  const folder = mkdtempSync(join(tmpdir(), 'espalier-fakes-'));
  const errors: unknown[] = [];
  const { smtp, http } = openFakes({
    folder,
    telephone: fakeAccount,
    onError: (error) => errors.push(error),
  });
  await new Promise<void>((resolve) => smtp.listen(0, '127.0.0.1', () => resolve()));
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', () => resolve()));
  const url = `http://127.0.0.1:${(http.address() as AddressInfo).port}`;
  const post = (path: string, body?: unknown) =>
    fetch(new URL(path, url), {
      method: 'POST',
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
  return {
    url,
    smtpUrl: `smtp://127.0.0.1:${(smtp.server.address() as AddressInfo).port}`,
    errors,
    post,
    sent: async (kind) => {
      const all = (await (await fetch(new URL('/sent', url))).json()) as Sent[];
      return all.filter((one): one is Extract<Sent, { kind: typeof kind }> => one.kind === kind);
    },
    addDevice: async () => (await (await post('/push-devices')).json()) as FakeDevice,
    refuse: async (channel, status) => {
      const until = new Date(status === null ? 0 : Date.now() + 3_600_000).toISOString();
      const answer = await post('/refuse', { channel, until, status: status ?? 503 });
      if (!answer.ok) throw new Error(`The fake did not take it: ${answer.status}`);
    },
    stop: async () => {
      http.closeAllConnections();
      await new Promise((resolve) => http.close(resolve));
      await new Promise<void>((resolve) => smtp.close(() => resolve()));
      rmSync(folder, { recursive: true });
    },
  };
};
