import type { AddressInfo } from 'node:net';
import { PassThrough } from 'node:stream';
import { smtpFake } from '#server/fakes/smtp.ts';
import type { Mail } from '#server/fakes/mail.ts';

export type MailServer = {
  url: string;
  /** What was accepted, oldest first. */
  mails: Mail[];
  /** Every try as it came over the wire, accepted or not. */
  raw: string[];
  refuse: (refuses: boolean) => void;
  stop: () => Promise<void>;
};

/** The product's own SMTP fake on a free port, with all that was said to it. */
export const startMailServer = async (): Promise<MailServer> => {
  const mails: Mail[] = [];
  const raw: string[] = [];
  let refuses = false;
  const server = smtpFake({
    receive: (mail) => mails.push(mail),
    refusesUntilMs: () => (refuses ? Number.POSITIVE_INFINITY : 0),
  });
  const receive = server.onData.bind(server);
  server.onData = (stream, session, done) => {
    const copy = Object.assign(new PassThrough(), { byteLength: 0, sizeExceeded: false });
    let text = '';
    stream.on('data', (chunk: Buffer) => {
      text += chunk.toString('utf8');
      copy.write(chunk);
    });
    stream.on('end', () => {
      raw.push(text);
      copy.end();
    });
    receive(copy, session, done);
  };
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', () => resolve()));
  const { port } = server.server.address() as AddressInfo;
  return {
    url: `smtp://127.0.0.1:${port}`,
    mails,
    raw,
    refuse: (value) => {
      refuses = value;
    },
    stop: () => new Promise((resolve) => server.close(() => resolve())),
  };
};

/** The ids by which a receiver tells a repeated mail from a second one. */
export const messageIds = ({ raw }: MailServer): string[] =>
  raw.map((text) => /^Message-ID: <(.+)>\r?$/im.exec(text)?.[1] ?? '');
