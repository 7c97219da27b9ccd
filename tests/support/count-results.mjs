import { readFileSync } from 'node:fs';

/**
 * Counts one vitest run from its JSON report. Whatever keeps tests from running counts as a failure: a file that
 * cannot be loaded, an error outside a test, a skipped test, a run without tests, a missing report.
 * @param {string} reportFile
 * @param {number} exitCode
 * @returns {{ passed: number, failed: number, problems: string[] }}
 */
export function countVitest(reportFile, exitCode) {
  let report;
  try {
    report = JSON.parse(readFileSync(reportFile, 'utf8'));
  } catch {
    return { passed: 0, failed: 1, problems: ['vitest left no report'] };
  }
  const passed = report.numPassedTests;
  let failed = report.numFailedTests;
  const problems = [];
  const broken = report.testResults.filter(
    (file) => file.status === 'failed' && !file.assertionResults.some((test) => test.status === 'failed'),
  );
  const count = (number, problem) => {
    if (number === 0) return;
    failed += number;
    problems.push(problem);
  };
  count(broken.length, `could not be loaded: ${broken.map((file) => file.name).join(', ')}`);
  const skipped = report.numPendingTests + report.numTodoTests;
  count(skipped, `${skipped} tests were skipped; every committed test must run`);
  if (report.numTotalTests === 0 && failed === 0) count(1, 'no test ran');
  if (exitCode !== 0 && failed === 0) count(1, `vitest ended with code ${exitCode} outside any test`);
  return { passed, failed, problems };
}
