import { randomInt } from 'node:crypto';
import { createServer } from 'node:net';

/** Linux hands out 32768 and above to outgoing connections, so a port of ours below is never taken by chance. */
const LOWEST_PORT = 20_000;
const HIGHEST_PORT = 32_000;

export function portIsFree(port, host = '127.0.0.1') {
  return new Promise((resolve) => {
    const server = createServer();
    server.once('error', () => resolve(false));
    server.listen({ port, host, exclusive: true }, () => server.close(() => resolve(true)));
  });
}

/** A port on loopback that nobody listens on now. */
export async function freePort() {
  for (;;) {
    const port = randomInt(LOWEST_PORT, HIGHEST_PORT);
    if (await portIsFree(port)) return port;
  }
}
