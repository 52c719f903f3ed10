import type { Mail } from './mail.ts';

type Kept = {
  id: string;
  /** When it arrived, ISO 8601 in UTC. */
  at: string;
};

export type SentMail = Kept & Mail & { kind: 'mail' };

export type SentPush = Kept & {
  kind: 'push';
  /** The fake's own device, or null for a browser whose keys only its maker's service could pass on to. */
  deviceId: string | null;
  /** What the device reads once it has decrypted it; null where the keys are not the fake's. */
  payload: string | null;
  urgency: string;
  topic: string;
  ttl: number;
};

export type SentCall = Kept & {
  kind: 'call';
  to: string;
  from: string;
  /** What is read out, word for word. */
  spoken: string[];
  keysUrl: string;
  statusUrl: string;
  state: 'ringing' | 'key pressed' | 'rang out';
};

export type SentSms = Kept & { kind: 'sms'; to: string; from: string; text: string };

/** Everything that arrived at the fakes instead of leaving this machine. */
export type Sent = SentMail | SentPush | SentCall | SentSms;

export const sentKinds = ['mail', 'push', 'call', 'sms'] as const satisfies Sent['kind'][];
