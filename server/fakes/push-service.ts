import { createECDH, randomBytes, randomUUID } from 'node:crypto';
import type { IncomingMessage } from 'node:http';
import { join } from 'node:path';
import { buffer } from 'node:stream/consumers';
import { openLinesFile } from './lines-file.ts';
import { decryptPush } from './push-decryption.ts';
import type { Refusals } from './refusals.ts';
import { headerOf, notThere, type FakeAnswer } from './requests.ts';
import type { SentPush } from './sent.ts';

/** The keys that a real device keeps to itself, base64url. */
type Device = { id: string; publicKey: string; privateKey: string; auth: string };

const bytes = (text: string) => Buffer.from(text, 'base64url');

function newDevice(): Device {
  const pair = createECDH('prime256v1');
  pair.generateKeys();
  return {
    id: randomUUID(),
    publicKey: pair.getPublicKey('base64url'),
    // A private key may begin with zeros, which Node leaves out.
    privateKey: Buffer.concat([Buffer.alloc(32), pair.getPrivateKey()])
      .subarray(-32)
      .toString('base64url'),
    auth: randomBytes(16).toString('base64url'),
  };
}

/** A push service, and the devices behind it: it decrypts what arrives for one of them and keeps it. */
export function pushService({
  folder,
  refusals,
  keep,
}: {
  folder: string;
  refusals: Refusals;
  keep: (push: SentPush) => void;
}) {
  const devices = openLinesFile<Device>(join(folder, 'push-devices.jsonl'));
  return {
    /** Makes a device, and gives what its browser would tell a page of it. */
    addDevice(): FakeAnswer {
      const device = newDevice();
      devices.put(device);
      const { id, publicKey, auth } = device;
      return { status: 201, body: { endpoint: `https://push.example/push/${id}`, p256dh: publicKey, auth } };
    },

    async receive(deviceId: string, request: IncomingMessage): Promise<FakeAnswer> {
      const message = await buffer(request);
      const refusedWith = refusals.now('push');
      if (refusedWith !== null) return { status: refusedWith };
      const device = devices.get(deviceId);
      // A real browser's push comes here as "elsewhere": it is kept, and cannot be read.
      if (!device && deviceId !== 'elsewhere') return notThere;
      if (!headerOf(request, 'authorization').startsWith('vapid ')) return { status: 401 };
      if (headerOf(request, 'content-encoding') !== 'aes128gcm') return { status: 400 };
      const payload = device
        ? decryptPush(message, {
            publicKey: bytes(device.publicKey),
            privateKey: bytes(device.privateKey),
            auth: bytes(device.auth),
          })
        : null;
      keep({
        kind: 'push',
        id: randomUUID(),
        at: new Date().toISOString(),
        deviceId: device?.id ?? null,
        payload,
        urgency: headerOf(request, 'urgency'),
        topic: headerOf(request, 'topic'),
        ttl: Number(headerOf(request, 'ttl')),
      });
      return { status: 201 };
    },
  };
}
