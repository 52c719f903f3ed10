import type pg from 'pg';

/** What use cases need of the server around them: the gate, its own address, and the keys that it signs and seals with. */
export type Site = {
  gate: pg.Pool;
  /** Without a slash at the end. */
  publicUrl: string;
  /** Makes the secrets of one-time links and codes. */
  tokenSecret: string;
  /** Seals what must be read again, such as the secret of an authenticator app. */
  sealSecret: string;
  /** By which browsers know this server (RFC 8292), base64url. */
  vapidPublicKey: string;
};
