import { readJson } from './files.mjs';

/**
 * Passed and failed tests of a report by vitest. A file that could not be loaded has no tests and counts as one failed;
 * so does a run that failed without naming a test (nothing found, an error outside of tests, no report at all).
 */
export function countVitest(reportFile, hasWorked) {
  const report = readJson(reportFile);
  if (!report) return { passed: 0, failed: 1 };
  const unloaded = report.testResults.filter(
    ({ status, assertionResults }) =>
      status === 'failed' && !assertionResults.some((test) => test.status === 'failed'),
  );
  const failed = report.numFailedTests + unloaded.length;
  return { passed: report.numPassedTests, failed: failed === 0 && !hasWorked ? 1 : failed };
}
