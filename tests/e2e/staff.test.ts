import { expect, type Browser, type Page } from '@playwright/test';
import { Secret, TOTP } from 'otpauth';
import { test } from '#tests/support/e2e.ts';
import type { Product } from '#tests/support/product.ts';
import { linkMailedTo } from './outbox.ts';
import { desk, signIn, tick, watch } from './people.ts';
import { ageProofs } from './proof-age.ts';

test.describe.configure({ timeout: 120_000 });

const openDesk = async (browser: Browser, product: Product, expected: RegExp[] = []) => {
  const page = await browser.newPage({ baseURL: product.url, viewport: desk, reducedMotion: 'reduce' });
  return { page, ...(await watch(page, expected)) };
};

/** Each code of an authenticator app counts once, so the administrator signs in once for all tests. */
let joss: Awaited<ReturnType<typeof openDesk>>;

test.beforeAll(async ({ browser, product }) => {
  joss = await openDesk(browser, product);
  await signIn(joss.page, product, 'Joss Amory');
});
test.afterAll(() => joss.page.close());

const toPerson = async (page: Page, name: string) => {
  await page.goto('/clinic/people');
  await page.getByRole('link', { name }).click();
  await expect(page.getByRole('heading', { level: 1, name })).toBeVisible();
};

const colleague = {
  name: 'Wilhelmina Strand',
  email: 'wilhelmina.strand@orchard-lane.example',
  password: 'three lanterns on a quiet quay',
};

