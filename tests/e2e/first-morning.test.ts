import { expect } from '@playwright/test';
import { test } from '#tests/support/e2e.ts';
import { desk, phone, signIn, watch, tick } from './people.ts';
import { wakeAtAnyHour } from './push-device.ts';

test('a fall on the phone reaches the open round, and the reply reaches the phone, without a reload', async ({
  browser,
  product,
}) => {
  const patientContext = await browser.newContext({
    viewport: phone,
    baseURL: product.url,
    reducedMotion: 'reduce',
  });
  const therapistContext = await browser.newContext({
    viewport: desk,
    baseURL: product.url,
    reducedMotion: 'reduce',
  });
  const patient = await patientContext.newPage();
  const therapist = await therapistContext.newPage();
  const patientWatch = await watch(patient);
  const therapistWatch = await watch(therapist);

  await signIn(therapist, product, 'Noor Haddad');
  await expect(therapist).toHaveURL(/\/round/);
  const row = therapist.getByRole('listitem').filter({ hasText: 'Tobias Ahlgren' });
  await expect(row).toHaveCount(0);

  await signIn(patient, product, 'Tobias Ahlgren');
  await wakeAtAnyHour(patient, product);
  await patient.getByRole('link', { name: 'Start today’s check-in' }).click();
  await patient.getByRole('button', { name: '8', exact: true }).click();
  await patient.getByRole('heading', { name: /worst pain/ }).waitFor();
  await patient.getByRole('button', { name: '8', exact: true }).click();
  await patient.getByRole('button', { name: 'The same' }).click();
  await patient.getByRole('button', { name: 'As advised' }).click();
  await patient.getByRole('button', { name: 'None of these' }).click();
  await patient.getByRole('button', { name: /Shoulder or arm/ }).click();
  await tick(patient, 'A fall');

  // The caution stands at the tick, from the rules on the phone: pain up with a fall is urgent, not an emergency.
  // Out of hours it promises no call, and says whom to call instead.
  await expect(
    patient.getByRole('heading', { name: /^(We will call you|Call the on-call line now)$/ }),
  ).toBeVisible();
  await expect(patient.getByText('Keep your sling on.', { exact: false })).toBeVisible();
  await expect(patient.getByText(/Sent to the clinic/)).toBeVisible();
  await expect(patient.getByText('Nobody has seen it yet.')).toBeVisible();

  // The alert alone has raised the flag, before the check-in is finished.
  await expect(row).toBeVisible();
  await row.getByRole('link', { name: 'Tobias Ahlgren' }).click();
  await expect(therapist.getByRole('heading', { name: /Tobias Ahlgren, \d+/ })).toBeVisible();
  await expect(patient.getByText(/Noor Haddad has seen it/)).toBeVisible();

  await patient.getByRole('button', { name: 'Go on with the check-in' }).click();
  await patient.getByRole('button', { name: 'Next' }).click();
  await tick(patient, 'I fell on the arm');
  await patient.getByRole('button', { name: 'Next' }).click();
  await patient.getByRole('button', { name: 'Send' }).click();
  await expect(patient.getByRole('heading', { name: /Thank you, Tobias/ })).toBeVisible();

  // One flag, now with the finished answers.
  await expect(therapist.getByText(/Fall onto the arm; pain 8, usual 3/).first()).toBeVisible();
  await expect(row).toHaveCount(1);

  await therapist.getByRole('button', { name: 'Claim' }).click();
  await expect(therapist.getByRole('button', { name: 'Release' })).toBeVisible();
  await therapist.getByRole('button', { name: 'Reply to Tobias' }).click();
  const words = 'Please keep the sling on. I will ring you before noon.';
  await therapist.getByRole('textbox', { name: 'Reply to Tobias' }).fill(words);

  await patient
    .getByRole('link', { name: 'Back to Today' })
    .or(patient.getByRole('button', { name: 'Back to Today' }))
    .click();
  await patient.getByRole('link', { name: /^Messages/ }).click();
  await expect(patient.getByRole('heading', { name: 'Messages', level: 1 })).toBeVisible();
  await therapist.getByRole('button', { name: 'Send' }).click();
  const thread = patient.getByRole('link', { name: /Your check-in on/ });
  await expect(thread).toBeVisible();
  await thread.click();
  await expect(patient.getByText(words)).toBeVisible();
  await expect(patient.getByText('Noor Haddad').first()).toBeVisible();

  await therapist.getByRole('button', { name: 'Close with an outcome' }).click();
  await tick(therapist, 'Advised by phone');
  await tick(therapist, 'Yes');
  await therapist.getByRole('button', { name: 'Close the flag' }).click();
  await expect(row).toHaveCount(0);

  // The mails arrived, and say nothing about anybody's health.
  await expect
    .poll(async () => (await therapist.request.get('/outbox')).text(), { timeout: 15_000 })
    .toContain('Espalier: a message is waiting');
  // The addresses that mail goes to are left out of the look: an address may hold its owner's name.
  const outbox = (await (await therapist.request.get('/outbox')).text()).replaceAll(/<dd>[^<]*<\/dd>/g, '');
  expect(outbox).toContain('Espalier: an urgent flag is waiting');
  expect(outbox).not.toMatch(/Tobias|Ahlgren|fall|pain|sling|shoulder|noon/i);

  expect(patientWatch.complaints).toEqual([]);
  expect(therapistWatch.complaints).toEqual([]);
  await patientContext.close();
  await therapistContext.close();
});
