import type { AddressObject } from 'mailparser';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import type { Mail } from './mail.ts';

type SmtpFake = {
  receive: (mail: Mail) => void;
  /** Until when, in milliseconds since 1970, every mail is refused with "try again later". */
  refusesUntilMs: () => number;
};

function addresses(field: AddressObject | AddressObject[] | undefined): string[] {
  return [field ?? []].flat().flatMap((list) => list.value.map((entry) => entry.address ?? entry.name));
}

/** Addresses that stand for mailboxes that are not there. */
const bounces = (address: string): boolean => /^bounce|@bounce\.example$/i.test(address);

/** A mail server that delivers nothing: each accepted mail goes to `receive`, with or without a sign-in. */
export function smtpFake({ receive, refusesUntilMs }: SmtpFake): SMTPServer {
  return new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    allowInsecureAuth: true,
    onAuth: (_auth, _session, done) => done(null, { user: 'anyone' }),
    onRcptTo: ({ address }, _session, done) => {
      if (!bounces(address)) done();
      // RFC 5321 and RFC 3463: the mailbox is not there, and no further try will help.
      else done(Object.assign(new Error('5.1.1 There is no such mailbox'), { responseCode: 550 }));
    },
    onData: (stream, session, done) => {
      simpleParser(stream)
        .then((parsed) => {
          if (Date.now() < refusesUntilMs()) {
            done(Object.assign(new Error('Try again later'), { responseCode: 451 }));
            return;
          }
          receive({
            to: session.envelope.rcptTo.map((recipient) => recipient.address),
            from: addresses(parsed.from)[0] ?? '',
            subject: parsed.subject ?? '',
            text: parsed.text ?? '',
            html: typeof parsed.html === 'string' ? parsed.html : null,
            at: new Date().toISOString(),
          });
          done();
        })
        .catch((error: unknown) => done(error instanceof Error ? error : new Error(String(error))));
    },
  });
}
