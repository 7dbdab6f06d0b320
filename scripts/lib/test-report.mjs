/** The closing line of `npm test`, from vitest's report in JSON and its exit code. */
import { readFileSync } from 'node:fs';

export function readReport(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return undefined;
  }
}

/**
 * Counts tests. A file that broke before any of its tests ran counts as one failed test, and so does a run that
 * broke without naming a failed test (a crash, an unhandled error, no test found).
 */
export function countTests(report, exitCode) {
  const passed = report?.numPassedTests ?? 0;
  const brokenFiles = (report?.testResults ?? []).filter(
    ({ status, assertionResults }) =>
      status === 'failed' && !(assertionResults ?? []).some((test) => test.status === 'failed'),
  ).length;
  const failed = (report?.numFailedTests ?? 0) + brokenFiles;
  const isBrokenRun = failed === 0 && (exitCode !== 0 || passed === 0);
  return { passed, failed: isBrokenRun ? 1 : failed };
}

export const closingLine = ({ passed, failed }) => `${passed} passed, ${failed} failed`;
