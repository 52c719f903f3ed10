import { randomUUID } from 'node:crypto';
import { afterAll, afterEach, beforeAll, expect, test } from 'vitest';
import twilio from 'twilio';
import { openPush } from '#server/notifications/push.ts';
import { testSecrets, testVapidPrivateKey } from '#tests/support/secrets.ts';
import { fakeAccount, startFakes, type FakeDevice, type RunningFakes } from './running.ts';

let fakes: RunningFakes;

beforeAll(async () => {
  fakes = await startFakes();
});

afterAll(() => fakes.stop());

afterEach(() => {
  expect(fakes.errors.splice(0)).toEqual([]);
});

const pushTo = (device: FakeDevice) =>
  openPush({
    vapid: {
      publicKey: testSecrets.vapidPublicKey,
      privateKey: testVapidPrivateKey,
      subject: 'mailto:on-call@clinic.example',
    },
    fakeUrl: fakes.url,
  }).send({
    ...{
      id: randomUUID(),
      clinicId: randomUUID(),
      kind: 'new-message',
      channel: 'push',
      path: '/messages/1',
    },
    ...{ email: 'noor@people.example', phone: null, subscription: device },
  });

test('a device of the fake decrypts what the product sends it, and shows it', async () => {
  const device = await fakes.addDevice();
  await pushTo(device);
  const [push] = await fakes.sent('push');
  expect(push).toMatchObject({ urgency: 'normal', ttl: 86_400, deviceId: device.endpoint.split('/').at(-1) });
  expect(JSON.parse(push!.payload ?? '')).toMatchObject({
    kind: 'new-message',
    body: 'A new message is waiting for you.',
    path: '/messages/1',
  });
});

test('a real browser’s push is kept, and says that it cannot be read here', async () => {
  const device = await fakes.addDevice();
  await pushTo({ ...device, endpoint: 'https://updates.push.services.example/wpush/v2/abc' });
  expect((await fakes.sent('push'))[0]).toMatchObject({ deviceId: null, payload: null });
});

test('a device that is not there is gone, and the push service can be told to be down or to forget', async () => {
  const device = await fakes.addDevice();
  const missing = { ...device, endpoint: `https://push.example/push/${randomUUID()}` };
  await expect(pushTo(missing)).rejects.toMatchObject({ reason: 'gone' });
  const before = (await fakes.sent('push')).length;
  await fakes.refuse('push', 410);
  await expect(pushTo(device)).rejects.toMatchObject({ reason: 'gone' });
  await fakes.refuse('push', 500);
  await expect(pushTo(device)).rejects.toMatchObject({ code: 'http-500' });
  await fakes.refuse('push', null);
  expect(await fakes.sent('push')).toHaveLength(before);
  await pushTo(device);
  expect(await fakes.sent('push')).toHaveLength(before + 1);
});

test('the gateway speaks as the SDK expects, and lets in only who knows the token', async () => {
  class Client extends twilio.RequestClient {
    override request<T>(options: Parameters<twilio.RequestClient['request']>[0]) {
      const uri = options.uri.replace('https://api.twilio.com', fakes.url);
      return super.request<T>({ ...options, uri } as Parameters<
        typeof twilio.RequestClient.prototype.request<T>
      >[0]);
    }
  }
  const clientWith = (token: string) => twilio(fakeAccount.accountSid, token, { httpClient: new Client() });
  const sms = { to: '+12025550111', from: '+12025550100', body: 'Anything.' };
  const sent = await clientWith(fakeAccount.authToken).messages.create(sms);
  expect(sent).toMatchObject({ status: 'queued', to: '+12025550111' });
  expect((await fakes.sent('sms'))[0]).toMatchObject({ id: sent.sid, text: 'Anything.' });
  await expect(clientWith('another token').messages.create(sms)).rejects.toMatchObject({ status: 401 });
  await expect(
    clientWith(fakeAccount.authToken).messages.create({ ...sms, to: '+12025550199' }),
  ).rejects.toMatchObject({ status: 400, code: 21211 });
});

test('what it does not know it says so, and a call that is over cannot be ended again', async () => {
  expect((await fakes.post('/anything')).status).toBe(404);
  expect((await fakes.post('/calls/CA0/ring-out')).status).toBe(404);
  expect((await fakes.post('/calls/CA0/keys', { digit: '12' })).status).toBe(400);
  expect((await fakes.post('/refuse', { until: 'soon', channel: 'push' })).status).toBe(400);
});
