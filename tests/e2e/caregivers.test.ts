import { expect, type Browser, type Page } from '@playwright/test';
import { test } from '#tests/support/e2e.ts';
import type { Product } from '#tests/support/product.ts';
import { linkMailedTo } from './outbox.ts';
import { withPasskeys } from './passkeys.ts';
import { desk, phone, signIn, tick, watch } from './people.ts';

// A product of its own, set as it is by default: Tobias begins this day well in another file too.
test.use({ productEnv: { DEMO: 'on' } });
test.describe.configure({ timeout: 120_000 });

const openPhone = async (browser: Browser, { url }: Product, expected: RegExp[] = []) => {
  const context = await browser.newContext({ baseURL: url, viewport: phone, reducedMotion: 'reduce' });
  const page = await context.newPage();
  return { page, ...(await watch(page, expected)), close: () => context.close() };
};

const asks = (page: Page, words: RegExp) =>
  expect(page.getByRole('heading', { level: 1, name: words })).toBeVisible();

const neighbor = { name: 'Astrid Nylund', email: 'astrid.nylund@next-door.example' };

/** Tobias invites his neighbor; his own address is refused at its field first, and the rest stays as typed. */
const invite = async (page: Page, ownEmail: string) => {
  await page.goto('/account/caregivers');
  await page.getByRole('button', { name: 'Invite someone' }).click();
  await page.getByLabel('Their name').fill(neighbor.name);
  const email = page.getByLabel('Their e-mail');
  await email.fill(ownEmail);
  await page.getByLabel('Who they are to you').fill('neighbor');
  await tick(page, 'Fill in check-ins for me');
  await tick(page, /^As long as I want it/);
  await page.getByRole('button', { name: 'Send the invitation' }).click();
  await expect(email).toHaveAccessibleDescription('Each person needs an address of their own.');
  await expect(page.getByLabel('Their name')).toHaveValue(neighbor.name);
  await expect(page.getByRole('checkbox', { name: 'Fill in check-ins for me' })).toBeChecked();
  await email.fill(neighbor.email);
  await page.getByRole('button', { name: 'Send the invitation' }).click();
  await expect(page.getByText(`The invitation to ${neighbor.name} is on its way.`)).toBeVisible();
  await expect(page.getByText('May fill in check-ins. May not see messages.')).toBeVisible();
};

