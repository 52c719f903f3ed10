import { randomUUID } from 'node:crypto';
import { expect, type Page } from '@playwright/test';
import { idOf } from '#server/demo/random.ts';
import type { getSession } from '#shared/accounts/contract.ts';
import type { OutputOf } from '#shared/http/contract.ts';
import type { listPushSubscriptions } from '#shared/notifications/contract.ts';
import type { postMessage } from '#shared/threads/contract.ts';
import { test } from '#tests/support/e2e.ts';
import type { Product } from '#tests/support/product.ts';
import { pushesOf, pushNumber } from './outbox.ts';
import { callAs } from './own-session.ts';
import { desk, phone, signIn, watch } from './people.ts';
import { turnPushOn, wakeAtAnyHour, withPushService } from './push-device.ts';

// A browser keeps whole pages for its back button; Playwright turns that off unless it is asked not to.
test.use({
  launchOptions: [
    async ({ launchOptions }, use) =>
      use({ ...launchOptions, ignoreDefaultArgs: ['--disable-back-forward-cache'] }),
    { scope: 'worker' },
  ],
});

// Many screens in one walk.
test.describe.configure({ timeout: 180_000 });

/** Noor, signed in once for all of them. */
let noor: Page;
let noorsComplaints: string[];

test.beforeAll(async ({ browser, product }) => {
  noor = await browser.newPage({ baseURL: product.url, viewport: desk });
  noorsComplaints = (await watch(noor)).complaints;
  await signIn(noor, product, 'Noor Haddad');
});
test.afterAll(async () => {
  expect(noorsComplaints).toEqual([]);
  await noor.close();
});

const writeAsNoor = (product: Product, threadId: string, text: string) =>
  callAs<typeof postMessage>(noor, product, 'post', '/api/threads/:threadId/messages', {
    params: { threadId },
    body: { id: randomUUID(), text },
  });

const subscriptionsOf = async (page: Page, product: Product) => {
  const { subscriptions } = await callAs<typeof listPushSubscriptions>(
    page,
    product,
    'get',
    '/api/push-subscriptions',
    {},
  );
  return subscriptions.map(({ current }) => ({ current }));
};

/** All that this site keeps in the browser of a page. */
const keptIn = (page: Page) =>
  page.evaluate(async () => ({
    localStorage: Object.keys(localStorage),
    sessionStorage: Object.keys(sessionStorage),
    databases: (await indexedDB.databases()).map(({ name }) => name),
    caches: await caches.keys(),
    serviceWorkers: (await navigator.serviceWorker.getRegistrations()).map(({ scope }) => scope),
  }));

const nothing = { localStorage: [], sessionStorage: [], databases: [], caches: [], serviceWorkers: [] };

test('after a sign-out a shared device shows nothing of the person, and wakes for them no more', async ({
  browser,
  product,
}) => {
  const thread = idOf('thread', 'Ines Valcourt', 'Damp dressing');
  const context = await browser.newContext({
    baseURL: product.url,
    viewport: phone,
    reducedMotion: 'reduce',
  });
  const shared = await withPushService(context, product);
  const page = await context.newPage();
  const { complaints } = await watch(page);
  const ownContext = await browser.newContext({ baseURL: product.url, viewport: phone });
  const own = await withPushService(ownContext, product);
  const ownPage = await ownContext.newPage();
  await signIn(ownPage, product, 'Ines Valcourt');
  await wakeAtAnyHour(ownPage, product);
  await turnPushOn(ownPage);

  await signIn(page, product, 'Ines Valcourt');
  await turnPushOn(page);
  await page.goto('/today');
  await expect(page.getByRole('heading', { name: /^Good .*, Ines$/ })).toBeVisible();
  await page.getByRole('link', { name: /^Messages/ }).click();
  await page.getByRole('link', { name: /Damp dressing/ }).click();
  await expect(page.getByText('The dressing was damp', { exact: false })).toBeVisible();
  await page.getByRole('link', { name: 'Today' }).click();
  await page.getByRole('link', { name: 'Start today’s check-in' }).click();
  await page.getByRole('button', { name: '4', exact: true }).click();
  await page.getByRole('heading', { name: /worst pain/ }).waitFor();
  await page.getByRole('button', { name: '6', exact: true }).click();
  await page.getByRole('heading', { name: /swelling/ }).waitFor();

  // Until then everything is there that must be gone afterwards, and a message wakes both devices.
  const before = await keptIn(page);
  expect(before.localStorage).toContain('espalier-push');
  expect(before.sessionStorage.join()).toContain('check-in');
  expect(before.serviceWorkers).toHaveLength(1);
  expect(await subscriptionsOf(page, product)).toHaveLength(2);
  await writeAsNoor(product, thread, 'Please keep it dry today.');
  await pushNumber(product, shared.id(), 1);
  await pushNumber(product, own.id(), 1);

  await page.goto('/today');
  await expect(page.getByRole('link', { name: 'Go on with your check-in' })).toBeVisible();
  await page.getByRole('button', { name: /Your account/ }).click();
  await page.getByRole('button', { name: 'Sign out' }).click();
  await page.getByRole('button', { name: 'Discard it and sign out' }).click();
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();

  expect(await keptIn(page)).toEqual(nothing);
  expect(shared.held()).toBeNull();
  const session = await page.request.get(`${product.url}/api/session`);
  expect(((await session.json()) as OutputOf<typeof getSession>).me).toBeNull();

  // Every step back through what she opened, up to the empty page of a new tab, ends at the sign-in.
  const steps = await page.evaluate(() => history.length - 1);
  expect(steps).toBeGreaterThan(4);
  for (let step = 1; step <= steps; step += 1) {
    await page.goBack();
    if (step === steps && page.url() === 'about:blank') break;
    await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
    await expect(page.getByText(/Ines|Damp dressing|was damp|Hold off/)).toHaveCount(0);
  }
  await page.goto('/today');
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
  expect(await keptIn(page)).toEqual(nothing);

  // The server knows only the device that is hers, and a new message goes there and nowhere else.
  expect(await subscriptionsOf(ownPage, product)).toEqual([{ current: true }]);
  await writeAsNoor(product, thread, 'And tell me how it looks tonight.');
  await pushNumber(product, own.id(), 2);
  expect(pushesOf(product, shared.id())).toHaveLength(1);

  // Whoever comes next sees what is theirs.
  await signIn(page, product, 'Soledad Quiroga');
  await expect(page.getByRole('heading', { name: /^Good .*, Soledad$/ })).toBeVisible();
  await page.getByRole('link', { name: /^Messages/ }).click();
  await expect(page.getByRole('link', { name: /Sleeping in the recliner/ })).toBeVisible();
  await expect(page.getByText(/Ines|Damp dressing/)).toHaveCount(0);
  await page.getByRole('link', { name: 'Today' }).click();
  await expect(page.getByRole('heading', { name: 'Hold off for now' })).toBeVisible();
  await expect(page.getByText(/Ines|Go on with your check-in/)).toHaveCount(0);
  await page.goto('/account/notifications');
  await expect(page.getByText('Notices are off for this device.')).toBeVisible();
  expect(await subscriptionsOf(page, product)).toEqual([]);
  await expect(page.getByText('Ines')).toHaveCount(0);
  expect(pushesOf(product, shared.id())).toHaveLength(1);

  expect(complaints).toEqual([]);
  await context.close();
  await ownContext.close();
});

