import AxeBuilder from '@axe-core/playwright';
import { expect, type Locator, type Page } from '@playwright/test';
import { desk, phone } from './people.ts';

/** WCAG 2.2 A and AA, as axe-core tags its rules. */
const standards = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** How every screen is looked at. */
export const looks = [
  { name: '390 px, light', viewport: phone, colorScheme: 'light' },
  { name: '390 px, dark', viewport: phone, colorScheme: 'dark' },
  { name: '1440 px, light', viewport: desk, colorScheme: 'light' },
  { name: '1440 px, dark', viewport: desk, colorScheme: 'dark' },
] as const;

/** Expects that axe finds nothing on the screen as it stands, and that it does not scroll sideways. */
export const inspect = async (page: Page, screen: string): Promise<void> => {
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

/** Goes to an address, waits until the heading and what it is about stand there, and looks. */
export const inspectPlace = async (
  page: Page,
  path: string,
  heading: RegExp | string,
  loaded?: Locator,
): Promise<void> => {
  await page.goto(path);
  await expect(page.getByRole('heading', { level: 1, name: heading })).toBeVisible();
  if (loaded) await expect(loaded.first()).toBeVisible();
  await inspect(page, path);
};
