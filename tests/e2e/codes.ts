import { Secret, TOTP } from 'otpauth';
import { demoAuthenticatorSecrets } from '#server/demo/accounts.ts';
import type { Product } from '#tests/support/product.ts';

const periodMs = 30_000;
/** By product and person: the newest time step of which a code was given. */
const given = new Map<string, number>();

const secretOf = (email: string): string | undefined =>
  demoAuthenticatorSecrets.find((one) => one.email === email)?.secret;

export const hasAuthenticator = (email: string): boolean => secretOf(email) !== undefined;

/**
 * A code that the product has not seen: each counts once, and the clocks may differ by one step. So there are
 * three at any moment, and a fourth has to wait for the next step, as its owner would.
 */
export const nextCode = async ({ url }: Product, email: string): Promise<string> => {
  const secret = secretOf(email);
  if (!secret) throw new Error(`${email} has no authenticator app in the demo.`);
  const step = () => Math.floor(Date.now() / periodMs);
  const key = `${url} ${email}`;
  const next = Math.max(step() - 1, (given.get(key) ?? 0) + 1);
  given.set(key, next);
  if (next > step() + 1) {
    const opensAt = (next - 1) * periodMs;
    await new Promise<void>((resolve) => setTimeout(resolve, opensAt - Date.now() + 50));
  }
  const totp = new TOTP({ secret: Secret.fromBase32(secret), digits: 6, period: periodMs / 1000 });
  return totp.generate({ timestamp: next * periodMs });
};
