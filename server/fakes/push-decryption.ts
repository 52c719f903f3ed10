import { createDecipheriv, createECDH, hkdfSync } from 'node:crypto';

/** What a browser keeps of a push subscription: its key pair (P-256) and the authentication secret. */
export type PushKeys = { publicKey: Buffer; privateKey: Buffer; auth: Buffer };

const tagBytes = 16;

const derive = (secret: Buffer, salt: Buffer, info: Buffer, length: number): Buffer =>
  Buffer.from(hkdfSync('sha256', secret, salt, info, length));

/** The header of aes128gcm (RFC 8188, section 2.1): salt, record size, and the sender's public key as key id. */
function readHeader(message: Buffer) {
  if (message.length < 21) throw new Error('The message is shorter than its header.');
  const keyEnd = 21 + message.readUInt8(20);
  return {
    salt: message.subarray(0, 16),
    recordSize: message.readUInt32BE(16),
    senderKey: message.subarray(21, keyEnd),
    record: message.subarray(keyEnd),
  };
}

/**
 * Decrypts a push as a browser does: RFC 8291 over RFC 8188, written from their text and from nothing that the
 * sending side uses, so that what the one side wrote the other can be held to.
 */
export function decryptPush(message: Buffer, { publicKey, privateKey, auth }: PushKeys): string {
  const { salt, recordSize, senderKey, record } = readHeader(message);
  // A push is one record (RFC 8291, section 4).
  if (record.length > recordSize || record.length <= tagBytes) throw new Error('A push is one whole record.');
  const own = createECDH('prime256v1');
  own.setPrivateKey(privateKey);
  const shared = own.computeSecret(senderKey);
  const keyInfo = Buffer.concat([Buffer.from('WebPush: info\0'), publicKey, senderKey]);
  const secret = derive(shared, auth, keyInfo, 32);
  const key = derive(secret, salt, Buffer.from('Content-Encoding: aes128gcm\0'), 16);
  const nonce = derive(secret, salt, Buffer.from('Content-Encoding: nonce\0'), 12);
  const decipher = createDecipheriv('aes-128-gcm', key, nonce);
  decipher.setAuthTag(record.subarray(-tagBytes));
  const padded = Buffer.concat([decipher.update(record.subarray(0, -tagBytes)), decipher.final()]);
  // The last record ends with 2 and any number of zeros (RFC 8188, section 2).
  const end = padded.findLastIndex((byte) => byte !== 0);
  if (end < 0 || padded[end] !== 2) throw new Error('The padding of the last record is not right.');
  return padded.subarray(0, end).toString('utf8');
}
