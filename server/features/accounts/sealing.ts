import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto';

const keyFor = (secret: string, purpose: string): Buffer =>
  Buffer.from(hkdfSync('sha256', secret, '', purpose, 32));

/** Seals a text that must be read again: AES-256-GCM under a key of its purpose (HKDF, RFC 5869), base64url. */
export const seal = (secret: string, purpose: string, text: string): string => {
  const nonce = randomBytes(12);
  const cipher = createCipheriv('aes-256-gcm', keyFor(secret, purpose), nonce);
  const sealed = Buffer.concat([cipher.update(text, 'utf8'), cipher.final()]);
  return Buffer.concat([nonce, cipher.getAuthTag(), sealed]).toString('base64url');
};

/** What was sealed; throws where it was changed, or sealed under another secret or for another purpose. */
export const unseal = (secret: string, purpose: string, sealed: string): string => {
  const bytes = Buffer.from(sealed, 'base64url');
  const decipher = createDecipheriv('aes-256-gcm', keyFor(secret, purpose), bytes.subarray(0, 12));
  decipher.setAuthTag(bytes.subarray(12, 28));
  return Buffer.concat([decipher.update(bytes.subarray(28)), decipher.final()]).toString('utf8');
};

/** The purpose under which the secrets of authenticator apps are sealed. */
export const authenticatorPurpose = 'authenticator';
