import { expect, type Browser, type Locator, type Page } from '@playwright/test';
import { test } from '#tests/support/e2e.ts';
import type { Product } from '#tests/support/product.ts';
import { enrol } from './new-patient.ts';
import { linkMailedTo } from './outbox.ts';
import { withPasskeys } from './passkeys.ts';
import { desk, phone, signIn, watch } from './people.ts';

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

/** A phone that has never been here: it can keep passkeys, and counts what its owner has to do. */
const newPhone = async (browser: Browser, { url }: Product) => {
  const context = await browser.newContext({
    baseURL: url,
    viewport: phone,
    hasTouch: true,
    reducedMotion: 'reduce',
  });
  const page = await context.newPage();
  const { complaints } = await watch(page);
  let actions = 0;
  return {
    page,
    complaints,
    passkeys: await withPasskeys(page),
    /** Each tap, filled field and opened link is one action. */
    actions: () => actions,
    open: async (link: string) => {
      actions += 1;
      await page.goto(link);
    },
    tap: async (target: Locator) => {
      actions += 1;
      await target.tap();
    },
    fill: async (target: Locator, text: string) => {
      actions += 1;
      await target.fill(text);
    },
    close: () => context.close(),
  };
};
type Phone = Awaited<ReturnType<typeof newPhone>>;

const invitedByMail = async (product: Product, name: string) => {
  const email = `${name.split(' ')[0]?.toLowerCase()}@new-home.example`;
  await enrol(noor, product, { name, email, invite: 'email' });
  return linkMailedTo(product, email, 'Espalier: you are invited');
};

const acceptOnOwnPhone = ({ page, tap }: Phone) =>
  tap(page.getByRole('button', { name: /This is my own phone/ }));

/** A check-in of somebody who is well, from Today to the thanks. */
const checkIn = async ({ page, tap }: Phone, firstName: string) => {
  const asks = (words: RegExp) => expect(page.getByRole('heading', { level: 1, name: words })).toBeVisible();
  await tap(page.getByRole('link', { name: 'Start today’s check-in' }));
  await asks(/hurt right now/);
  await tap(page.getByRole('button', { name: '3', exact: true }));
  await asks(/worst pain/);
  await tap(page.getByRole('button', { name: '4', exact: true }));
  await asks(/swelling/);
  await tap(page.getByRole('button', { name: 'The same' }));
  await asks(/sling/);
  await tap(page.getByRole('button', { name: 'As advised' }));
  await asks(/Any of these/);
  await tap(page.getByRole('button', { name: 'None of these' }));
  await asks(/Anything else/);
  await tap(page.getByRole('button', { name: 'None of these' }));
  await tap(page.getByRole('button', { name: 'Send' }));
  await expect(page.getByRole('heading', { name: `Thank you, ${firstName}` })).toBeVisible();
};

test('from the mail’s link to the first sent check-in, with a passkey, takes at most twelve actions', async ({
  browser,
  product,
}) => {
  const link = await invitedByMail(product, 'Philippa Rasmussen');
  const person = await newPhone(browser, product);
  const { page } = person;
  await person.open(link);
  await expect(page.getByRole('heading', { name: 'Welcome, Philippa' })).toBeVisible();
  // The secret is out of the address bar, and so out of the history, as soon as it is read.
  await expect(page).toHaveURL(`${product.url}/invitation`);
  await acceptOnOwnPhone(person);
  await expect(page.getByRole('heading', { name: /^Good .*, Philippa$/ })).toBeVisible();
  expect(await person.passkeys.count()).toBe(1);
  await checkIn(person, 'Philippa');

  expect(person.actions()).toBeLessThanOrEqual(12);
  expect(person.complaints).toEqual([]);
  await person.close();
});

test('whoever has only the printed letter types its code, in small letters and without the hyphen', async ({
  browser,
  product,
}) => {
  const { invitationId } = await enrol(noor, product, {
    name: 'Ottoline Fairbrother',
    email: 'ottoline@new-home.example',
    invite: 'letter',
  });
  await noor.goto(`/letters/${invitationId}`);
  await expect(
    noor.getByRole('heading', { name: 'Ottoline Fairbrother, this is your way in' }),
  ).toBeVisible();
  await expect(noor.getByText(`${product.url}/start`)).toBeVisible();
  const code = (await noor.getByText(/^[0-9A-Z]{5}-[0-9A-Z]{5}$/).textContent()) ?? '';

  const person = await newPhone(browser, product);
  const { page } = person;
  await person.open('/start');
  await person.fill(page.getByLabel('Code of the letter'), code.toLowerCase().replace('-', ''));
  await person.tap(page.getByRole('button', { name: 'Go on' }));
  await expect(page.getByRole('heading', { name: 'Welcome, Ottoline' })).toBeVisible();
  await acceptOnOwnPhone(person);
  await expect(page.getByRole('heading', { name: /^Good .*, Ottoline$/ })).toBeVisible();
  await checkIn(person, 'Ottoline');

  expect(person.actions()).toBeLessThanOrEqual(12);
  expect(person.complaints).toEqual([]);
  await person.close();
});

test('a link that was used says so, lets nobody in, and has the clinic asked for a new one', async ({
  browser,
  product,
}) => {
  const link = await invitedByMail(product, 'Barnaby Lindegaard');
  const first = await newPhone(browser, product);
  await first.open(link);
  await acceptOnOwnPhone(first);
  await expect(first.page.getByRole('heading', { name: /^Good .*, Barnaby$/ })).toBeVisible();

  const second = await newPhone(browser, product);
  const { page } = second;
  await second.open(link);
  await expect(page.getByRole('heading', { name: 'This invitation has been used' })).toBeVisible();
  await expect(page.getByText('Barnaby')).toHaveCount(0);
  await expect(page.getByRole('link', { name: 'Sign in' })).toBeVisible();
  await second.tap(page.getByRole('button', { name: 'Ask the clinic for a new one' }));
  await expect(page.getByText('The clinic was told.', { exact: false })).toBeVisible();
  await page.goto('/today');
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();

  expect([...first.complaints, ...second.complaints]).toEqual([]);
  await first.close();
  await second.close();
});

test('with the passkey of the invitation one signs in again later, without typing anything', async ({
  browser,
  product,
}) => {
  const link = await invitedByMail(product, 'Griselda Montague');
  const person = await newPhone(browser, product);
  const { page } = person;
  await person.open(link);
  await acceptOnOwnPhone(person);
  const today = page.getByRole('heading', { name: /^Good .*, Griselda$/ });
  await expect(today).toBeVisible();
  await page.getByRole('button', { name: /Your account/ }).tap();
  await page.getByRole('button', { name: 'Sign out' }).tap();
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
  await page.getByRole('button', { name: 'Sign in with a passkey' }).tap();
  await expect(today).toBeVisible();
  expect(await person.passkeys.count()).toBe(1);

  expect(person.complaints).toEqual([]);
  await person.close();
});
