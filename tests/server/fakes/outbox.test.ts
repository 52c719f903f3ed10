import { afterAll, beforeAll, expect, test } from 'vitest';
import { setTelephoneScene, type TelephoneScene } from '../telephone/scene.ts';

let scene: TelephoneScene;

beforeAll(async () => {
  scene = await setTelephoneScene();
});

afterAll(() => scene.stop());

const outbox = async (query = '') => {
  const answer = await fetch(`${scene.url}/outbox${query}`);
  expect(answer.status).toBe(200);
  return { text: await answer.text(), headers: answer.headers };
};

const act = (path: string, origin: string | null) =>
  fetch(`${scene.url}/outbox/${path}`, {
    method: 'POST',
    redirect: 'manual',
    headers: origin === null ? {} : { origin },
  });

const ringing = async () => {
  const id = await scene.plant({});
  await scene.send(id);
  return { id, sid: (await scene.row(id)).provider_id ?? '' };
};

test('the web shows what the fakes received, all of it or one kind', async () => {
  await ringing();
  const sms = await scene.plant({ channel: 'sms' });
  await scene.send(sms);
  const { text, headers } = await outbox();
  expect(text).toContain('Telephone call');
  expect(text).toContain('/sign-in</a>');
  expect(headers.get('cache-control')).toBe('no-store');
  // Fetch standard, "append a request Origin header": with no-referrer a form would send the origin "null".
  expect(headers.get('referrer-policy')).toBe('same-origin');
  expect((await outbox('?kind=sms')).text).not.toContain('Telephone call');
  expect((await outbox('?kind=nothing')).text).toContain('Telephone call');
});

// RFC 6238, appendix B: this secret at 59 s gives 94287082, of which an app with six digits shows the last six.
test('the codes are those that an authenticator app shows at that moment', async () => {
  const before = scene.now.at;
  scene.now.at = new Date(59_000);
  const { text } = await outbox();
  scene.now.at = before;
  expect(text).toContain('Noor Haddad');
  expect(text).toContain('287082');
  expect(text).toContain('for 1 more s');
});

test('the reader presses the key, or lets it ring out, and comes back to the calls', async () => {
  const heard = await ringing();
  const pressed = await act(`calls/${heard.sid}/press`, scene.url);
  expect([pressed.status, pressed.headers.get('location')]).toEqual([303, '/outbox?kind=call']);
  expect(await scene.row(heard.id)).toMatchObject({ outcome: 'acknowledged' });
  const missed = await ringing();
  expect((await act(`calls/${missed.sid}/ring-out`, scene.url)).status).toBe(303);
  expect(await scene.row(missed.id)).toMatchObject({ state: 'pending', last_error: 'no-answer' });
  // A second press of the same button finds the call over.
  expect((await act(`calls/${missed.sid}/press`, scene.url)).status).toBe(303);
  expect((await act('calls/..%2Frefuse/press', scene.url)).status).toBe(404);
});

test('no other page presses a key here', async () => {
  const { id, sid } = await ringing();
  for (const origin of ['https://elsewhere.example', 'null', null]) {
    expect((await act(`calls/${sid}/press`, origin)).status).toBe(403);
    expect((await act('push-devices', origin)).status).toBe(403);
  }
  expect(await scene.row(id)).toMatchObject({ outcome: null });
});

test('a browser without a push service is given a device whose pushes can be read here', async () => {
  const answer = await act('push-devices', scene.url);
  expect(answer.status).toBe(201);
  expect(await answer.json()).toEqual({
    endpoint: expect.stringMatching(/^https:\/\/push\.example\/push\//) as string,
    p256dh: expect.stringMatching(/^[\w-]{87}$/) as string,
    auth: expect.stringMatching(/^[\w-]{22}$/) as string,
  });
});
