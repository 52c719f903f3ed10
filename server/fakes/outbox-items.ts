import { z } from 'zod';
import type { Sent, SentCall, SentMail, SentPush, SentSms } from './sent.ts';

export function escapeHtml(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

/** Web addresses can be followed, as they can in a mail program; all else is shown as text. */
function textWithLinks(text: string): string {
  return text
    .split(/(https?:\/\/[^\s<>"']*[^\s<>"'.,;:!?)])/)
    .map((piece, index) =>
      index % 2 === 1 ? `<a href="${escapeHtml(piece)}">${escapeHtml(piece)}</a>` : escapeHtml(piece),
    )
    .join('');
}

function details(rows: readonly (readonly [string, string])[], at: string): string {
  const moment = `${at.slice(0, 10)} ${at.slice(11, 19)} UTC`;
  const shown = rows.map(([name, value]) => `<dt>${name}</dt><dd>${escapeHtml(value)}</dd>`);
  const time = `<time datetime="${escapeHtml(at)}">${escapeHtml(moment)}</time>`;
  return `<dl>\n${shown.join('\n')}\n<dt>Sent</dt><dd>${time}</dd>\n</dl>`;
}

function item(kind: string, title: string, rest: string): string {
  return `<li>\n<p class="kind">${kind}</p>\n<h3>${escapeHtml(title)}</h3>\n${rest}\n</li>`;
}

function mailItem({ subject, to, from, at, text }: SentMail): string {
  const about = details(
    [
      ['To', to.join(', ')],
      ['From', from],
    ],
    at,
  );
  return item(
    'Mail',
    subject === '' ? '(no subject)' : subject,
    `${about}\n<pre>${textWithLinks(text.trimEnd())}</pre>`,
  );
}

const pushPayload = z.object({ title: z.string(), body: z.string(), path: z.string() });

/** The payload as a service worker shows it; null where it is none of ours or could not be decrypted. */
function readPayload(payload: string | null): z.output<typeof pushPayload> | null {
  if (payload === null) return null;
  try {
    return pushPayload.safeParse(JSON.parse(payload)).data ?? null;
  } catch {
    return null;
  }
}

function pushItem({ payload, deviceId, urgency, at }: SentPush): string {
  const shown = readPayload(payload);
  const about = details(
    [
      ['To', deviceId === null ? 'a browser whose keys are not here' : `device ${deviceId}`],
      ['Urgency', urgency],
    ],
    at,
  );
  if (!shown) {
    const said = payload ?? 'It is encrypted for that browser alone and cannot be shown here.';
    return item('Push', 'A push', `${about}\n<pre>${escapeHtml(said)}</pre>`);
  }
  // One slash: two would lead to another host.
  const link = /^\/(?![/\\])/.test(shown.path)
    ? `<p><a href="${escapeHtml(shown.path)}">Open what it leads to</a></p>`
    : '';
  return item('Push', shown.title, `<p>${escapeHtml(shown.body)}</p>\n${about}\n${link}`);
}

const callStates = {
  ringing: 'It rings.',
  'key pressed': 'Somebody picked up and pressed 1.',
  'rang out': 'Nobody picked up.',
} as const;

function callForms(sid: string): string {
  const form = (act: string, label: string, look: string) =>
    `<form method="post" action="/outbox/calls/${escapeHtml(sid)}/${act}"><button${look}>${label}</button></form>`;
  return form('press', 'Press 1', '') + form('ring-out', 'Let it ring out', ' class="quiet"');
}

function callItem({ id, to, from, spoken, state, at }: SentCall): string {
  const about = details(
    [
      ['To', to],
      ['From', from],
    ],
    at,
  );
  const said = spoken.map((sentence) => `<p>“${escapeHtml(sentence)}”</p>`).join('\n');
  const forms = state === 'ringing' ? callForms(id) : '';
  return item('Telephone call', callStates[state], `${about}\n${said}\n${forms}`);
}

function smsItem({ to, from, text, at }: SentSms): string {
  const about = details(
    [
      ['To', to],
      ['From', from],
    ],
    at,
  );
  return item('SMS', 'A text message', `${about}\n<pre>${textWithLinks(text)}</pre>`);
}

export function outboxItem(sent: Sent): string {
  switch (sent.kind) {
    case 'mail':
      return mailItem(sent);
    case 'push':
      return pushItem(sent);
    case 'call':
      return callItem(sent);
    case 'sms':
      return smsItem(sent);
  }
}
