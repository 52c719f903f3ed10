/** What a runner's report says. A runner that failed without a failed test, or left no report, counts as one failed. */
function counts(passed, failed, skipped, exitCode) {
  return { passed, failed: exitCode === 0 ? failed : Math.max(failed, 1), skipped };
}

export const ONE_FAILED = counts(0, 1, 0, 1);

/** Counts vitest's JSON report. A file that could not be loaded has no tests in it, but is a failure all the same. */
export function countVitest(report, exitCode) {
  if (report === null) return ONE_FAILED;
  const brokenFiles = report.testResults.filter(
    (file) => file.status === 'failed' && file.assertionResults.every((test) => test.status !== 'failed'),
  );
  const failed = report.numFailedTests + brokenFiles.length;
  return counts(report.numPassedTests, failed, report.numPendingTests + report.numTodoTests, exitCode);
}

/** Counts Playwright's JSON report. A test that passed only at a second try did not pass. */
export function countPlaywright(report, exitCode) {
  if (report === null) return ONE_FAILED;
  const { expected, unexpected, flaky, skipped } = report.stats;
  return counts(expected, unexpected + flaky, skipped, exitCode);
}
