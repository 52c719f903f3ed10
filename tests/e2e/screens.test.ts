import { randomUUID } from 'node:crypto';
import { expect, type Page } from '@playwright/test';
import type { endCaregiver, inviteCaregiver } from '#shared/caregivers/contract.ts';
import { test } from '#tests/support/e2e.ts';
import type { Product } from '#tests/support/product.ts';
import { inspect, inspectPlace, looks } from './inspect.ts';
import { linkMailedTo } from './outbox.ts';
import { callAs } from './own-session.ts';
import { emergencyLine, givePassword, signIn, tick, watch } from './people.ts';

/** The link of an invitation of a caregiver of this page's patient that a newer one has replaced. */
const replacedInvitation = async (page: Page, product: Product): Promise<string> => {
  const email = `${randomUUID()}@next-door.example`;
  const invite = () =>
    callAs<typeof inviteCaregiver>(page, product, 'post', '/api/caregivers', {
      body: {
        id: randomUUID(),
        name: 'Percival Thackeray',
        email,
        relationship: 'brother',
        mayCheckIn: true,
        mayMessage: false,
        until: null,
      },
    });
  const { id } = await invite();
  const link = await linkMailedTo(product, email, 'Espalier: you are invited');
  const params = { caregiverId: id };
  await callAs<typeof endCaregiver>(page, product, 'delete', '/api/caregivers/:caregiverId', { params });
  await invite();
  return link;
};

// A dozen screens in one walk, each searched by axe.
test.describe.configure({ timeout: 180_000 });

for (const { name, viewport, colorScheme } of looks) {
  test.describe(name, () => {
    test.use({ viewport, colorScheme, reducedMotion: 'reduce' });

    test('axe and the content policy find nothing on the ways in', async ({ page, product }) => {
      const { complaints } = await watch(page);
      await inspectPlace(page, '/sign-in', 'Sign in');
      await inspectPlace(page, '/start', 'Start with your letter');
      await inspectPlace(page, '/forgot-password', 'Choose a new password');
      await givePassword(page, product, 'Petra Lindqvist');
      await expect(page.getByLabel('Code of six digits')).toBeVisible();
      await inspect(page, 'second step');
      await signIn(page, product, 'Teo Valcourt');
      await inspectPlace(page, '/caring', 'Who are you here for?');
      await page.getByRole('button', { name: 'Ruth Abramowicz' }).click();
      await expect(page.getByText('For Ruth Abramowicz', { exact: true })).toBeVisible();
      await expect(page.getByRole('heading', { name: 'Hold off for now' })).toBeVisible();
      await inspect(page, 'Today of somebody else');
      expect(complaints).toEqual([]);
    });

    test('axe and the content policy find nothing on a patient’s account', async ({ page, product }) => {
      const { complaints } = await watch(page);
      await signIn(page, product, 'Gwen Thackeray');
      const spent = await replacedInvitation(page, product);
      await inspectPlace(page, '/account', 'Your account');
      await inspectPlace(
        page,
        '/account/sign-in',
        'Sign-in and devices',
        page.getByText('This one', { exact: true }),
      );
      await inspectPlace(
        page,
        '/account/notifications',
        'How we reach you',
        page.getByRole('button', { name: 'Save' }),
      );
      await inspectPlace(page, '/account/caregivers', 'People who help me', page.getByText(/Ended on/));
      await page.getByRole('button', { name: 'Invite someone' }).click();
      await expect(page.getByLabel('Their e-mail')).toBeVisible();
      await inspect(page, 'form for a caregiver');
      await inspectPlace(
        page,
        '/account/activity',
        'Who opened my record',
        page.getByLabel('Show what I did too'),
      );
      await tick(page, 'Show what I did too');
      await expect(page.getByRole('main').getByRole('listitem').first()).toBeVisible();
      await inspect(page, 'activity with one’s own');
      await page.goto(spent);
      await expect(page.getByRole('heading', { name: 'This invitation no longer works' })).toBeVisible();
      await inspect(page, 'replaced invitation');
      expect(complaints).toEqual([]);
    });

    test('axe and the content policy find nothing on the patient’s screens', async ({ page, product }) => {
      const { complaints } = await watch(page);
      await signIn(page, product, 'Gwen Thackeray');
      await expect(emergencyLine(page)).toBeVisible();
      await inspect(page, 'Today');
      for (const [path, heading] of [
        ['/plan', /My plan/],
        ['/messages', /Messages/],
        ['/messages/new', /message/i],
        ['/nowhere', /./],
      ] as const) {
        await inspectPlace(page, path, heading);
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
  });
}
