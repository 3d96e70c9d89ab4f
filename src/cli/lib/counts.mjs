import { existsSync, readFileSync } from 'node:fs';

/** Passed and failed tests of a vitest JSON report; a file that could not even be loaded is one failure. */
export function countVitest(file) {
  const report = readReport(file);
  if (!report) return { passed: 0, failed: 1 };
  const broken = report.testResults.filter(
    ({ status, assertionResults }) =>
      status === 'failed' && assertionResults.every((test) => test.status !== 'failed'),
  ).length;
  return { passed: report.numPassedTests, failed: report.numFailedTests + broken };
}

/** Passed and failed tests of a Playwright JSON report; errors outside of tests are failures too. */
export function countPlaywright(file) {
  const report = readReport(file);
  if (!report) return { passed: 0, failed: 1 };
  const { expected, unexpected, flaky } = report.stats;
  return { passed: expected, failed: unexpected + flaky + report.errors.length };
}

function readReport(file) {
  try {
    return existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : undefined;
  } catch {
    return undefined;
  }
}
