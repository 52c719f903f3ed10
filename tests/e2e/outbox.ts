import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect } from '@playwright/test';
import type { Sent, SentMail, SentPush } from '#server/fakes/sent.ts';
import type { Product } from '#tests/support/product.ts';

/** All that the product has sent so far, oldest first, as the fakes keep it. */
const sentBy = ({ local }: Product): Sent[] =>
  readFileSync(join(local, 'fakes', 'sent.jsonl'), 'utf8')
    .split('\n')
    // The last line may be half written.
    .slice(0, -1)
    .filter((line) => line !== '')
    .map((line) => JSON.parse(line) as Sent);

/** The link of the first mail of a subject that reaches this address. */
export const linkMailedTo = async (product: Product, address: string, subject: string): Promise<string> => {
  const mails = () =>
    sentBy(product).filter(
      (sent): sent is SentMail =>
        sent.kind === 'mail' && sent.to.includes(address) && sent.subject === subject,
    );
  await expect.poll(() => mails().length, { timeout: 20_000 }).toBeGreaterThan(0);
  return /https?:\/\/\S+/.exec(mails()[0]?.text ?? '')?.[0] ?? '';
};

type ReadPush = { kind: string; title: string; body: string; path: string };

/** The pushes that a device of the fake service has got, oldest first, decrypted. */
export const pushesOf = (product: Product, deviceId: string): { payload: string; read: ReadPush }[] =>
  sentBy(product)
    .filter((sent): sent is SentPush => sent.kind === 'push' && sent.deviceId === deviceId)
    .map(({ payload }) => ({ payload: payload ?? '', read: JSON.parse(payload ?? '{}') as ReadPush }));

/** Waits for the device's push of that number, counted from 1, and gives it. */
export const pushNumber = async (product: Product, deviceId: string, number: number) => {
  await expect.poll(() => pushesOf(product, deviceId).length, { timeout: 20_000 }).toBe(number);
  return pushesOf(product, deviceId)[number - 1]!;
};
