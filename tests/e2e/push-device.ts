import type { BrowserContext, Page } from '@playwright/test';
import { expect } from '@playwright/test';
import type { changeNotificationSettings, getNotificationSettings } from '#shared/notifications/contract.ts';
import type { Product } from '#tests/support/product.ts';
import { callAs } from './own-session.ts';

type Card = { endpoint: string; p256dh: string; auth: string };
type Bridge = {
  heldSubscription: () => Promise<Card | null>;
  makeSubscription: () => Promise<Card>;
  endSubscription: () => Promise<boolean>;
};

type PushDevice = {
  /** The subscription that the browser holds now, as `PushManager.getSubscription` would give it. */
  held: () => Card | null;
  /** The name under which the fake push service knows the browser's newest subscription. */
  id: () => string;
};

/**
 * The browser's maker has no push service here. In its place stands the fake one, which makes the keys and decrypts
 * what arrives; all else (permission, service worker, notification) is the browser's own.
 */
export const withPushService = async (context: BrowserContext, { url }: Product): Promise<PushDevice> => {
  let held: Card | null = null;
  let id = '';
  await context.grantPermissions(['notifications'], { origin: url });
  await context.exposeFunction('heldSubscription', () => held);
  await context.exposeFunction('makeSubscription', async () => {
    const answer = await fetch(`${url}/outbox/push-devices`, { method: 'POST', headers: { origin: url } });
    held = (await answer.json()) as Card;
    id = held.endpoint.split('/').at(-1) ?? '';
    return held;
  });
  await context.exposeFunction('endSubscription', () => {
    const was = held !== null;
    held = null;
    return was;
  });
  await context.addInitScript(() => {
    if (!('PushManager' in window)) return;
    const bridge = window as unknown as Bridge;
    const subscriptionOf = ({ endpoint, p256dh, auth }: Card) =>
      ({
        endpoint,
        toJSON: () => ({ endpoint, keys: { p256dh, auth } }),
        unsubscribe: () => bridge.endSubscription(),
      }) as unknown as PushSubscription;
    PushManager.prototype.getSubscription = async () => {
      const card = await bridge.heldSubscription();
      return card && subscriptionOf(card);
    };
    PushManager.prototype.subscribe = async () => subscriptionOf(await bridge.makeSubscription());
  });
  return { held: () => held, id: () => id };
};

/** Turns push on in this browser as its owner does. */
export const turnPushOn = async (page: Page): Promise<void> => {
  await page.goto('/account/notifications');
  await page.getByRole('button', { name: 'Turn on notices here' }).click();
  await expect(page.getByText('Notices are on for this device.')).toBeVisible();
};

/** The demo's patients sleep from 21:00 to 08:00; a test runs at any hour. */
export const wakeAtAnyHour = async (page: Page, product: Product): Promise<void> => {
  const { phone, timeZone, remindAt } = await callAs<typeof getNotificationSettings>(
    page,
    product,
    'get',
    '/api/notification-settings',
    {},
  );
  await callAs<typeof changeNotificationSettings>(page, product, 'put', '/api/notification-settings', {
    body: { choices: [], phone, timeZone, remindAt, quietFrom: null, quietUntil: null },
  });
};
