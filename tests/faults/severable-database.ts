import { connect, createServer, type AddressInfo, type Socket } from 'node:net';
import { openPools, closePools } from '#server/db/pools.ts';
import { silentLog, type TestDatabase } from '#tests/support/database.ts';

export type SeverableDatabase = TestDatabase & {
  /** Every connection breaks, and new ones are refused. */
  sever: () => Promise<void>;
  restore: () => Promise<void>;
  close: () => Promise<void>;
};

/** The product's way to a database through a port that can be closed, as when the server goes down. */
export const severable = async (database: TestDatabase): Promise<SeverableDatabase> => {
  const target = new URL(database.urls.app);
  const open = new Set<Socket>();
  const server = createServer((incoming) => {
    const outgoing = connect(Number(target.port), target.hostname);
    for (const [from, to] of [
      [incoming, outgoing],
      [outgoing, incoming],
    ] as const) {
      open.add(from);
      from.pipe(to);
      // Either end may break at any time; the other one then goes too.
      from.on('error', () => to.destroy());
      from.on('close', () => {
        open.delete(from);
        to.destroy();
      });
    }
  });
  const listen = (port: number) => new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve));
  await listen(0);
  const { port } = server.address() as AddressInfo;
  const through = (url: string): string => {
    const changed = new URL(url);
    changed.hostname = '127.0.0.1';
    changed.port = String(port);
    return changed.href;
  };
  const urls = { ...database.urls, app: through(database.urls.app), gate: through(database.urls.gate) };
  const pools = openPools(urls, silentLog);
  const sever = () =>
    new Promise<void>((resolve) => {
      server.close(() => resolve());
      for (const socket of open) socket.destroy();
    });
  return {
    ...database,
    urls,
    pools,
    sever,
    restore: () => listen(port),
    close: async () => {
      await closePools(pools);
      if (server.listening) await sever();
    },
  };
};
