import { say } from './say.mjs';
import { runStep } from './steps.mjs';

/** Does one thing to the demo clinic (fill, re-anchor, reset) and returns its accounts. */
export async function demoAct(program, act, ownerUrl, signal) {
  const env = { ...process.env, OWNER_DATABASE_URL: ownerUrl };
  const answer = await runStep(process.execPath, [...program, act], { env, signal });
  return JSON.parse(answer.trimEnd().split('\n').at(-1)).accounts;
}

export function showAccounts(accounts) {
  const rows = accounts.map(({ who, role, email, password }) => [who, role, email, password]);
  const widths = [0, 1, 2].map((column) => Math.max(...rows.map((row) => row[column].length)));
  say('\nDemo accounts: name, role, e-mail, password (all people are invented)');
  for (const row of rows) say(`  ${row.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join('  ')}`);
}
