import { describe, expect, test } from 'vitest';
import { countPlaywright, countVitest } from '../../scripts/test-counts.mjs';

const vitestReport = {
  numPassedTests: 7,
  numFailedTests: 0,
  numPendingTests: 0,
  numTodoTests: 0,
  testResults: [],
};
const passedFile = { status: 'passed', assertionResults: [{ status: 'passed' }] };
const failedFile = { status: 'failed', assertionResults: [{ status: 'failed' }, { status: 'passed' }] };
const brokenFile = { status: 'failed', assertionResults: [] };

describe('the unit and integration tests', () => {
  test('count as their report says', () => {
    const report = { ...vitestReport, numFailedTests: 1, testResults: [passedFile, failedFile] };
    expect(countVitest(report, 1)).toEqual({ passed: 7, failed: 1, skipped: 0 });
  });

  test('a file that could not be loaded is one failed', () => {
    const report = { ...vitestReport, numFailedTests: 1, testResults: [failedFile, brokenFile, brokenFile] };
    expect(countVitest(report, 1)).toEqual({ passed: 7, failed: 3, skipped: 0 });
  });

  test('an error outside of every test is one failed', () => {
    expect(countVitest({ ...vitestReport, testResults: [passedFile] }, 1)).toEqual({
      passed: 7,
      failed: 1,
      skipped: 0,
    });
  });

  test('a runner that crashed before its report is one failed', () => {
    expect(countVitest(null, 139)).toEqual({ passed: 0, failed: 1, skipped: 0 });
  });

  test('what was skipped or not written yet is neither passed nor failed', () => {
    const report = { ...vitestReport, numPendingTests: 2, numTodoTests: 1 };
    expect(countVitest(report, 0)).toEqual({ passed: 7, failed: 0, skipped: 3 });
  });
});

describe('the browser tests', () => {
  test('count as their report says, and a test that passed at a second try did not pass', () => {
    const stats = { expected: 4, unexpected: 2, flaky: 1, skipped: 1 };
    expect(countPlaywright({ stats }, 1)).toEqual({ passed: 4, failed: 3, skipped: 1 });
  });

  test('a failure outside of every test is one failed, as is a runner that crashed before its report', () => {
    const stats = { expected: 4, unexpected: 0, flaky: 0, skipped: 0 };
    expect(countPlaywright({ stats }, 1)).toEqual({ passed: 4, failed: 1, skipped: 0 });
    expect(countPlaywright(null, 1)).toEqual({ passed: 0, failed: 1, skipped: 0 });
  });
});
