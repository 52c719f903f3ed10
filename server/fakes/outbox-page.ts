import type { Mail } from './mail.ts';

const STYLE = `
:root { --paper: #fbf8f1; --sheet: #ffffff; --wire: #dcd4c3; --ink: #1e2a22; --ink-soft: #55604f;
  --leaf: #2c6a4b; --focus: #14509e; color-scheme: light dark; }
@media (prefers-color-scheme: dark) {
  :root { --paper: #131915; --sheet: #1b231d; --wire: #35403a; --ink: #eef0e8; --ink-soft: #b4bdb0;
    --leaf: #7ec79e; --focus: #8ab8ff; }
}
body { margin: 0; background: var(--paper); color: var(--ink); font: 1rem/1.5 Lato, system-ui, sans-serif; }
main { max-width: 44rem; margin: 0 auto; padding: 2rem 1rem 4rem; }
h1 { margin: 0; font-size: 1.75rem; line-height: 1.2; }
h2 { margin: 0; font-size: 1.125rem; line-height: 1.35; overflow-wrap: anywhere; }
p { margin: 0.5rem 0; }
a { color: var(--leaf); }
a:focus-visible { outline: 3px solid var(--focus); outline-offset: 2px; }
ol { list-style: none; margin: 1.5rem 0 0; padding: 0; display: grid; gap: 1rem; }
li { background: var(--sheet); border: 1px solid var(--wire); border-radius: 6px; padding: 1rem; }
dl { display: grid; grid-template-columns: auto 1fr; gap: 0 0.75rem; margin: 0.5rem 0; color: var(--ink-soft); }
dd { margin: 0; overflow-wrap: anywhere; }
pre { margin: 0.75rem 0 0; font: inherit; white-space: pre-wrap; overflow-wrap: anywhere; }
.soft { color: var(--ink-soft); }
`;

function escapeHtml(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

/** Web addresses in a mail can be followed, as they can in a mail program; all else is shown as text. */
function textWithLinks(text: string): string {
  return text
    .split(/(https?:\/\/[^\s<>"']*[^\s<>"'.,;:!?)])/)
    .map((piece, index) =>
      index % 2 === 1 ? `<a href="${escapeHtml(piece)}">${escapeHtml(piece)}</a>` : escapeHtml(piece),
    )
    .join('');
}

function mailItem(mail: Mail): string {
  const at = `${mail.at.slice(0, 10)} ${mail.at.slice(11, 19)} UTC`;
  return `<li>
<h2>${escapeHtml(mail.subject === '' ? '(no subject)' : mail.subject)}</h2>
<dl>
<dt>To</dt><dd>${escapeHtml(mail.to.join(', '))}</dd>
<dt>From</dt><dd>${escapeHtml(mail.from)}</dd>
<dt>Sent</dt><dd><time datetime="${escapeHtml(mail.at)}">${escapeHtml(at)}</time></dd>
</dl>
<pre>${textWithLinks(mail.text.trimEnd())}</pre>
</li>`;
}

/** The demo's outbox as a page of its own: every mail as it arrived, newest first, without a script. */
export function outboxPage(mails: readonly Mail[]): string {
  const list =
    mails.length === 0
      ? '<p>Nothing has been sent yet.</p>'
      : `<ol aria-label="Mails, newest first">\n${mails.map(mailItem).join('\n')}\n</ol>`;
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>Outbox · Espalier demo</title>
<style>${STYLE}</style>
</head>
<body>
<main>
<h1>Outbox</h1>
<p class="soft">Every mail that this demo sent, as it arrived. Nothing leaves this machine.</p>
<p><a href="/outbox">Show the newest</a></p>
${list}
</main>
</body>
</html>
`;
}
