export interface TestReport {
  numPassedTests: number;
  numFailedTests: number;
  testResults: { status: string; assertionResults: { status: string }[] }[];
}
export interface TestCounts {
  passed: number;
  failed: number;
}
export function readReport(file: string): TestReport | undefined;
export function countTests(report: TestReport | undefined, exitCode: number): TestCounts;
export function closingLine(counts: TestCounts): string;
