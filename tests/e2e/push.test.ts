import { expect, type Browser, type Page } from '@playwright/test';
import { idOf } from '#server/demo/random.ts';
import type { endOtherSessions } from '#shared/accounts/contract.ts';
import { test } from '#tests/support/e2e.ts';
import type { Product } from '#tests/support/product.ts';
import { pushNumber } from './outbox.ts';
import { callAs } from './own-session.ts';
import { desk, phone, signIn, watch } from './people.ts';
import { turnPushOn, wakeAtAnyHour, withPushService } from './push-device.ts';
import { clickNotification, deliverPush, shownOn } from './shown-notifications.ts';

/** Noor, signed in once for all of them. */
let noor: Page;
let noorsComplaints: string[];

test.beforeAll(async ({ browser, product }) => {
  noor = await browser.newPage({ baseURL: product.url, viewport: desk, reducedMotion: 'reduce' });
  noorsComplaints = (await watch(noor)).complaints;
  await signIn(noor, product, 'Noor Haddad');
});
test.afterAll(async () => {
  expect(noorsComplaints).toEqual([]);
  await noor.close();
});

/** A patient's phone on which push was just turned on. */
const wokenPhone = async (browser: Browser, product: Product, name: string, expected: RegExp[] = []) => {
  const context = await browser.newContext({
    baseURL: product.url,
    viewport: phone,
    reducedMotion: 'reduce',
  });
  const device = await withPushService(context, product);
  const page = await context.newPage();
  const { complaints } = await watch(page, expected);
  await signIn(page, product, name);
  await wakeAtAnyHour(page, product);
  await turnPushOn(page);
  return { context, page, device, complaints };
};

const answerAsNoor = async (thread: string, patient: string, text: string) => {
  await noor.goto(`/clinic/messages/${thread}`);
  await noor.getByRole('textbox', { name: `Write to ${patient}` }).fill(text);
  await noor.getByRole('button', { name: 'Send' }).click();
  await expect(noor.getByText(text).first()).toBeVisible();
};

const neutral = { title: 'Espalier', body: 'A new message is waiting for you.' };

test('the test of a device arrives there, encrypted for it and saying nothing', async ({
  browser,
  product,
}) => {
  const { context, page, device, complaints } = await wokenPhone(browser, product, 'Ines Valcourt');
  await page.getByRole('button', { name: /^Send a test to / }).click();
  await expect(page.getByText('A test is on its way.', { exact: false })).toBeVisible();
  const { payload, read } = await pushNumber(product, device.id(), 1);
  expect(read).toMatchObject({
    kind: 'test',
    title: 'Espalier',
    body: 'This is a test. If you can read or hear it, it works.',
    path: '/account/notifications',
  });
  // The fake has decrypted it with the device's own keys, and so the outbox can show it.
  await page.goto('/outbox?kind=push');
  await expect(page.getByText(`device ${device.id()}`)).toBeVisible();
  await expect(page.getByText(read.body)).toBeVisible();

  await page.goto('/account/notifications');
  await deliverPush(page, product, payload);
  expect(await shownOn(page)).toEqual([{ title: read.title, body: read.body }]);
  expect(complaints).toEqual([]);
  await context.close();
});

test('the clinic’s answer wakes the phone with words that name nobody and nothing, and a click opens it', async ({
  browser,
  product,
}) => {
  const thread = idOf('thread', 'Tobias Ahlgren', 'Getting in and out of the car');
  const { context, page, device, complaints } = await wokenPhone(browser, product, 'Tobias Ahlgren');
  await page.goto('/today');
  await expect(page.getByRole('heading', { name: /, Tobias$/ })).toBeVisible();
  const words = 'Sit down first, then turn with both legs. Keep the sling on.';
  await answerAsNoor(thread, 'Tobias Ahlgren', words);

  const { payload, read } = await pushNumber(product, device.id(), 1);
  expect(read).toMatchObject({ ...neutral, path: `/messages/${thread}` });
  expect(payload).not.toMatch(/Tobias|Ahlgren|Noor|Haddad|Orchard|car\b|sling|legs|shoulder|pain|surgery/i);
  await deliverPush(page, product, payload);
  expect(await shownOn(page)).toEqual([neutral]);

  const brought = await clickNotification(context);
  await expect(page).toHaveURL(`${product.url}/messages/${thread}`);
  expect(brought).toEqual([`${product.url}/messages/${thread}`]);
  await expect(page.getByRole('heading', { level: 1, name: 'Getting in and out of the car' })).toBeVisible();
  await expect(page.getByText(words)).toBeVisible();
  expect(await shownOn(page)).toEqual([]);
  expect(complaints).toEqual([]);
  await context.close();
});

test('where the session has ended in the meantime, the click leads through the sign-in to the thread', async ({
  browser,
  product,
}) => {
  const name = 'Hal Brandvold';
  const thread = idOf('thread', name, 'Next visit');
  // What the page asks for once its session is over is refused.
  const { context, page, device, complaints } = await wokenPhone(browser, product, name, [/status of 401/]);
  await page.goto('/today');
  await expect(page.getByRole('heading', { name: /, Hal$/ })).toBeVisible();
  const words = 'Thursday at ten is fine.';
  await answerAsNoor(thread, name, words);
  const { payload } = await pushNumber(product, device.id(), 1);
  await deliverPush(page, product, payload);
  expect(await shownOn(page)).toEqual([neutral]);

  // He signs the phone out from another device.
  const other = await browser.newPage({ baseURL: product.url, viewport: desk });
  await signIn(other, product, name);
  await callAs<typeof endOtherSessions>(other, product, 'delete', '/api/sessions', {});
  await other.close();
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();

  await clickNotification(context);
  await expect(page).toHaveURL(`${product.url}/sign-in?then=${encodeURIComponent(`/messages/${thread}`)}`);
  await expect(page.getByText(words)).toHaveCount(0);
  const account = product.accounts.find(({ who }) => who.startsWith(name))!;
  await page.getByLabel('E-mail').fill(account.email);
  await page.getByLabel('Password', { exact: true }).fill(account.password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await expect(page).toHaveURL(`${product.url}/messages/${thread}`);
  await expect(page.getByRole('heading', { level: 1, name: 'Next visit' })).toBeVisible();
  await expect(page.getByText(words)).toBeVisible();
  expect(complaints).toEqual([]);
  await context.close();
});