test('a neighbor helps within the limits that the patient set, is named in the round, and is out within 2 s of the end', async ({
  browser,
  product,
}) => {
  const ownEmail = product.accounts.find(({ who }) => who === 'Tobias Ahlgren')?.email ?? '';
  // The refused address is what the browser notes.
  const tobias = await openPhone(browser, product, [/422/]);
  await signIn(tobias.page, product, 'Tobias Ahlgren');
  await invite(tobias.page, ownEmail);
  const link = await linkMailedTo(product, neighbor.email, 'Espalier: you are invited');

  // What the page had under way when the help ended is refused, and the browser notes that.
  const astrid = await openPhone(browser, product, [/404/]);
  const { page } = astrid;
  const passkeys = await withPasskeys(page);
  await page.goto(link);
  await expect(page.getByRole('heading', { name: 'Welcome, Astrid' })).toBeVisible();
  await page.getByRole('button', { name: /This is my own phone/ }).click();
  await expect(page.getByRole('heading', { name: /^Good .*, Astrid$/ })).toBeVisible();
  expect(await passkeys.count()).toBe(1);

  const forTobias = () => expect(page.getByText('For Tobias Ahlgren', { exact: true })).toBeVisible();
  await forTobias();
  for (const [path, heading] of [
    ['/plan', 'My plan'],
    ['/account', 'Your account'],
    ['/account/sign-in', 'Sign-in and devices'],
    ['/account/notifications', /./],
    ['/something-new', /Any of these/],
  ] as const) {
    await page.goto(path);
    await expect(page.getByRole('heading', { level: 1, name: heading })).toBeVisible();
    await forTobias();
    await expect(page.getByRole('link', { name: /Messages/ })).toHaveCount(0);
  }
  for (const closed of ['/messages', '/messages/new', '/account/caregivers', '/account/activity']) {
    await page.goto(closed);
    await expect(page).not.toHaveURL(new RegExp(`${closed}$`));
    await forTobias();
  }

  await page.goto('/today');
  await page.getByRole('link', { name: 'Start today’s check-in' }).click();
  await asks(page, /right now/);
  await forTobias();
  await page.getByRole('button', { name: '3', exact: true }).click();
  await asks(page, /worst pain/);
  await page.getByRole('button', { name: '3', exact: true }).click();
  await page.getByRole('button', { name: 'The same' }).click();
  await page.getByRole('button', { name: 'As advised' }).click();
  await asks(page, /Any of these/);
  await forTobias();
  await page.getByRole('button', { name: 'None of these' }).click();
  await page.getByRole('button', { name: /Shoulder or arm/ }).click();
  await tick(page, 'A fall');
  await page.getByRole('button', { name: 'Next' }).click();
  await tick(page, 'I fell on the arm');
  await page.getByRole('button', { name: 'Next' }).click();
  await forTobias();
  await page.getByRole('button', { name: 'Send' }).click();
  await expect(page.getByText(/Sent to the clinic/)).toBeVisible();
  await expect(page.getByRole('link', { name: 'Back to Today' })).toBeVisible();
  await forTobias();

  const noor = await browser.newPage({ baseURL: product.url, viewport: desk, reducedMotion: 'reduce' });
  const round = await watch(noor);
  await signIn(noor, product, 'Noor Haddad');
  await noor.getByRole('link', { name: 'Tobias Ahlgren' }).click();
  await expect(noor.getByText(/Fall onto the arm/).first()).toBeVisible();
  await expect(noor.getByText('Answered by Astrid Nylund, neighbor')).toBeVisible();
  expect(round.complaints).toEqual([]);
  await noor.close();

  await page.goto('/plan');
  await forTobias();
  await tobias.page.getByRole('button', { name: 'End the help of Astrid Nylund' }).click();
  const question = tobias.page.getByRole('alertdialog', { name: 'End the help of Astrid Nylund?' });
  const leftAt = page.waitForURL(/\/caring/).then(() => Date.now());
  const answered = tobias.page.waitForResponse(
    (response) =>
      response.request().method() === 'DELETE' && /\/api\/caregivers\/[^/]+$/.test(response.url()),
  );
  await question.getByRole('button', { name: 'End it now' }).click();
  expect((await answered).ok()).toBe(true);
  const answeredAt = Date.now();
  expect((await leftAt) - answeredAt).toBeLessThan(2_000);
  await expect(page.getByText('You no longer look after this person here')).toBeVisible();
  await expect(page.getByText('Tobias', { exact: false })).toHaveCount(0);
  await expect(tobias.page.getByText(/Ended on/)).toBeVisible();
  await page.goto('/today');
  await expect(page.getByRole('heading', { name: 'There is nobody here to look after' })).toBeVisible();

  expect([...tobias.complaints, ...astrid.complaints]).toEqual([]);
  await tobias.close();
  await astrid.close();
});

test('who cares for two sees one record at a time, and what was begun for one is not there for the other', async ({
  browser,
  product,
}) => {
  const { page, complaints, close } = await openPhone(browser, product);
  await signIn(page, product, 'Teo Valcourt');
  const goOver = async (name: string) => {
    await page.getByRole('button', { name: /Your account/ }).click();
    await page.getByRole('link', { name: /^Looking after / }).click();
    await page.getByRole('button', { name }).click();
  };
  const stands = async (name: string, day: RegExp) => {
    await expect(page.getByText(`For ${name}`, { exact: true })).toBeVisible();
    await expect(page.getByText(day)).toBeVisible();
  };
  const ines = ['Ines Valcourt', /Day 24 after surgery · left shoulder/] as const;
  const ruth = ['Ruth Abramowicz', /Day 10 after surgery · left shoulder/] as const;
  const goOn = page.getByRole('link', { name: 'Go on with your check-in' });

  await expect(page.getByRole('heading', { name: 'Who are you here for?' })).toBeVisible();
  await page.getByRole('button', { name: 'Ines Valcourt' }).click();
  await stands(...ines);
  await expect(page.getByRole('link', { name: /^Messages/ })).toBeVisible();
  await page.getByRole('link', { name: 'Start today’s check-in' }).click();
  await asks(page, /right now/);
  await page.getByRole('button', { name: '5', exact: true }).click();
  await asks(page, /worst pain/);
  await page.goto('/today');
  await expect(goOn).toBeVisible();

  await goOver('Ruth Abramowicz');
  await stands(...ruth);
  // Ruth lets him fill in her check-ins, and no more.
  await expect(page.getByRole('link', { name: /^Messages/ })).toHaveCount(0);
  await expect(goOn).toHaveCount(0);
  await page.goto('/check-in');
  await expect(page.getByText('For Ruth Abramowicz', { exact: true })).toBeVisible();
  await asks(page, /right now/);
  await expect(page.locator('[aria-pressed="true"], :checked')).toHaveCount(0);
  await page.goto('/today');
  await stands(...ruth);

  await goOver('Ines Valcourt');
  await stands(...ines);
  await goOn.click();
  await asks(page, /worst pain/);
  expect(complaints).toEqual([]);
  await close();
});
