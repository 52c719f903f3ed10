import { createHmac, randomBytes } from 'node:crypto';
import type { Me, SignInStep } from '#shared/accounts/contract.ts';
import type { PasskeyQuestion } from '#server/features/accounts/passkeys.ts';
import { authenticatorPurpose, seal } from '#server/features/accounts/sealing.ts';
import type { SoftAuthenticator } from '#tests/support/authenticator.ts';
import { testPassword, type TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import { testSecrets } from '#tests/support/secrets.ts';
import type { Answer, TestBrowser, TestWeb } from '#tests/support/web.ts';

const base32 = 'ABCDEFGHIJKLMNOPQRSTUVWXYZ234567';

const bitsOf = (secret: string): string =>
  [...secret].map((letter) => base32.indexOf(letter).toString(2).padStart(5, '0')).join('');

/** The code of an app, by RFC 6238 and the truncation of RFC 4226, section 5.3, and by no library. */
export const codeAt = (secret: string, now: Date): string => {
  const bytes = bitsOf(secret).match(/.{8}/g) ?? [];
  const key = Buffer.from(bytes.map((byte) => Number.parseInt(byte, 2)));
  const counter = Buffer.alloc(8);
  counter.writeBigUInt64BE(BigInt(Math.floor(now.getTime() / 30_000)));
  const mac = createHmac('sha1', key).update(counter).digest();
  const offset = mac[19]! & 15;
  return String((mac.readUInt32BE(offset) & 0x7fffffff) % 1_000_000).padStart(6, '0');
};

/** A confirmed authenticator app; gives its secret. */
export const plantAuthenticator = async (
  { asSuperuser }: TestDatabase,
  { clinicId, personId }: TestPerson,
): Promise<string> => {
  const secret = [...randomBytes(32)].map((byte) => base32[byte % 32]).join('');
  await asSuperuser.query(
    `insert into authenticators (person_id, clinic_id, sealed_secret, confirmed_at) values ($1, $2, $3, now())
     on conflict (person_id) do update
       set sealed_secret = $3, confirmed_at = now(), last_step = null, next_sealed_secret = null`,
    [personId, clinicId, seal(testSecrets.sealSecret, authenticatorPurpose, secret)],
  );
  return secret;
};

export const tryPassword = (
  browser: TestBrowser,
  { email }: { email: string },
  password = testPassword,
): Promise<Answer> => browser.call('post', '/api/session', { email, password });

/** The id of the half-done sign-in of somebody who has a second factor. */
export const pendingOf = async (web: TestWeb, person: TestPerson): Promise<string> => {
  const answer = await tryPassword(web.anonymous(), person);
  const step = answer.body as SignInStep;
  if (step.next !== 'second-factor') throw new Error(`No second factor was asked for: ${answer.text}`);
  return step.pendingId;
};

/** Signed in by what the routes answer, as a page does it; for staff without a second factor that is set-up. */
export const signInPlainly = async (web: TestWeb, person: TestPerson): Promise<TestBrowser> => {
  const browser = web.anonymous();
  const answer = await tryPassword(browser, person);
  const step = answer.body as SignInStep;
  if (answer.status !== 201 || step.next !== 'none') throw new Error(`Signing in failed: ${answer.text}`);
  browser.me = step.me;
  return browser;
};

/** Makes a passkey on a phone and adds it to the account of whoever is signed in. */
export const addPasskeyOn = async (
  browser: TestBrowser,
  phone: SoftAuthenticator,
  misuse?: Parameters<SoftAuthenticator['register']>[1],
): Promise<Answer> => {
  const question = (await browser.call('post', '/api/passkeys/question')).body as PasskeyQuestion;
  return browser.call('post', '/api/passkeys', { passkey: phone.register(question, misuse) });
};

export const askToEnter = async (web: TestWeb): Promise<PasskeyQuestion> =>
  (await web.anonymous().call('post', '/api/session/passkey-question')).body as PasskeyQuestion;

/** Signs in with the newest passkey of a phone, or whichever the misuse names. */
export const enterWith = async (
  web: TestWeb,
  phone: SoftAuthenticator,
  misuse?: Parameters<SoftAuthenticator['answer']>[1],
): Promise<{ answer: Answer; browser: TestBrowser }> => {
  const passkey = phone.answer(await askToEnter(web), misuse);
  const browser = web.anonymous();
  const answer = await browser.call('post', '/api/session/passkey', { passkey });
  if (answer.status === 201) browser.me = (answer.body as { me: Me }).me;
  return { answer, browser };
};

/** The kinds of mail that wait for somebody, with where their links lead. */
export const mailsTo = async ({ asSuperuser }: TestDatabase, { personId }: { personId: string }) => {
  const { rows } = await asSuperuser.query<{ kind: string; path: string; occasion: string }>(
    'select kind, path, occasion from notifications where person_id = $1 order by created_at, id',
    [personId],
  );
  return rows;
};

/** By name, since what happens in one instant has no order. */
export const auditOf = async ({ asSuperuser }: TestDatabase, { personId }: { personId: string }) => {
  const { rows } = await asSuperuser.query<{ action: string }>(
    'select action from audit_entries where person_id = $1 order by action',
    [personId],
  );
  return rows.map(({ action }) => action);
};
