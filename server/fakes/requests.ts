import type { IncomingMessage } from 'node:http';
import { buffer } from 'node:stream/consumers';

/** What a fake answers: a status, and JSON or nothing. */
export type FakeAnswer = { status: number; body?: unknown };

export const notThere: FakeAnswer = { status: 404, body: { detail: 'There is no such page.' } };

/** The JSON that was sent; null where it is none. */
export async function jsonOf(request: IncomingMessage): Promise<unknown> {
  const text = (await buffer(request)).toString('utf8');
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

export const headerOf = (request: IncomingMessage, name: string): string =>
  [request.headers[name] ?? ''].flat().join(', ');
