import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';
import { test } from '#tests/support/e2e.ts';
import { desk, emergencyLine, phone, signIn, watch, tick } from './people.ts';

/** WCAG 2.2 A and AA, as axe-core tags its rules. */
const standards = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

const looks = [
  { name: '390 px, light', viewport: phone, colorScheme: 'light' },
  { name: '390 px, dark', viewport: phone, colorScheme: 'dark' },
  { name: '1440 px, light', viewport: desk, colorScheme: 'light' },
  { name: '1440 px, dark', viewport: desk, colorScheme: 'dark' },
] as const;

const inspect = async (page: Page, screen: string): Promise<void> => {
  await page.evaluate(() => document.fonts.ready.then(() => undefined));
  const { scrollWidth, clientWidth, scrollHeight } = await page.evaluate(() => {
    const { scrollWidth, clientWidth, scrollHeight } = document.documentElement;
    return { scrollWidth, clientWidth, scrollHeight };
  });
  expect(scrollWidth - clientWidth, `${screen} scrolls sideways`).toBeLessThanOrEqual(0);
  // The whole page at once: what lies half under the bar at the foot until one scrolls is no small target.
  const seen = page.viewportSize() ?? desk;
  await page.setViewportSize({ width: seen.width, height: Math.max(seen.height, scrollHeight) });
  const { violations } = await new AxeBuilder({ page }).withTags(standards).analyze();
  await page.setViewportSize(seen);
  const found = violations.map(
    ({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`,
  );
  expect(found, screen).toEqual([]);
};

// A dozen screens in one walk, each searched by axe.
test.describe.configure({ timeout: 180_000 });

for (const { name, viewport, colorScheme } of looks) {
  test.describe(name, () => {
    test.use({ viewport, colorScheme, reducedMotion: 'reduce' });

    test('axe and the content policy find nothing on the patient’s screens', async ({ page, product }) => {
      const { complaints } = await watch(page);
      await page.goto('/sign-in');
      await inspect(page, 'sign-in');
      await signIn(page, product, 'Gwen Thackeray');
      await expect(emergencyLine(page)).toBeVisible();
      await inspect(page, 'Today');
      for (const [path, heading] of [
        ['/plan', /My plan/],
        ['/messages', /Messages/],
        ['/messages/new', /message/i],
        ['/nowhere', /./],
      ] as const) {
        await page.goto(path);
        await expect(page.getByRole('heading', { level: 1, name: heading })).toBeVisible();
        await inspect(page, path);
      }
      await page.goto('/check-in');
      await inspect(page, 'pain now');
      await page.getByRole('button', { name: '2', exact: true }).click();
      await expect(page.getByRole('heading', { name: /worst pain/ })).toBeVisible();
      await inspect(page, 'pain worst');
      await page.getByRole('button', { name: '3', exact: true }).click();
      await expect(page.getByRole('heading', { name: /swelling/ })).toBeVisible();
      await inspect(page, 'swelling');
      await page.getByRole('button', { name: 'The same' }).click();
      await page.getByRole('button', { name: 'As advised' }).click();
      await expect(page.getByRole('heading', { name: /Any of these/ })).toBeVisible();
      await inspect(page, 'danger signs');
      await tick(page, /Chest pain/);
      await expect(page.getByRole('link', { name: /Call 911/ })).toBeVisible();
      await inspect(page, 'emergency caution');
      await page.getByRole('button', { name: 'I ticked this by mistake' }).click();
      await page.getByRole('button', { name: 'None of these' }).click();
      await expect(page.getByRole('heading', { name: /Anything else/ })).toBeVisible();
      await inspect(page, 'anything else');
      await page.getByRole('button', { name: /Leg/ }).click();
      await tick(page, 'One calf sore or swollen');
      await page.getByRole('button', { name: 'Next' }).click();
      await page.getByRole('button', { name: /sore and swollen/i }).click();
      await expect(page.getByText(/Sent to the clinic/)).toBeVisible();
      await inspect(page, 'urgent caution');
      await page.getByRole('button', { name: 'Go on with the check-in' }).click();
      await expect(page.getByRole('button', { name: 'Send' })).toBeVisible();
      await inspect(page, 'review');
      expect(complaints).toEqual([]);
    });

    test('axe and the content policy find nothing on the clinic’s screens', async ({ page, product }) => {
      const { complaints } = await watch(page);
      await signIn(page, product, 'Petra Lindqvist');
      await expect(page).toHaveURL(/round/);
      await inspect(page, 'morning round');
      await page.locator('a[href^="/round/"]').first().click();
      await expect(page.getByRole('heading', { name: 'What next' })).toBeVisible();
      await inspect(page, 'case');
      await page.keyboard.press('?');
      await expect(page.getByRole('dialog')).toBeVisible();
      await inspect(page, 'keys');
      await page.keyboard.press('Escape');
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
  });
}
