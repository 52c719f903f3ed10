import { createECDH } from 'node:crypto';
import { decrypt } from 'http_ece';
import { expect, it } from 'vitest';
import { decryptPush } from '#server/fakes/push-decryption.ts';

// RFC 8291, section 5, with the intermediate values of appendix A.
const rfc8291 = {
  plaintext: 'When I grow up, I want to be a watermelon',
  receiverPublic: 'BCVxsr7N_eNgVRqvHtD0zTZsEc6-VV-JvLexhqUzORcxaOzi6-AYWXvTBHm4bjyPjs7Vd8pZGH6SRpkNtoIAiw4',
  receiverPrivate: 'q1dXpw3UpT5VOmu_cf_v6ih07Aems3njxI-JWgLcM94',
  auth: 'BTBZMqHH6r4Tts7J_aSIgg',
  message:
    'DGv6ra1nlYgDCS1FRnbzlwAAEABBBP4z9KsN6nGRTbVYI_c7VJSPQTBtkgcy27mlmlMoZIIgDll6e3vCYLocInmYWAmS6TlzAC8wEqKK' +
    '6PBru3jl7A_yl95bQpu6cVPTpK4Mqgkf1CXztLVBSt2Ks3oZwbuwXPXLWyouBWLVWGNWQexSgSxsj_Qulcy4a-fN',
};

const bytes = (text: string) => Buffer.from(text, 'base64url');
const message = bytes(rfc8291.message);
const keys = {
  publicKey: bytes(rfc8291.receiverPublic),
  privateKey: bytes(rfc8291.receiverPrivate),
  auth: bytes(rfc8291.auth),
};

it('the fake decrypts the example of RFC 8291, and so does the reference library', () => {
  expect(decryptPush(message, keys)).toBe(rfc8291.plaintext);
  const privateKey = createECDH('prime256v1');
  privateKey.setPrivateKey(keys.privateKey);
  const reference = decrypt(message, { version: 'aes128gcm', privateKey, authSecret: rfc8291.auth });
  expect(reference.toString()).toBe(rfc8291.plaintext);
});

it('the fake takes no message with a changed byte, whichever it is', () => {
  for (let index = 0; index < message.length; index += 1) {
    const changed = Buffer.from(message);
    changed.writeUInt8(changed.readUInt8(index) ^ 1, index);
    // The record size may differ and still be large enough; everything else is held by key or tag.
    if (index >= 16 && index < 20) continue;
    expect(() => decryptPush(changed, keys), `byte ${index}`).toThrow();
  }
});

it('the fake takes nothing that is cut short, and no secret of another device', () => {
  for (const length of [0, 16, 21, 86, 87, message.length - 1]) {
    expect(() => decryptPush(message.subarray(0, length), keys), `${length} bytes`).toThrow();
  }
  expect(() => decryptPush(message, { ...keys, auth: Buffer.alloc(16) })).toThrow();
});
