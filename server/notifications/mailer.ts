import { createTransport } from 'nodemailer';
import { mailFor, type NotificationKind } from './wording.ts';

export type Mailer = {
  send: (mail: { id: string; kind: NotificationKind; path: string; email: string }) => Promise<void>;
  close: () => void;
};

const timeoutMs = 10_000;

/** Mail over SMTP. The message id is made from the row's, so that a repeat can be told from a second mail. */
export const openMailer = ({
  smtpUrl,
  from,
  publicUrl,
}: {
  smtpUrl: string;
  from: string;
  publicUrl: string;
}): Mailer => {
  const transport = createTransport(smtpUrl, {
    from,
    connectionTimeout: timeoutMs,
    greetingTimeout: timeoutMs,
    socketTimeout: timeoutMs,
  } as Parameters<typeof createTransport>[1]);
  return {
    send: async ({ id, kind, path, email }) => {
      const { subject, text, html } = mailFor(kind, new URL(path, publicUrl).href);
      await transport.sendMail({ to: email, subject, text, html, messageId: `<${id}@espalier.example>` });
    },
    close: () => transport.close(),
  };
};
