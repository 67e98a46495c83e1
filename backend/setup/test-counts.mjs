import * as fs from 'node:fs';

/**
 * What a test runner did, from its JSON report. Jest and Vitest write the same shape. The counts come from the single
 * tests and not from the report's own sums, since a file that could not even be loaded has no tests to sum.
 */

const NOTHING = { passed: 0, failed: 0, skipped: 0, failures: [] };

function failure(...failures) {
  return { ...NOTHING, failed: failures.length, failures };
}

function readReport(file) {
  try {
    const report = JSON.parse(fs.readFileSync(file, 'utf8'));
    return Array.isArray(report.testResults) ? report : null;
  } catch {
    return null;
  }
}

function countFile({ name, status, message, assertionResults }) {
  const counts = { ...NOTHING, failures: [] };
  for (const { status: outcome, fullName } of assertionResults) {
    if (outcome === 'passed') counts.passed += 1;
    else if (outcome === 'failed') {
      counts.failed += 1;
      counts.failures.push(`${name} › ${fullName}`);
    } else counts.skipped += 1;
  }
  if (status === 'failed' && counts.failed === 0) {
    // An error outside every test: the file does not load, or a hook around all tests threw.
    counts.failed = 1;
    counts.failures.push(`${name}: ${(message ?? '').trim().split('\n')[0] || 'could not be run'}`);
  }
  return counts;
}

/** Adds counts up. */
export function sumCounts(list) {
  return list.reduce(
    (sum, { passed, failed, skipped, failures }) => ({
      passed: sum.passed + passed,
      failed: sum.failed + failed,
      skipped: sum.skipped + skipped,
      failures: [...sum.failures, ...failures],
    }),
    NOTHING,
  );
}

/**
 * The counts of one runner. No report, a report without a test, and an exit status that the report does not explain
 * each count as one failure: silence must not look like success.
 */
export function countRunner({ name, reportFile, exitCode }) {
  const report = readReport(reportFile);
  if (!report) return failure(`${name}: left no report (exit status ${exitCode})`);
  const counts = sumCounts(report.testResults.map(countFile));
  if (counts.passed + counts.failed + counts.skipped === 0) return failure(`${name}: ran no test`);
  if (exitCode !== 0 && counts.failed === 0) {
    return sumCounts([counts, failure(`${name}: ended with status ${exitCode} although no test failed`)]);
  }
  return counts;
}

/** The counts of a check that has no single tests, such as the type check: nothing when it is in order. */
export function countCheck({ name, exitCode }) {
  return exitCode === 0 ? NOTHING : failure(`${name}: exit status ${exitCode}`);
}

/** The line that ends a test run. */
export function countLine({ passed, failed, skipped }) {
  return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`;
}
