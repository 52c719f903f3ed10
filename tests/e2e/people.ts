import { expect, type Page } from '@playwright/test';
import type { Product } from '#tests/support/product.ts';
import { hasAuthenticator, nextCode } from './codes.ts';

export const phone = { width: 390, height: 844 };
export const desk = { width: 1440, height: 900 };

const accountOf = ({ accounts }: Product, name: string) => {
  const account = accounts.find(({ who }) => who.startsWith(name));
  if (!account) throw new Error(`There is no demo account for ${name}.`);
  return account;
};

/** Gives e-mail and password; staff stand before their second step then. */
export const givePassword = async (page: Page, product: Product, name: string): Promise<void> => {
  const { email, password } = accountOf(product, name);
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
};

/** Signs in through the form, staff with a code of their app, and waits until the person's first screen stands. */
export const signIn = async (page: Page, product: Product, name: string): Promise<void> => {
  const { email } = accountOf(product, name);
  await givePassword(page, product, name);
  if (hasAuthenticator(email)) {
    const code = await nextCode(product, email);
    await page.getByLabel('Code of six digits').fill(code);
  }
  await expect(page).not.toHaveURL(/sign-in/);
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
};

/**
 * Collects what a page must never have: errors on its console and reports of the content policy. An answer that
 * a test provokes on purpose is named by `expected`.
 */
export const watch = async (page: Page, expected: RegExp[] = []) => {
  const complaints: string[] = [];
  const keep = (text: string) => {
    if (!expected.some((one) => one.test(text))) complaints.push(text);
  };
  page.on('console', (message) => {
    if (message.type() === 'error') keep(message.text());
  });
  page.on('pageerror', (error) => keep(`uncaught: ${error.message}`));
  await page.addInitScript(() => {
    document.addEventListener('securitypolicyviolation', ({ violatedDirective, blockedURI }) => {
      console.error(`content policy: ${violatedDirective} refused ${blockedURI}`);
    });
  });
  return { complaints };
};

/** The patient's own emergency line, which stands on every screen of theirs. */
export const emergencyLine = (page: Page) => page.getByText(/(Not for emergencies\.|Emergency\?) Call 911/);

/** Ticks or picks by the label, as a finger does: the box itself lies under its own drawing. */
export const tick = (page: Page, name: string | RegExp): Promise<void> => {
  const box = page.getByRole('checkbox', { name }).or(page.getByRole('radio', { name, exact: true }));
  return page.locator('label').filter({ has: box }).click();
};
