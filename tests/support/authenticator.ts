import { createHash, generateKeyPairSync, randomBytes, sign, type KeyObject } from 'node:crypto';
import type { PasskeyAnswer, PasskeyQuestion } from '#server/features/accounts/passkeys.ts';

/**
 * A phone that makes and uses passkeys, in software: ES256 keys, attestation "none" (WebAuthn Level 3, sections
 * 6.1, 6.5 and 8.7; CBOR of RFC 8949; COSE keys of RFC 9053). The server's verification is the real one.
 */
export type SoftAuthenticator = {
  register: (question: PasskeyQuestion, misuse?: Misuse) => PasskeyAnswer;
  /** Uses the newest passkey that the question allows, or the one of that person. */
  answer: (question: PasskeyQuestion, misuse?: Misuse & { personId?: string }) => PasskeyAnswer;
};

/** What a dishonest or broken device or page would do otherwise. */
type Misuse = {
  origin?: string;
  challenge?: string;
  counter?: number;
  credentialId?: Buffer;
  userHandle?: string;
  unverified?: true;
};

type Held = { credentialId: Buffer; key: KeyObject; userHandle: string; counter: number };

const sha256 = (data: Buffer | string): Buffer => createHash('sha256').update(data).digest();

type Cbor = number | string | Buffer | Map<number | string, Cbor>;

const head = (major: number, value: number): Buffer => {
  if (value < 24) return Buffer.from([(major << 5) | value]);
  if (value < 256) return Buffer.from([(major << 5) | 24, value]);
  return Buffer.from([(major << 5) | 25, value >> 8, value & 255]);
};

const cbor = (value: Cbor): Buffer => {
  if (typeof value === 'number') return value < 0 ? head(1, -1 - value) : head(0, value);
  if (typeof value === 'string')
    return Buffer.concat([head(3, Buffer.byteLength(value)), Buffer.from(value)]);
  if (Buffer.isBuffer(value)) return Buffer.concat([head(2, value.length), value]);
  const pairs = [...value].flatMap(([key, inner]) => [cbor(key), cbor(inner)]);
  return Buffer.concat([head(5, value.size), ...pairs]);
};

const coseKey = (publicKey: KeyObject): Buffer => {
  const { x = '', y = '' } = publicKey.export({ format: 'jwk' });
  return cbor(
    new Map<number, Cbor>([
      [1, 2],
      [3, -7],
      [-1, 1],
      [-2, Buffer.from(x, 'base64url')],
      [-3, Buffer.from(y, 'base64url')],
    ]),
  );
};

const flags = { present: 0x01, verified: 0x04, mayBeBackedUp: 0x08, backedUp: 0x10, attested: 0x40 };

const authenticatorData = (rpId: string, counter: number, more: number, { unverified }: Misuse): Buffer => {
  const bits =
    flags.present | (unverified ? 0 : flags.verified) | flags.mayBeBackedUp | flags.backedUp | more;
  const count = Buffer.alloc(4);
  count.writeUInt32BE(counter);
  return Buffer.concat([sha256(rpId), Buffer.from([bits]), count]);
};

type CreationOptions = { challenge: string; rp: { id: string }; user: { id: string } };
type RequestOptions = { challenge: string; rpId: string; allowCredentials?: { id: string }[] };

export const softAuthenticator = (pageOrigin: string): SoftAuthenticator => {
  const held: Held[] = [];

  const clientData = (type: string, challenge: string, misuse: Misuse): Buffer =>
    Buffer.from(
      JSON.stringify({
        type,
        challenge: misuse.challenge ?? challenge,
        origin: misuse.origin ?? pageOrigin,
        crossOrigin: false,
      }),
    );

  const chosen = (allowed: { id: string }[] | undefined, personId: string | undefined): Held => {
    const ids = allowed?.map(({ id }) => id) ?? [];
    const found = held.findLast(
      ({ credentialId, userHandle }) =>
        (ids.length === 0 || ids.includes(credentialId.toString('base64url'))) &&
        (personId === undefined || Buffer.from(userHandle, 'base64url').toString() === personId),
    );
    if (!found) throw new Error('This phone has no passkey that fits.');
    return found;
  };

  return {
    register: ({ challengeId, options }, misuse = {}) => {
      const { challenge, rp, user } = options as unknown as CreationOptions;
      const { publicKey, privateKey } = generateKeyPairSync('ec', { namedCurve: 'P-256' });
      const credentialId = misuse.credentialId ?? randomBytes(16);
      const counter = misuse.counter ?? 0;
      held.push({ credentialId, key: privateKey, userHandle: user.id, counter });
      const idLength = Buffer.from([0, credentialId.length]);
      const authData = Buffer.concat([
        authenticatorData(rp.id, counter, flags.attested, misuse),
        Buffer.alloc(16),
        idLength,
        credentialId,
        coseKey(publicKey),
      ]);
      const attestation = cbor(
        new Map<string, Cbor>([
          ['fmt', 'none'],
          ['attStmt', new Map()],
          ['authData', authData],
        ]),
      );
      const id = credentialId.toString('base64url');
      return {
        challengeId,
        response: {
          id,
          rawId: id,
          type: 'public-key',
          authenticatorAttachment: 'platform',
          clientExtensionResults: {},
          response: {
            clientDataJSON: clientData('webauthn.create', challenge, misuse).toString('base64url'),
            attestationObject: attestation.toString('base64url'),
            transports: ['internal'],
          },
        },
      };
    },
    answer: ({ challengeId, options }, misuse = {}) => {
      const { challenge, rpId, allowCredentials } = options as unknown as RequestOptions;
      const passkey = chosen(allowCredentials, misuse.personId);
      passkey.counter = misuse.counter ?? passkey.counter + 1;
      const authData = authenticatorData(rpId, passkey.counter, 0, misuse);
      const data = clientData('webauthn.get', challenge, misuse);
      const signature = sign('sha256', Buffer.concat([authData, sha256(data)]), passkey.key);
      const id = passkey.credentialId.toString('base64url');
      return {
        challengeId,
        response: {
          id,
          rawId: id,
          type: 'public-key',
          authenticatorAttachment: 'platform',
          clientExtensionResults: {},
          response: {
            clientDataJSON: data.toString('base64url'),
            authenticatorData: authData.toString('base64url'),
            signature: signature.toString('base64url'),
            userHandle: misuse.userHandle ?? passkey.userHandle,
          },
        },
      };
    },
  };
};
