import { createTransport } from 'nodemailer';
import { NotDeliverable, type Channel } from './channels.ts';
import { mailFor } from './mail-page.ts';

const timeoutMs = 10_000;

/** What the message ids of our mails end with; before it stands the id of the row. */
export const messageIdDomain = 'espalier.example';

/** Mailbox unavailable, user not local, name not allowed, no such thing here (RFC 5321, 4.2.3), no mail taken (RFC 7504). */
const refusalsOfAddress = [550, 551, 553, 554, 556];

/**
 * Whether a server said, of this receiver, that it never will take the mail. It says so to RCPT TO or after DATA.
 * Where it gives an enhanced code (RFC 3463), only those about an address or a mailbox count: a policy (5.7), a
 * network (5.4) or a system (5.3) is for somebody to mend, and another try may find it mended.
 */
const isBounce = (error: unknown): boolean => {
  if (!(error instanceof Error)) return false;
  const { responseCode, command, response } = error as Error & Record<string, unknown>;
  if (!refusalsOfAddress.includes(Number(responseCode))) return false;
  if (command !== 'RCPT TO' && command !== 'DATA') return false;
  const enhanced = /^\d{3}[ -]5\.(\d{1,3})\.\d{1,3}\b/.exec(typeof response === 'string' ? response : '');
  return enhanced === null || ['0', '1', '2'].includes(enhanced[1] ?? '');
};

/** Mail over SMTP. The message id is made from the row's, so that a repeat can be told from a second mail. */
export const openEmail = ({
  smtpUrl,
  from,
  publicUrl,
}: {
  smtpUrl: string;
  from: string;
  publicUrl: string;
}): Channel => {
  const transport = createTransport(smtpUrl, {
    from,
    connectionTimeout: timeoutMs,
    greetingTimeout: timeoutMs,
    socketTimeout: timeoutMs,
  } as Parameters<typeof createTransport>[1]);
  return {
    send: async ({ id, kind, path, email }) => {
      const { subject, text, html } = mailFor(kind, new URL(path, publicUrl).href);
      try {
        await transport.sendMail({
          // As one address: read as text, "a<b@c.example>" and the like would go to somebody else.
          to: { name: '', address: email },
          subject,
          text,
          html,
          messageId: `<${id}@${messageIdDomain}>`,
          // RFC 3834: no holiday answer comes back to it.
          headers: { 'Auto-Submitted': 'auto-generated' },
        });
      } catch (error) {
        if (isBounce(error)) throw new NotDeliverable('bounced');
        throw error;
      }
      return { providerId: null };
    },
    close: () => transport.close(),
  };
};
