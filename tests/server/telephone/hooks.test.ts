import { createHmac, randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { fakeAccount } from '../fakes/running.ts';
import { bounceToken, setTelephoneScene, type TelephoneScene } from './scene.ts';

let scene: TelephoneScene;

beforeAll(async () => {
  scene = await setTelephoneScene();
});

afterAll(() => scene.stop());

beforeEach(async () => {
  await scene.database.asSuperuser.query('delete from notifications');
});

/**
 * The gateway's published way to sign, written here without its SDK: HMAC-SHA1, base64, over the address and each
 * parameter's name and value in the order of the names.
 */
const sign = (url: string, params: Record<string, string>, token = fakeAccount.authToken): string => {
  const text = Object.keys(params)
    .sort()
    .map((name) => `${name}${params[name]}`)
    .join('');
  return createHmac('sha1', token).update(`${url}${text}`).digest('base64');
};

const post = async (path: string, params: Record<string, string>, signature?: string) => {
  const url = `${scene.url}${path}`;
  const answer = await fetch(url, {
    method: 'POST',
    headers: { 'x-twilio-signature': signature ?? sign(url, params) },
    body: new URLSearchParams(params),
  });
  return { status: answer.status, text: await answer.text(), type: answer.headers.get('content-type') };
};

const hookOf = (id: string, what: string, kind = 'calls') =>
  `/gateway/${kind}/${scene.therapist.clinicId}/${id}/${what}`;

const sentCall = async () => {
  const id = await scene.plant({});
  await scene.send(id);
  return { id, sid: (await scene.row(id)).provider_id ?? '' };
};

describe('what the telephone gateway tells', () => {
  it('a key press that it signed is thanked for, and acknowledges', async () => {
    const { id, sid } = await sentCall();
    const answer = await post(hookOf(id, 'keys'), { CallSid: sid, Digits: '1' });
    expect(answer).toMatchObject({ status: 200, type: 'text/xml; charset=utf-8' });
    expect(answer.text).toContain('<Say>Thank you. Open Espalier now.</Say>');
    expect((await scene.row(id)).acknowledged_at).not.toBeNull();
  });

  it('another key is asked for once more, and acknowledges nothing', async () => {
    const { id, sid } = await sentCall();
    const { text } = await post(hookOf(id, 'keys'), { CallSid: sid, Digits: '4' });
    expect(text).toContain('Press 1 to say that you have heard this.');
    expect(text).toContain(`action="${scene.url}${hookOf(id, 'keys')}"`);
    expect((await scene.row(id)).acknowledged_at).toBeNull();
  });

  it('what is not signed, or signed for something else, is refused and changes nothing', async () => {
    const { id, sid } = await sentCall();
    const path = hookOf(id, 'keys');
    const params = { CallSid: sid, Digits: '1' };
    for (const signature of [
      '',
      'AAAA',
      sign(`${scene.url}${path}`, { ...params, Digits: '2' }),
      sign(`${scene.url}${hookOf(randomUUID(), 'keys')}`, params),
      sign(`${scene.url}${path}`, params, 'another-token'),
    ]) {
      expect((await post(path, params, signature)).status).toBe(403);
      const status = await post(hookOf(id, 'status'), { CallSid: sid, CallStatus: 'no-answer' }, signature);
      expect(status.status).toBe(403);
    }
    expect(await scene.row(id)).toMatchObject({ state: 'sent', outcome: null, acknowledged_at: null });
  });

  it('an id that names nothing is answered like one that does', async () => {
    const { id, sid } = await sentCall();
    const params = { CallSid: sid, Digits: '1' };
    const known = await post(hookOf(id, 'keys'), params);
    for (const other of [randomUUID(), 'no-id']) {
      expect(await post(hookOf(other, 'keys'), params)).toEqual(known);
      expect((await post(hookOf(other, 'status'), { CallSid: sid, CallStatus: 'busy' })).status).toBe(204);
    }
  });

  it('busy and failed calls are made again, and a call that was taken is not', async () => {
    for (const CallStatus of ['busy', 'failed', 'canceled', 'no-answer']) {
      const { id, sid } = await sentCall();
      await post(hookOf(id, 'status'), { CallSid: sid, CallStatus });
      expect((await scene.row(id)).state, CallStatus).toBe('pending');
      await scene.database.asSuperuser.query('delete from notifications');
    }
    const { id, sid } = await sentCall();
    await post(hookOf(id, 'status'), { CallSid: sid, CallStatus: 'ringing' });
    expect(await scene.row(id)).toMatchObject({ state: 'sent', outcome: null });
    await post(hookOf(id, 'status'), { CallSid: sid, CallStatus: 'completed' });
    expect(await scene.row(id)).toMatchObject({ state: 'sent', outcome: 'answered' });
  });

  it('late news of an earlier try says nothing about the one that was made since', async () => {
    const { id, sid } = await sentCall();
    await post(hookOf(id, 'status'), {
      CallSid: 'CAffffffffffffffffffffffffffffffff',
      CallStatus: 'no-answer',
    });
    expect(await scene.row(id)).toMatchObject({ state: 'sent', provider_id: sid });
  });

  it('news that comes before the try is marked is not lost', async () => {
    const id = await scene.plant({});
    await scene.send(id, {
      send: async (outgoing) => {
        const sent = await scene.channels.phone.send(outgoing);
        const rang = await scene.fakes.post(`/calls/${sent.providerId}/ring-out`);
        expect(rang.status).toBe(204);
        return sent;
      },
      close: () => undefined,
    });
    expect(await scene.row(id)).toMatchObject({ state: 'pending', last_error: 'no-answer' });
  });

  it('an SMS that did not arrive has failed, for the administrator to see', async () => {
    for (const [MessageStatus, expected] of [
      ['delivered', { state: 'sent', outcome: 'delivered' }],
      ['undelivered', { state: 'failed', outcome: 'undelivered', last_error: 'undelivered' }],
    ] as const) {
      const id = await scene.plant({ channel: 'sms', kind: 'new-urgent' });
      await scene.send(id);
      const MessageSid = (await scene.row(id)).provider_id ?? '';
      await post(hookOf(id, 'status', 'messages'), { MessageSid, MessageStatus });
      expect(await scene.row(id)).toMatchObject(expected);
    }
  });
});

describe('where mails that came back are handed in', () => {
  const handIn = (token: string, body: string, type = 'message/rfc822') =>
    fetch(`${scene.url}/gateway/mail-bounces`, {
      method: 'POST',
      headers: { authorization: `Bearer ${token}`, 'content-type': type },
      body,
    });

  it('takes them from whoever holds the token, known or not, and from nobody else', async () => {
    expect((await handIn('another token', 'Subject: x')).status).toBe(403);
    expect((await handIn('', 'Subject: x')).status).toBe(403);
    expect((await handIn(bounceToken, 'Subject: a mail of nobody\n\nx')).status).toBe(204);
    expect((await handIn(bounceToken, '{}', 'application/json')).status).toBe(415);
    expect((await handIn(bounceToken, 'x'.repeat(300_000))).status).toBe(413);
  });

  it('marks the mail and the address that refused', async () => {
    const id = await scene.plant({ channel: 'email' });
    await scene.database.asSuperuser.query(`update notifications set state = 'sent' where id = $1`, [id]);
    // The form of RFC 3464, with the mail's own head as returned (RFC 3462).
    const report = [
      'Content-Type: multipart/report; report-type=delivery-status; boundary="b"',
      ...['', '--b', 'Content-Type: text/plain', '', 'It could not be delivered.', ''],
      ...['--b', 'Content-Type: message/delivery-status', '', 'Reporting-MTA: dns; mx.people.example', ''],
      `Final-Recipient: rfc822; ${scene.therapist.email}`,
      ...['Action: failed', 'Status: 5.1.1', ''],
      ...[
        '--b',
        'Content-Type: text/rfc822-headers',
        '',
        `Message-ID: <${id}@espalier.example>`,
        '',
        '--b--',
        '',
      ],
    ].join('\r\n');
    expect((await handIn(bounceToken, report)).status).toBe(204);
    expect(await scene.row(id)).toMatchObject({ state: 'bounced' });
    const { rows } = await scene.database.asSuperuser.query(
      'select email_bounced_at is not null as bounced from people where id = $1',
      [scene.therapist.personId],
    );
    expect(rows).toEqual([{ bounced: true }]);
  });
});
