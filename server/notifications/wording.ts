import type { notificationKinds } from '../db/schema/notifications.ts';

export type NotificationKind = (typeof notificationKinds)[number];

/**
 * One wording per kind: no name, no health fact, nothing of what was asked or answered. Whoever reads it over
 * a shoulder learns that Espalier has something for its reader, and how soon.
 */
const wordings: Record<NotificationKind, { subject: string; line: string }> = {
  'new-emergency': {
    subject: 'Espalier: an emergency flag is waiting',
    line: 'An emergency flag is waiting in the morning round. Please open it now.',
  },
  'new-flag': {
    subject: 'Espalier: a flag is waiting',
    line: 'A new flag is waiting in the morning round.',
  },
  'new-message': {
    subject: 'Espalier: a message is waiting',
    line: 'A new message is waiting for you.',
  },
};

const closing = [
  'This mail says no more on purpose. Sign in to read it.',
  'Do not answer this mail: nobody reads the answers. In an emergency call the emergency number.',
];

const escapeHtml = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('"', '&quot;');

/** The mail of a kind, in text and HTML; the link is the only part that differs from mail to mail. */
export const mailFor = (
  kind: NotificationKind,
  link: string,
): { subject: string; text: string; html: string } => {
  const { subject, line } = wordings[kind];
  const paragraphs = closing
    .map((sentence) => `<p style="color:#55604f;font-size:15px">${sentence}</p>`)
    .join('');
  return {
    subject,
    text: [line, '', link, '', ...closing, ''].join('\n'),
    html:
      `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>${subject}</title></head>` +
      '<body style="margin:0;background:#fbf8f1;color:#1e2a22;font-family:Lato,system-ui,sans-serif">' +
      '<div style="max-width:34rem;margin:0 auto;padding:32px 24px">' +
      `<p style="font-weight:900;font-size:20px">espalier</p><p style="font-size:18px">${line}</p>` +
      `<p><a href="${escapeHtml(link)}" style="display:inline-block;padding:14px 22px;border-radius:6px;` +
      `background:#2c6a4b;color:#ffffff;font-weight:700;text-decoration:none">Open Espalier</a></p>${paragraphs}` +
      '</div></body></html>',
  };
};
