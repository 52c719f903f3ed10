import { expect } from '@playwright/test';
import { test } from '#tests/support/e2e.ts';
import { phone, signIn, watch, tick } from './people.ts';

test.use({ viewport: phone, reducedMotion: 'reduce' });

test('a wrong password gets the same words whether or not the account exists, and keeps what was typed', async ({
  page,
  product,
}) => {
  await watch(page, [/401/]);
  const known = product.accounts.find(({ who }) => who.startsWith('Joss'))?.email ?? '';
  const answers: (string | null)[] = [];
  for (const email of [known, 'nobody@orchard-lane.example']) {
    await page.goto('/sign-in');
    await page.getByLabel('E-mail').fill(email);
    await page.getByLabel('Password', { exact: true }).fill('not the passphrase at all');
    await page.getByRole('button', { name: 'Sign in', exact: true }).click();
    const alert = page.getByText('That e-mail and password do not match.', { exact: false });
    await expect(alert).toBeVisible();
    answers.push(await alert.textContent());
    await expect(page.getByLabel('E-mail')).toHaveValue(email);
  }
  expect(answers[0]).toBe(answers[1]);
});

test('with no network an emergency tick still warns at once, says that it is not sent, and goes out later', async ({
  page,
  context,
  product,
}) => {
  await signIn(page, product, 'Wendell Pryce');
  await page.goto('/something-new');
  await expect(page.getByRole('heading', { name: /Any of these/ })).toBeVisible();
  await context.setOffline(true);
  await tick(page, /Chest pain/);
  await expect(page.getByRole('link', { name: /Call 911/ })).toBeVisible();
  await expect(page.getByText('Not sent yet.')).toBeVisible();
  await context.setOffline(false);
  await expect(page.getByText(/Sent to the clinic/)).toBeVisible({ timeout: 30_000 });
});

test('a check-in survives a reload, and a failed send keeps every answer', async ({
  page,
  context,
  product,
}) => {
  await signIn(page, product, 'Wendell Pryce');
  await page.goto('/check-in');
  await page.getByRole('button', { name: '2', exact: true }).click();
  await page.getByRole('heading', { name: /worst pain/ }).waitFor();
  await page.getByRole('button', { name: '3', exact: true }).click();
  await page.getByRole('heading', { name: /swelling/ }).waitFor();
  await page.reload();
  await page.getByRole('button', { name: 'The same' }).click();
  await page.getByRole('button', { name: 'As advised' }).click();
  await page.getByRole('button', { name: 'None of these' }).click();
  await page.getByRole('heading', { name: /Anything else/ }).waitFor();
  await page.getByRole('button', { name: 'None of these' }).click();
  await expect(page.getByRole('button', { name: 'Send' })).toBeVisible();
  await context.setOffline(true);
  await page.getByRole('button', { name: 'Send' }).click();
  await expect(page.getByText(/Not sent yet: .* Your answers are kept/)).toBeVisible();
  await context.setOffline(false);
  await page.getByRole('button', { name: 'Send' }).click();
  await expect(page.getByRole('heading', { name: /Thank you, Wendell/ })).toBeVisible();
});

test('an old tab is told to reload after an update, but never in mid-form', async ({ page, product }) => {
  await signIn(page, product, 'Gwen Thackeray');
  await page.route('**/api/**', async (route) => {
    const response = await route.fetch();
    await route.fulfill({
      response,
      headers: { ...response.headers(), 'x-espalier-build': 'a-newer-build' },
    });
  });
  const banner = page.getByText('Espalier was updated.');
  await page.goto('/check-in');
  await page.getByRole('button', { name: '1', exact: true }).click();
  await expect(page.getByRole('heading', { name: /worst pain/ })).toBeVisible();
  await expect(banner).toBeHidden();
  await page.goto('/plan');
  await expect(page.getByRole('heading', { name: 'My plan', level: 1 })).toBeVisible();
  await expect(banner).toBeVisible();
  // Answers that are still under way when the test ends are nobody's any more.
  await page.unrouteAll({ behavior: 'ignoreErrors' });
});

test('a second clinician who claims is told who was first', async ({ browser, product }) => {
  const first = await browser.newPage({ baseURL: product.url });
  const second = await browser.newPage({ baseURL: product.url });
  await watch(second, [/409/]);
  await signIn(first, product, 'Noor Haddad');
  await signIn(second, product, 'Callum Reyes');
  await first.getByRole('listitem').filter({ hasText: 'Rukmini Dass' }).getByRole('link').first().click();
  await first.waitForURL(/round\/.+/);
  await second.goto(new URL(first.url()).pathname);
  await expect(second.getByRole('button', { name: 'Claim' })).toBeVisible();
  // The hint of the first claim is held back, so that the second clicks on what is no longer true.
  await second.route('**/api/flags**', (route) =>
    route.request().method() === 'GET' ? route.abort() : route.continue(),
  );
  await first.getByRole('button', { name: 'Claim' }).click();
  await expect(first.getByRole('button', { name: 'Release' })).toBeVisible();
  await second.getByRole('button', { name: 'Claim' }).click();
  await expect(second.getByText(/Noor Haddad has (claimed|had) /).first()).toBeVisible();
  await second.unrouteAll({ behavior: 'ignoreErrors' });
  await first.close();
  await second.close();
});

test('after sign-out neither the back button nor the address shows anything', async ({ page, product }) => {
  await signIn(page, product, 'Gwen Thackeray');
  await page.goto('/plan');
  await expect(page.getByRole('heading', { name: 'My plan', level: 1 })).toBeVisible();
  await page.getByRole('button', { name: /Your account/ }).click();
  await page.getByRole('button', { name: 'Sign out' }).click();
  await expect(page).toHaveURL(/sign-in/);
  await page.goBack();
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
  await page.goto('/today');
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible();
});

test('a check-in that is not sent is asked about before signing out', async ({ page, product }) => {
  await signIn(page, product, 'Hal Brandvold');
  await page.goto('/something-new');
  await tick(page, 'Hand cold, pale or blue');
  await page.goto('/today');
  await page.getByRole('button', { name: /Your account/ }).click();
  await page.getByRole('button', { name: 'Sign out' }).click();
  await expect(page.getByRole('alertdialog', { name: 'Your check-in is not sent' })).toBeVisible();
  await page.getByRole('button', { name: 'Stay' }).click();
  await expect(page).toHaveURL(/today/);
});

test('“None of these” is in sight on the danger screen of a phone, above the emergency line', async ({
  page,
  product,
}) => {
  await signIn(page, product, 'Gwen Thackeray');
  await page.goto('/check-in');
  await page.getByRole('button', { name: '2', exact: true }).click();
  await page.getByRole('heading', { name: /worst pain/ }).waitFor();
  await page.getByRole('button', { name: '3', exact: true }).click();
  await page.getByRole('button', { name: 'The same' }).click();
  await page.getByRole('button', { name: 'As advised' }).click();
  await page.getByRole('heading', { name: /Any of these/ }).waitFor();
  const none = await page.getByRole('button', { name: 'None of these' }).boundingBox();
  const line = await page.getByText('Emergency? Call 911', { exact: false }).boundingBox();
  expect((none?.y ?? NaN) + (none?.height ?? NaN)).toBeLessThanOrEqual(line?.y ?? NaN);
});
