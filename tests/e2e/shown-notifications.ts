import type { BrowserContext, Page } from '@playwright/test';
import type { Product } from '#tests/support/product.ts';

type Registered = { registrations: { registrationId: string; scopeURL: string; isDeleted: boolean }[] };

type Clicked = Event & { waitUntil: (work: Promise<unknown>) => void };
/** The part of a service worker's global scope that is used here; TypeScript knows it in workers only. */
type WorkerScope = {
  registration: ServiceWorkerRegistration;
  WindowClient: { prototype: object };
  NotificationEvent: new (type: string, about: { notification: Notification }) => Clicked;
  dispatchEvent: (event: Event) => boolean;
  /** Made by the tests: the first notification after they began to wait for one. */
  hasShown?: Promise<void>;
};

const workerOf = (context: BrowserContext) => {
  const [worker] = context.serviceWorkers();
  if (!worker) throw new Error('This browser has no service worker.');
  return worker;
};

/** What the service worker of this browser shows now, from any page of the site. */
export const shownOn = (page: Page): Promise<{ title: string; body: string }[]> =>
  page.evaluate(async () => {
    const registration = await navigator.serviceWorker.getRegistration('/');
    const shown = (await registration?.getNotifications()) ?? [];
    return shown.map(({ title, body }) => ({ title, body }));
  });

/**
 * Hands a push to the browser's own service worker, as its maker's push service would, decrypted. Ends when it has
 * shown its notification: a browser that is asked in the middle of that for what is shown forgets it.
 */
export const deliverPush = async (page: Page, { url }: Product, payload: string): Promise<void> => {
  const worker = workerOf(page.context());
  await worker.evaluate(() => {
    const scope = self as unknown as WorkerScope;
    const { registration } = scope;
    scope.hasShown = new Promise((resolve) => {
      registration.showNotification = (...about) => {
        const showing = ServiceWorkerRegistration.prototype.showNotification.apply(registration, about);
        resolve(showing);
        return showing;
      };
    });
  });
  const cdp = await page.context().newCDPSession(page);
  const registered = new Promise<string>((resolve) => {
    cdp.on('ServiceWorker.workerRegistrationUpdated', ({ registrations }: Registered) => {
      const ours = registrations.find(({ scopeURL, isDeleted }) => scopeURL === `${url}/` && !isDeleted);
      if (ours) resolve(ours.registrationId);
    });
  });
  await cdp.send('ServiceWorker.enable');
  await cdp.send('ServiceWorker.deliverPushMessage', {
    origin: url,
    registrationId: await registered,
    data: payload,
  });
  await worker.evaluate(() => (self as unknown as WorkerScope).hasShown);
  await cdp.detach();
};

/**
 * Clicks the only notification that is shown, and waits until the service worker has done what it does then. A
 * browser lets a worker bring a window to the front only in a true click, which no test can make: that last step
 * is noted instead, and the address of the window is given.
 */
export const clickNotification = (context: BrowserContext): Promise<string[]> =>
  workerOf(context).evaluate(async () => {
    const scope = self as unknown as WorkerScope;
    const [notification, ...others] = await scope.registration.getNotifications();
    if (!notification || others.length > 0) throw new Error('There is not exactly one notification.');
    const focused: string[] = [];
    Object.assign(scope.WindowClient.prototype, {
      focus(this: { url: string }) {
        focused.push(this.url);
        return Promise.resolve(this);
      },
    });
    const event = new scope.NotificationEvent('notificationclick', { notification });
    const work: Promise<unknown>[] = [];
    event.waitUntil = (one) => work.push(one);
    scope.dispatchEvent(event);
    await Promise.all(work);
    return focused;
  });
