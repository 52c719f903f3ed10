import { expect, type Page } from '@playwright/test';
import type { getSession } from '#shared/accounts/contract.ts';
import type { Contract, OutputOf, RequestOf } from '#shared/http/contract.ts';
import type { Product } from '#tests/support/product.ts';

/**
 * Calls a route as whoever is signed in on this page, with its cookie and write token: for what a test needs done
 * and does not look at.
 */
export const callAs = async <C extends Contract>(
  page: Page,
  { url }: Product,
  method: C['method'],
  path: C['path'],
  input: RequestOf<C>,
): Promise<OutputOf<C>> => {
  const { params = {}, body } = input as { params?: Record<string, string>; body?: unknown };
  const address = path.replaceAll(/:(\w+)/g, (_whole, name: string) => params[name] ?? '');
  const session = await page.request.get(`${url}/api/session`);
  const { me } = (await session.json()) as OutputOf<typeof getSession>;
  const answer = await page.request.fetch(`${url}${address}`, {
    method,
    headers: { origin: url, 'x-espalier-session': me?.writeToken ?? '' },
    ...(body === undefined ? {} : { data: body }),
  });
  const text = await answer.text();
  expect(answer.ok(), `${method} ${path}: ${text}`).toBe(true);
  return (text === '' ? undefined : JSON.parse(text)) as OutputOf<C>;
};
