type Counts = { passed: number; failed: number; skipped: number };
type VitestReport = {
  numPassedTests: number;
  numFailedTests: number;
  numPendingTests: number;
  numTodoTests: number;
  testResults: { status: string; assertionResults: { status: string }[] }[];
};
type PlaywrightReport = {
  stats: { expected: number; unexpected: number; flaky: number; skipped: number };
};
export const ONE_FAILED: Counts;
export function countVitest(report: VitestReport | null, exitCode: number): Counts;
export function countPlaywright(report: PlaywrightReport | null, exitCode: number): Counts;
