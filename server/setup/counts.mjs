import { readFileSync } from 'node:fs';

/** Sums of the runners' own counts. `unrun`: skipped, todo or never reached. */
export const nothing = { passed: 0, failed: 0, unrun: 0 };

export const add = (a, b) => ({
  passed: a.passed + b.passed,
  failed: a.failed + b.failed,
  unrun: a.unrun + b.unrun,
});

const parse = (file) => {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return undefined;
  }
};

/** A run that fails without a failed test (no report, no test, an error outside of all tests) counts as one failure. */
const complete = (counts, status) =>
  counts.failed === 0 && (status !== 0 || counts.passed + counts.unrun === 0)
    ? { ...counts, failed: 1 }
    : counts;

/** Counts of Vitest's JSON report. A file that could not be loaded is one failure. */
export function vitestCounts(file, status) {
  const report = parse(file);
  if (!report) return { ...nothing, failed: 1 };
  let counts = nothing;
  for (const { assertionResults, status: fileStatus } of report.testResults) {
    if (assertionResults.length === 0 && fileStatus === 'failed')
      counts = add(counts, { ...nothing, failed: 1 });
    for (const test of assertionResults) {
      const kind = test.status === 'passed' ? 'passed' : test.status === 'failed' ? 'failed' : 'unrun';
      counts = add(counts, { ...nothing, [kind]: 1 });
    }
  }
  return complete(counts, status);
}

/** Counts of Playwright's JSON report. A test that passed only at a second try has failed. */
export function playwrightCounts(file, status) {
  const report = parse(file);
  if (!report) return { ...nothing, failed: 1 };
  const { expected, unexpected, flaky, skipped } = report.stats;
  return complete({ passed: expected, failed: unexpected + flaky, unrun: skipped }, status);
}
