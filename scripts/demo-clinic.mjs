import { say } from './say.mjs';
import { secrets } from './secrets.mjs';
import { runStep } from './steps.mjs';

/** Does one thing to the demo clinic (fill, re-anchor, reset); returns its accounts and its staff's authenticators. */
export async function demoAct(program, act, ownerUrl, signal) {
  const { tokenSecret, sealSecret } = secrets();
  const env = {
    ...process.env,
    OWNER_DATABASE_URL: ownerUrl,
    TOKEN_SECRET: tokenSecret,
    SEAL_SECRET: sealSecret,
  };
  const answer = await runStep(process.execPath, [...program, act], { env, signal });
  return JSON.parse(answer.trimEnd().split('\n').at(-1));
}

export function showAccounts({ accounts }) {
  const rows = accounts.map(({ who, role, email, password }) => [who, role, email, password]);
  const widths = [0, 1, 2].map((column) => Math.max(...rows.map((row) => row[column].length)));
  say('\nDemo accounts: name, role, e-mail, password (all people are invented)');
  for (const row of rows) say(`  ${row.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join('  ')}`);
  say('\nStaff give a code as well: the outbox shows the codes of the demo.');
}
