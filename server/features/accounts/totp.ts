import { Secret, TOTP } from 'otpauth';

/** What every authenticator app understands (RFC 6238 with SHA-1, 6 digits, 30 seconds). */
const settings = { issuer: 'Espalier', algorithm: 'SHA1', digits: 6, period: 30 } as const;

/** A clock may be one step off, either way. */
const window = 1;

/** 160 bits, the length of the hash (RFC 4226, section 4), in base 32. */
export const newTotpSecret = (): string => new Secret({ size: 20 }).base32;

/** What an app reads from the picture. The label says whose it is, beside others in the same app. */
export const totpUri = (secret: string, email: string): string =>
  new TOTP({ ...settings, label: email, secret }).toString();

/** The time step that a code belongs to; null where it is none of the steps that count now. */
export const stepOfCode = (secret: string, code: string, now: Date): number | null => {
  const token = code.replace(/\s/g, '');
  // The library compares bytes, and throws at six characters that are more bytes than six.
  if (!/^[0-9]{6}$/.test(token)) return null;
  const totp = new TOTP({ ...settings, secret });
  const timestamp = now.getTime();
  const distance = totp.validate({ token, timestamp, window });
  return distance === null ? null : totp.counter({ timestamp }) + distance;
};
