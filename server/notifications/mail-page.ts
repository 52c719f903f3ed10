import type { NotificationKind } from '#shared/notifications/kinds.ts';
import { mailWords } from './wording.ts';

/** The design tokens that a mail uses (src/tokens.css), light and dark: mail programs know no custom properties. */
const light = {
  paper: '#fbf8f1',
  wire: '#dcd4c3',
  ink: '#1e2a22',
  soft: '#55604f',
  leaf: '#2c6a4b',
  onLeaf: '#ffffff',
};
const dark = {
  paper: '#131915',
  wire: '#35403a',
  ink: '#eef0e8',
  soft: '#b4bdb0',
  leaf: '#7ec79e',
  onLeaf: '#131915',
};

/** `!important`, for what a mail program does not strip is written inline as well and would win. */
const darkStyle =
  `:root{color-scheme:light dark}@media (prefers-color-scheme:dark){` +
  `.page{background:${dark.paper}!important;color:${dark.ink}!important}` +
  `.wire{border-color:${dark.wire}!important}.soft{color:${dark.soft}!important}` +
  `.link{color:${dark.leaf}!important}` +
  `.button{background:${dark.leaf}!important;color:${dark.onLeaf}!important}}`;

const font = `font-family:Lato,'Segoe UI',Roboto,Helvetica,Arial,sans-serif`;

const escapeHtml = (text: string): string =>
  text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');

/**
 * The mail of a kind, in text and in HTML with the same words; the link is the only part that differs from mail to
 * mail. One column, nothing loaded from anywhere, the name as a word since many mail programs drop drawings.
 */
export const mailFor = (
  kind: NotificationKind,
  link: string,
): { subject: string; text: string; html: string } => {
  const { subject, line, button, closing } = mailWords(kind);
  const href = escapeHtml(link);
  const small = closing
    .map(
      (sentence) =>
        `<p class="soft" style="margin:0 0 8px;font-size:16px;color:${light.soft}">${escapeHtml(sentence)}</p>`,
    )
    .join('');
  const html =
    `<!doctype html><html lang="en"><head><meta charset="utf-8">` +
    `<meta name="viewport" content="width=device-width,initial-scale=1">` +
    `<meta name="color-scheme" content="light dark"><meta name="supported-color-schemes" content="light dark">` +
    `<title>${escapeHtml(subject)}</title><style>${darkStyle}</style></head>` +
    `<body class="page" style="margin:0;padding:0;background:${light.paper};color:${light.ink};${font};line-height:1.5">` +
    `<div class="page" style="background:${light.paper};color:${light.ink}">` +
    `<div style="max-width:34rem;margin:0 auto;padding:32px 24px">` +
    `<p style="margin:0 0 24px;font-weight:900;font-size:24px">espalier</p>` +
    `<p style="margin:0 0 24px;font-size:18px">${escapeHtml(line)}</p>` +
    `<p style="margin:0 0 24px"><a class="button" href="${href}" style="display:inline-block;padding:16px 24px;` +
    `border-radius:6px;background:${light.leaf};color:${light.onLeaf};font-size:18px;font-weight:700;` +
    `text-decoration:none">${escapeHtml(button)}</a></p>` +
    `<p class="soft" style="margin:0 0 24px;font-size:16px;color:${light.soft}">If the button does nothing, open this address: ` +
    `<a class="link" href="${href}" style="color:${light.leaf};word-break:break-all">${href}</a></p>` +
    `<div class="wire" style="border-top:1px solid ${light.wire};padding-top:16px">${small}</div>` +
    `</div></div></body></html>`;
  const text = ['espalier', '', line, '', `${button}:`, link, '', ...closing, ''].join('\n');
  return { subject, text, html };
};