test('an invited therapist gets in with a second factor, comes back by a recovery code, and is out within 2 s of being deactivated', async ({
  browser,
  product,
}) => {
  await joss.page.goto('/clinic/people');
  await joss.page.getByRole('button', { name: 'Invite somebody' }).click();
  const form = joss.page.getByRole('dialog', { name: 'Invite somebody' });
  await form.getByLabel('Name').fill(colleague.name);
  await form.getByLabel('Title').fill('DPT');
  await form.getByLabel('E-mail').fill(colleague.email);
  await tick(joss.page, 'Therapist');
  await form.getByRole('button', { name: 'Invite', exact: true }).click();
  await expect(joss.page.getByText(`${colleague.name} is invited.`)).toBeVisible();
  const link = await linkMailedTo(product, colleague.email, 'Espalier: you are invited');

  // What a page had under way when its access ended is refused, and the browser notes that.
  const { page, complaints } = await openDesk(browser, product, [/401/]);
  await page.goto(link);
  await expect(page.getByRole('heading', { name: 'Welcome, Wilhelmina' })).toBeVisible();
  await page.getByRole('button', { name: 'Use a password instead' }).click();
  await page.getByLabel('New password').fill(colleague.password);
  await page.getByRole('button', { name: 'Done, take me in' }).click();

  // Nothing else is open to staff without a second factor.
  await expect(page.getByRole('heading', { name: 'Set up a second step' })).toBeVisible();
  await page.goto('/round');
  await expect(page.getByRole('heading', { name: 'Set up a second step' })).toBeVisible();
  await page.getByRole('button', { name: /An authenticator app/ }).click();
  const key = page.getByText('Or type this key into the app:');
  const secret = (await key.innerText()).replace(/^.*:/, '').replaceAll(/\s/g, '');
  const app = new TOTP({ secret: Secret.fromBase32(secret), digits: 6, period: 30 });
  await page.getByLabel('Then enter the code that the app shows').fill(app.generate());

  await expect(page.getByRole('heading', { name: 'Your recovery codes' })).toBeVisible();
  const codes = await page
    .getByRole('list', { name: 'Recovery codes' })
    .getByRole('listitem')
    .allInnerTexts();
  expect(new Set(codes).size).toBe(10);
  await page.getByRole('button', { name: 'Go on' }).click();
  await expect(page.getByText('Keep the codes first, then tick the box.')).toBeVisible();
  await tick(page, 'I have kept them');
  await page.getByRole('button', { name: 'Go on' }).click();
  await expect(page).toHaveURL(/\/round/);
  await expect(page.getByRole('heading', { level: 1, name: 'Morning round' })).toBeVisible();

  await page.getByRole('button', { name: colleague.name }).click();
  await page.getByRole('menuitem', { name: 'Sign out' }).click();
  await expect(page).toHaveURL(/sign-in/);
  await page.getByLabel('E-mail').fill(colleague.email);
  await page.getByLabel('Password', { exact: true }).fill(colleague.password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.getByRole('button', { name: 'Use a recovery code' }).click();
  await page.getByLabel('Recovery code').fill(codes[0]!);
  await page.getByRole('button', { name: 'Go on' }).click();
  await expect(page).toHaveURL(/\/round/);
  await expect(page.getByRole('heading', { level: 1, name: 'Morning round' })).toBeVisible();

  await toPerson(joss.page, colleague.name);
  await joss.page.getByRole('button', { name: 'Deactivate' }).click();
  const question = joss.page.getByRole('dialog', { name: `End the access of ${colleague.name}` });
  await question.getByLabel('Why?').fill('Has left the clinic.');
  const leftAt = page.waitForURL(/sign-in/).then(() => Date.now());
  const answered = joss.page.waitForResponse(/\/deactivation$/);
  await question.getByRole('button', { name: 'Deactivate' }).click();
  expect((await answered).status()).toBe(200);
  const answeredAt = Date.now();
  expect((await leftAt) - answeredAt).toBeLessThan(2_000);
  await expect(page.getByText('Your session has ended. Please sign in again.')).toBeVisible();
  await expect(joss.page.getByText('Access has ended, on every device.')).toBeVisible();
  await expect(joss.page.getByText('Deactivated: may not sign in.')).toBeVisible();

  await page.getByLabel('E-mail').fill(colleague.email);
  await page.getByLabel('Password', { exact: true }).fill(colleague.password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await expect(page.getByText('That e-mail and password do not match.', { exact: false })).toBeVisible();
  expect(complaints).toEqual([]);
  expect(joss.complaints).toEqual([]);
  await page.close();
});

test('an administrator is not offered to end their own access, and is told whom to ask', async () => {
  await toPerson(joss.page, 'Joss Amory');
  await expect(
    joss.page.getByText('You cannot end your own access. Ask another administrator.'),
  ).toBeVisible();
  await expect(joss.page.getByRole('button', { name: 'Lost second factor' })).toBeVisible();
  await expect(joss.page.getByRole('button', { name: 'Deactivate' })).toHaveCount(0);
  expect(joss.complaints).toEqual([]);
});

test('a role with power over others is asked for by one and given once another has proved who she is and confirmed', async ({
  browser,
  product,
}) => {
  await toPerson(joss.page, 'Dov Amsel');
  await joss.page.getByRole('button', { name: 'Give Administrator' }).click();
  const question = joss.page.getByRole('dialog', { name: 'Give Dov Amsel the role Administrator' });
  await question.getByLabel('Why?').fill('Stands in while Joss is away.');
  await question.getByRole('button', { name: 'Ask a second person' }).click();
  await expect(joss.page.getByText('Administrator waits for a second person.')).toBeVisible();
  await expect(joss.page.getByText('You asked for this, so another person decides.')).toBeVisible();

  // The refusal that makes the page ask for the proof.
  const { page, complaints } = await openDesk(browser, product, [/403/]);
  await signIn(page, product, 'Noor Haddad');
  await page.goto('/clinic/confirmations');
  const asked = page.getByRole('listitem').filter({ hasText: 'Dov Amsel: Give the role Administrator' });
  await expect(asked.getByText('“Stands in while Joss is away.”')).toBeVisible();
  await ageProofs(product);
  await asked.getByRole('button', { name: 'Confirm' }).click();
  const proof = page.getByRole('dialog', { name: 'Is it you?' });
  await expect(proof).toBeVisible();
  await expect(asked.getByText('Confirmed', { exact: true })).toBeHidden();
  await proof.getByLabel('Password', { exact: true }).fill('orchard-lane-noor-2026');
  await proof.getByRole('button', { name: 'Go on' }).click();
  await expect(page.getByText('Confirmed. It holds now.')).toBeVisible();
  await expect(asked.getByText('Confirmed', { exact: true })).toBeVisible();
  expect(complaints).toEqual([]);
  await page.close();

  await joss.page.goto('/clinic/confirmations');
  const decided = joss.page
    .getByRole('listitem')
    .filter({ hasText: 'Dov Amsel: Give the role Administrator' });
  await expect(decided.getByText('Confirmed', { exact: true })).toBeVisible();
  await expect(decided.getByText('Noor Haddad', { exact: false })).toBeVisible();
  await toPerson(joss.page, 'Dov Amsel');
  await expect(joss.page.getByRole('button', { name: 'Remove Administrator' })).toBeVisible();
  expect(joss.complaints).toEqual([]);
});
