/** The product's colours in light and dark, in one file without a font, for a page without a script. */
export const outboxStyle = `
:root { --paper: #fbf8f1; --sheet: #ffffff; --wire: #dcd4c3; --ink: #1e2a22; --ink-soft: #55604f;
  --leaf: #2c6a4b; --on-leaf: #ffffff; --focus: #14509e; color-scheme: light dark; }
@media (prefers-color-scheme: dark) {
  :root { --paper: #131915; --sheet: #1b231d; --wire: #35403a; --ink: #eef0e8; --ink-soft: #b4bdb0;
    --leaf: #7ec79e; --on-leaf: #10201a; --focus: #8ab8ff; }
}
body { margin: 0; background: var(--paper); color: var(--ink); font: 1rem/1.5 Lato, system-ui, sans-serif; }
main { max-width: 44rem; margin: 0 auto; padding: 2rem 1rem 4rem; }
h1 { margin: 0; font-size: 1.75rem; line-height: 1.2; }
h2 { margin: 0 0 0.5rem; font-size: 1.25rem; line-height: 1.35; }
h3 { margin: 0; font-size: 1.125rem; line-height: 1.35; overflow-wrap: anywhere; }
p { margin: 0.5rem 0; }
a { color: var(--leaf); }
a:focus-visible, button:focus-visible, summary:focus-visible { outline: 3px solid var(--focus); outline-offset: 2px; }
section { margin-top: 2rem; }
nav ul { list-style: none; margin: 0.75rem 0 0; padding: 0; display: flex; flex-wrap: wrap; gap: 0.25rem 1.25rem; }
nav a { display: inline-block; padding: 0.625rem 0; }
nav a[aria-current] { color: var(--ink); font-weight: 700; text-decoration: none; }
ol { list-style: none; margin: 1rem 0 0; padding: 0; display: grid; gap: 1rem; }
ol > li { background: var(--sheet); border: 1px solid var(--wire); border-radius: 6px; padding: 1rem; }
dl { display: grid; grid-template-columns: auto 1fr; gap: 0 0.75rem; margin: 0.5rem 0; color: var(--ink-soft); }
dd { margin: 0; overflow-wrap: anywhere; }
pre { margin: 0.75rem 0 0; font: inherit; white-space: pre-wrap; overflow-wrap: anywhere; }
table { border-collapse: collapse; width: 100%; }
th, td { text-align: left; font-weight: 400; padding: 0.375rem 0.75rem 0.375rem 0; border-top: 1px solid var(--wire); }
td { font-variant-numeric: tabular-nums; white-space: nowrap; }
td.code { font-weight: 700; letter-spacing: 0.08em; }
form { display: inline-block; margin: 0.75rem 0.75rem 0 0; }
button { font: inherit; font-weight: 700; min-height: 2.75rem; padding: 0 1.125rem; border-radius: 6px; cursor: pointer;
  border: 1px solid var(--leaf); background: var(--leaf); color: var(--on-leaf); }
button.quiet { background: transparent; color: var(--leaf); }
.kind { margin: 0; color: var(--ink-soft); font-size: 0.875rem; }
.soft { color: var(--ink-soft); }
`;
