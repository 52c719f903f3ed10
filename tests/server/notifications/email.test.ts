import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import type { AddressInfo } from 'node:net';
import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { notificationKinds } from '#shared/notifications/kinds.ts';
import { NotDeliverable, type Outgoing } from '#server/notifications/channels.ts';
import { openEmail } from '#server/notifications/email.ts';
import { mailFor } from '#server/notifications/mail-page.ts';

type Answers = { mailFrom?: [number, string]; rcptTo?: [number, string]; data?: [number, string] };

/** Sends one mail to a server that answers so; gives what it got and what the sending ended with. */
const sendTo = async (answers: Answers, email = 'ada@people.example') => {
  const fail = ([responseCode, message]: [number, string]) =>
    Object.assign(new Error(message), { responseCode });
  let raw = '';
  const receivers: string[] = [];
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onMailFrom: (_address, _session, done) => done(answers.mailFrom ? fail(answers.mailFrom) : null),
    onRcptTo: ({ address }, _session, done) => {
      receivers.push(address);
      done(answers.rcptTo ? fail(answers.rcptTo) : null);
    },
    onData: (stream, _session, done) => {
      stream.on('data', (chunk: Buffer) => (raw += chunk.toString('utf8')));
      stream.on('end', () => done(answers.data ? fail(answers.data) : null));
    },
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', () => resolve()));
  const { port } = server.server.address() as AddressInfo;
  const channel = openEmail({
    smtpUrl: `smtp://127.0.0.1:${port}`,
    from: 'Espalier <no-reply@espalier.example>',
    publicUrl: 'https://espalier.example',
  });
  const outgoing: Outgoing = {
    id: randomUUID(),
    clinicId: randomUUID(),
    kind: 'invitation',
    channel: 'email',
    path: '/invitation#id.secret',
    email,
    phone: null,
    subscription: null,
  };
  try {
    const ended = await channel.send(outgoing).catch((error: unknown) => error);
    return { raw, receivers, ended, outgoing };
  } finally {
    channel.close();
    await new Promise<void>((resolve) => server.close(() => resolve()));
  }
};

describe('a mail', () => {
  it.each(['x<eve@people.example>', 'all:eve@people.example;', 'x,eve@people.example'])(
    'goes to nobody else where what was given as an address reads as one of somebody else: "%s"',
    async (email) => {
      const { receivers } = await sendTo({}, email);
      expect(receivers.filter((address) => address === 'eve@people.example')).toEqual([]);
    },
  );

  it('says that a machine wrote it, under an id made of the row’s, with the link in text and HTML', async () => {
    const { raw, ended, outgoing } = await sendTo({});
    expect(ended).toEqual({ providerId: null });
    const mail = await simpleParser(raw);
    expect(mail.messageId).toBe(`<${outgoing.id}@espalier.example>`);
    // RFC 3834, section 5.
    expect(mail.headers.get('auto-submitted')).toBe('auto-generated');
    expect(mail.text).toContain('https://espalier.example/invitation#id.secret');
    expect(mail.html).toContain('href="https://espalier.example/invitation#id.secret"');
  });

  // Codes of RFC 5321, section 4.2.3, and RFC 3463.
  it.each<[string, Answers]>([
    ['the receiver is unknown', { rcptTo: [550, '5.1.1 User unknown'] }],
    ['the receiver is refused without an enhanced code', { rcptTo: [550, 'No such user here'] }],
    ['the mailbox is disabled', { rcptTo: [554, '5.2.1 Mailbox disabled'] }],
    ['the receiver is refused after the data', { data: [550, '5.1.1 User unknown'] }],
  ])('bounces when %s', async (_what, answers) => {
    const { ended } = await sendTo(answers);
    expect(ended).toBeInstanceOf(NotDeliverable);
    expect(ended).toMatchObject({ reason: 'bounced' });
  });

  it.each<[string, Answers]>([
    ['the server is busy', { rcptTo: [451, '4.3.0 Try again later'] }],
    ['the receiver is greylisted', { rcptTo: [450, '4.2.0 Greylisted'] }],
    ['a policy is against it', { rcptTo: [550, '5.7.1 Relaying denied'] }],
    ['the sender is refused', { mailFrom: [550, '5.1.8 Bad sender'] }],
    ['the mailbox is full', { rcptTo: [552, '5.2.2 Mailbox full'] }],
    ['the data is deferred', { data: [451, '4.3.0 Try again later'] }],
  ])('is tried again when %s', async (_what, answers) => {
    const { ended } = await sendTo(answers);
    expect(ended).toBeInstanceOf(Error);
    expect(ended).not.toBeInstanceOf(NotDeliverable);
  });
});

describe('the page of a mail', () => {
  it.each(notificationKinds)(
    'of %s loads nothing, reads at 16 pixels or more, and says the same in text',
    (kind) => {
      const link = 'https://espalier.example/there';
      const { subject, text, html } = mailFor(kind, link);
      expect(html).not.toMatch(/<img|<link|url\(|src=|@import|<script/i);
      expect([...html.matchAll(/https?:\/\/[^"<\s]+/g)].every(([address]) => address === link)).toBe(true);
      for (const [, size] of html.matchAll(/font-size:(\d+)px/g))
        expect(Number(size)).toBeGreaterThanOrEqual(16);
      expect(html).toContain('prefers-color-scheme:dark');
      expect(subject).toMatch(/^Espalier: \S/);
      const words = html.replace(/<style>.*?<\/style>|<title>.*?<\/title>/g, '').replace(/<[^>]+>/g, '\n');
      const plain = words.replaceAll('&#39;', "'").replaceAll('&amp;', '&');
      for (const sentence of text.split('\n').map((line) => line.replace(/:$/, '')))
        expect(plain).toContain(sentence);
    },
  );

  it('says something else for every kind', () => {
    const lines = notificationKinds.map((kind) => mailFor(kind, 'https://espalier.example/').text);
    expect(new Set(lines).size).toBe(notificationKinds.length);
  });
});
