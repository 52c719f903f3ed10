import { escapeHtml, outboxItem } from './outbox-items.ts';
import { outboxStyle } from './outbox-style.ts';
import type { Sent } from './sent.ts';

export type OutboxContent = {
  /** Newest first. */
  sent: readonly Sent[];
  /** The one kind to show, or null for all. */
  kind: Sent['kind'] | null;
  /** What the authenticator apps of the demo's staff show now. */
  codes: readonly { name: string; code: string; leftS: number }[];
};

const choices = [
  [null, 'Everything'],
  ['mail', 'Mails'],
  ['push', 'Pushes'],
  ['call', 'Calls'],
  ['sms', 'SMS'],
] as const;

function filter(current: OutboxContent['kind']): string {
  const links = choices.map(([kind, label]) => {
    const mark = kind === current ? ' aria-current="page"' : '';
    return `<li><a href="/outbox${kind ? `?kind=${kind}` : ''}"${mark}>${label}</a></li>`;
  });
  return `<nav aria-label="What to show"><ul>${links.join('')}</ul></nav>`;
}

function codesSection(codes: OutboxContent['codes']): string {
  if (codes.length === 0) return '';
  const rows = codes.map(
    ({ name, code, leftS }) =>
      `<tr><th scope="row">${escapeHtml(name)}</th><td class="code">${escapeHtml(code)}</td>` +
      `<td>for ${leftS} more s</td></tr>`,
  );
  return `<section aria-labelledby="codes">
<h2 id="codes">Sign-in codes of the demo’s staff</h2>
<p class="soft">What their authenticator apps show. <a href="/outbox">Show the newest</a></p>
<table><tbody>
${rows.join('\n')}
</tbody></table>
</section>`;
}

/** The demo's outbox as a page of its own: all that was sent as it arrived, newest first, without a script. */
export function outboxPage({ sent, kind, codes }: OutboxContent): string {
  const shown = kind === null ? sent : sent.filter((one) => one.kind === kind);
  const list =
    shown.length === 0
      ? '<p>Nothing has been sent yet.</p>'
      : `<ol aria-label="Newest first">\n${shown.map(outboxItem).join('\n')}\n</ol>`;
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>Outbox · Espalier demo</title>
<style>${outboxStyle}</style>
</head>
<body>
<main>
<h1>Outbox</h1>
<p class="soft">Every mail, push, call and SMS that this demo sent, as it arrived. Nothing leaves this machine.</p>
${codesSection(codes)}
<section aria-labelledby="sent">
<h2 id="sent">What was sent</h2>
${filter(kind)}
${list}
</section>
</main>
</body>
</html>
`;
}