test('who signs in where somebody else still was ends that session, and leaves nothing of their push', async ({
  browser,
  product,
}) => {
  const thread = idOf('thread', 'Tobias Ahlgren', 'Getting in and out of the car');
  const ownContext = await browser.newContext({ baseURL: product.url, viewport: phone });
  const own = await withPushService(ownContext, product);
  const ownPage = await ownContext.newPage();
  await signIn(ownPage, product, 'Tobias Ahlgren');
  await wakeAtAnyHour(ownPage, product);
  await turnPushOn(ownPage);

  const context = await browser.newContext({
    baseURL: product.url,
    viewport: phone,
    reducedMotion: 'reduce',
  });
  const shared = await withPushService(context, product);
  // The sign-in page was left open in another tab before he came.
  const other = await context.newPage();
  const othersWatch = await watch(other);
  await other.goto('/sign-in');
  await other.getByLabel('E-mail').waitFor();
  const page = await context.newPage();
  const { complaints } = await watch(page);
  await signIn(page, product, 'Tobias Ahlgren');
  await turnPushOn(page);
  expect(await subscriptionsOf(ownPage, product)).toHaveLength(2);
  await writeAsNoor(product, thread, 'Sit down first.');
  await pushNumber(product, shared.id(), 1);

  const hal = product.accounts.find(({ who }) => who.startsWith('Hal'))!;
  await other.getByLabel('E-mail').fill(hal.email);
  await other.getByLabel('Password', { exact: true }).fill(hal.password);
  await other.getByRole('button', { name: 'Sign in', exact: true }).click();
  await expect(other.getByRole('heading', { name: /^Good .*, Hal$/ })).toBeVisible();
  // The first one's tab does not stay open with what it showed: it is the next one's as well.
  for (const tab of [other, page]) {
    await expect(tab.getByRole('button', { name: 'Your account: Hal Brandvold' })).toBeVisible();
    await expect(tab.getByText('Tobias')).toHaveCount(0);
  }

  await expect.poll(() => shared.held()).toBeNull();
  expect((await keptIn(other)).localStorage).not.toContain('espalier-push');
  expect(await subscriptionsOf(other, product)).toEqual([]);
  expect(await subscriptionsOf(ownPage, product)).toEqual([{ current: true }]);
  await writeAsNoor(product, thread, 'Then turn with both legs.');
  await pushNumber(product, own.id(), 2);
  expect(pushesOf(product, shared.id())).toHaveLength(1);
  await other.goto('/account/notifications');
  await expect(other.getByText('Notices are off for this device.')).toBeVisible();

  expect(complaints).toEqual([]);
  expect(othersWatch.complaints).toEqual([]);
  await context.close();
  await ownContext.close();
});
