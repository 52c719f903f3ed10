/** The reference library of RFC 8188 and RFC 8291; it ships no types. */
declare module 'http_ece' {
  import type { ECDH } from 'node:crypto';

  export function decrypt(
    message: Buffer,
    params: { version: 'aes128gcm'; privateKey: ECDH; authSecret: string },
  ): Buffer;
}
