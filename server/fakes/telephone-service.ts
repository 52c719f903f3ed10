import { randomBytes } from 'node:crypto';
import type { IncomingMessage } from 'node:http';
import { text as readText } from 'node:stream/consumers';
import twilio from 'twilio';
import type { Refusals } from './refusals.ts';
import { headerOf, notThere, type FakeAnswer } from './requests.ts';
import type { Sent, SentCall } from './sent.ts';
import { readTwiml } from './spoken.ts';

const newSid = (prefix: 'CA' | 'SM') => prefix + randomBytes(16).toString('hex');

/** The gateway's own form of an error, with the code by which the SDK tells them apart. */
const refuse = (status: number, code: number, message: string): FakeAnswer => ({
  status,
  body: { status, code, message, more_info: '' },
});

/** Numbers that end in 555-0199 stand for those that are none. */
const isNumber = (to: string) => /^\+[1-9]\d{6,14}$/.test(to) && !to.endsWith('5550199');

export type TelephoneAccount = { accountSid: string; authToken: string };

/** The small part of the gateway's REST interface that the SDK uses here, and the telephones behind it. */
export function telephoneService(
  { accountSid, authToken }: TelephoneAccount,
  {
    refusals,
    keep,
    find,
  }: { refusals: Refusals; keep: (sent: Sent) => void; find: (sid: string) => Sent | undefined },
) {
  const basic = `Basic ${Buffer.from(`${accountSid}:${authToken}`).toString('base64')}`;

  /** Tells the product what happened, signed as the gateway signs. */
  async function tell(url: string, params: Record<string, string>): Promise<boolean> {
    const answer = await fetch(url, {
      method: 'POST',
      headers: {
        'content-type': 'application/x-www-form-urlencoded',
        'x-twilio-signature': twilio.getExpectedTwilioSignature(authToken, url, params),
      },
      body: new URLSearchParams(params),
      redirect: 'manual',
    });
    await answer.arrayBuffer();
    return answer.ok;
  }

  const ringing = (sid: string): SentCall | null => {
    const call = find(sid);
    return call?.kind === 'call' && call.state === 'ringing' ? call : null;
  };

  const notTaken: FakeAnswer = { status: 502, body: { detail: 'The product did not take it.' } };

  return {
    async create(sid: string, what: string, request: IncomingMessage): Promise<FakeAnswer> {
      const form = new URLSearchParams(await readText(request));
      if (sid !== accountSid || headerOf(request, 'authorization') !== basic) {
        return refuse(401, 20003, 'Authenticate');
      }
      const refusedWith = refusals.now('gateway');
      if (refusedWith !== null) return refuse(refusedWith, 20500, 'The gateway is down.');
      const given = (name: string) => form.get(name) ?? '';
      const [to, from, at] = [given('To'), given('From'), new Date().toISOString()];
      if (!isNumber(to)) return refuse(400, 21211, `The number ${to} is not valid.`);
      if (what === 'Calls') {
        const id = newSid('CA');
        const { spoken, keysUrl } = readTwiml(given('Twiml'));
        keep({
          ...{ kind: 'call', id, at, to, from, spoken, keysUrl },
          statusUrl: given('StatusCallback'),
          state: 'ringing',
        });
        return { status: 201, body: { sid: id, status: 'queued', to, from } };
      }
      const id = newSid('SM');
      keep({ kind: 'sms', id, at, to, from, text: given('Body') });
      return { status: 201, body: { sid: id, status: 'queued', to, from, body: given('Body') } };
    },

    /** Somebody picks up and presses a key, and the call ends. */
    async pressKey(sid: string, digit: string): Promise<FakeAnswer> {
      const call = ringing(sid);
      if (!call) return notThere;
      const about = { CallSid: call.id, AccountSid: accountSid, To: call.to, From: call.from };
      const heard = await tell(call.keysUrl, { ...about, Digits: digit, CallStatus: 'in-progress' });
      if (!heard) return notTaken;
      keep({ ...call, state: 'key pressed' });
      return (await tell(call.statusUrl, { ...about, CallStatus: 'completed' })) ? { status: 204 } : notTaken;
    },

    /** Nobody picks up. */
    async ringOut(sid: string): Promise<FakeAnswer> {
      const call = ringing(sid);
      if (!call) return notThere;
      const about = { CallSid: call.id, AccountSid: accountSid, To: call.to, From: call.from };
      if (!(await tell(call.statusUrl, { ...about, CallStatus: 'no-answer' }))) return notTaken;
      keep({ ...call, state: 'rang out' });
      return { status: 204 };
    },
  };
}
