import { createECDH } from 'node:crypto';

const vapid = createECDH('prime256v1');
vapid.generateKeys();

/** Keys of a web in a test, made anew for every run. */
export const testSecrets = {
  tokenSecret: 'test-token-secret-of-32-characters!!',
  sealSecret: 'test-seal-secret-of-32-characters!!!',
  vapidPublicKey: vapid.getPublicKey('base64url'),
};

/** A private key may begin with zeros, which Node leaves out. */
export const testVapidPrivateKey = Buffer.concat([Buffer.alloc(32), vapid.getPrivateKey()])
  .subarray(-32)
  .toString('base64url');
