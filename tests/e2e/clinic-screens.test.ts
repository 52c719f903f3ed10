import { expect, type BrowserContext } from '@playwright/test';
import { templateRow } from '#src/features/patients/import-template.ts';
import { test } from '#tests/support/e2e.ts';
import { inspect, inspectPlace, looks } from './inspect.ts';
import { enrol } from './new-patient.ts';
import { signIn, tick, watch } from './people.ts';
import { ageProofs } from './proof-age.ts';

type Cookies = Awaited<ReturnType<BrowserContext['cookies']>>;

/** Each code of an authenticator app counts once, so each of them signs in once for all looks. */
let petra: Cookies;
let joss: Cookies;
let letter: string;

test.beforeAll(async ({ browser, product }) => {
  const cookiesOf = async (name: string) => {
    const page = await browser.newPage({ baseURL: product.url });
    await signIn(page, product, name);
    return page;
  };
  const pages = [await cookiesOf('Petra Lindqvist'), await cookiesOf('Joss Amory')] as const;
  const about = { name: 'Leonora Wrenfield', email: 'leonora@new-home.example', invite: 'letter' } as const;
  letter = `/letters/${(await enrol(pages[0], product, about)).invitationId}`;
  petra = await pages[0].context().cookies();
  joss = await pages[1].context().cookies();
  for (const page of pages) await page.close();
});

/** Two rows, of which the second has a date of birth that is none. */
const list = [templateRow, { ...templateRow, chart_number: 'OL-1043', birth_date: '1957-02-30' }].reduce(
  (text, row) =>
    `${text}\n${Object.values(row)
      .map((value) => `"${value}"`)
      .join(',')}`,
  Object.keys(templateRow).join(','),
);

// A dozen screens in one walk, each searched by axe.
test.describe.configure({ timeout: 180_000 });

for (const { name, viewport, colorScheme } of looks) {
  test.describe(name, () => {
    test.use({ viewport, colorScheme, reducedMotion: 'reduce' });

    test('axe and the content policy find nothing on the round and the messages', async ({
      page,
      context,
    }) => {
      const { complaints } = await watch(page);
      await context.addCookies(petra);
      await page.goto('/round');
      await expect(page.locator('a[href^="/round/"]').first()).toBeVisible();
      await inspect(page, 'morning round');
      await page.locator('a[href^="/round/"]').first().click();
      await expect(page.getByRole('heading', { name: 'What next' })).toBeVisible();
      await inspect(page, 'case');
      await page.keyboard.press('?');
      await expect(page.getByRole('dialog')).toBeVisible();
      await inspect(page, 'keys');
      await page.keyboard.press('Escape');
      // The first of the queue is Petra's or nobody's, so that she may close it.
      await page.getByRole('button', { name: 'Close with an outcome' }).click();
      await expect(page.getByRole('dialog', { name: /^Close the flag of/ })).toBeVisible();
      await tick(page, 'Advised by phone');
      await inspect(page, 'close the flag');
      await page.getByRole('button', { name: 'Cancel' }).click();
      await page.goto('/clinic/messages');
      await expect(page.getByRole('heading', { level: 1, name: 'Messages' })).toBeVisible();
      await inspect(page, 'messages');
      await page.locator('a[href^="/clinic/messages/"]').first().click();
      await expect(page.getByRole('textbox')).toBeVisible();
      await inspect(page, 'thread');
      await page.goto('/outbox');
      await inspect(page, 'outbox');
      expect(complaints).toEqual([]);
    });

    test('axe and the content policy find nothing on the caseload, the records and the own account', async ({
      page,
      context,
    }) => {
      // A chart outside one's care teams is refused until one has said why, and the browser notes that.
      const { complaints } = await watch(page, [/403/]);
      await context.addCookies(petra);
      const patient = (who: string) => page.getByRole('link', { name: who, exact: true });
      await inspectPlace(page, '/caseload', 'Caseload', patient('Gwen Thackeray'));
      await patient('Gwen Thackeray').click();
      await expect(page.getByRole('heading', { level: 1, name: /^Gwen Thackeray, \d+$/ })).toBeVisible();
      await inspect(page, 'record');
      await page.goto('/caseload');
      await patient('Tobias Ahlgren').click();
      await expect(page.getByLabel('Why do you open this chart?')).toBeVisible();
      await inspect(page, 'reason needed');
      await inspectPlace(page, '/caseload/new', 'Enrol a patient', page.getByLabel('Chart number'));
      await inspectPlace(page, letter, 'Leonora Wrenfield, this is your way in');
      await inspectPlace(
        page,
        '/clinic/account/sign-in',
        'Sign-in and devices',
        page.getByText('This one', { exact: true }),
      );
      await inspectPlace(
        page,
        '/clinic/account/notifications',
        'How we reach you',
        page.getByRole('button', { name: 'Save' }),
      );
      await page.goto('/caseload/import');
      await page.getByLabel('The list').fill(list);
      await page.getByRole('button', { name: 'Look at the list' }).click();
      await expect(page.getByText('All or nobody is enrolled.', { exact: false })).toBeVisible();
      await inspect(page, 'preview of a list');
      expect(complaints).toEqual([]);
    });

    test('axe and the content policy find nothing where people and deliveries are managed', async ({
      page,
      context,
      product,
    }) => {
      // The refusal that makes the page ask for a proof.
      const { complaints } = await watch(page, [/403/]);
      await context.addCookies(joss);
      const callum = page.getByRole('link', { name: 'Callum Reyes, PT' });
      await inspectPlace(page, '/clinic/deliveries', 'Deliveries', page.getByText('Failed or came back'));
      await inspectPlace(
        page,
        '/clinic/confirmations',
        'Confirmations',
        page.getByText('Callum Reyes: Give the role Clinical lead'),
      );
      await inspectPlace(page, '/clinic/people', 'People', callum);
      await callum.click();
      await expect(page.getByRole('heading', { level: 1, name: 'Callum Reyes, PT' })).toBeVisible();
      await inspect(page, 'person');
      await ageProofs(product);
      await page.getByRole('button', { name: 'Withdraw' }).click();
      await expect(page.getByRole('dialog', { name: 'Is it you?' })).toBeVisible();
      await expect(page.getByLabel('Password', { exact: true })).toBeVisible();
      await inspect(page, 'proof');
      expect(complaints).toEqual([]);
    });
  });
}
