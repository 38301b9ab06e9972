import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { playwrightCounts, vitestCounts } from '../../server/setup/counts.mjs';

const folder = mkdtempSync(join(tmpdir(), 'stepwell-counts-'));
afterAll(() => rmSync(folder, { recursive: true }));

const report = (content: unknown) => {
  const file = join(folder, 'report.json');
  writeFileSync(file, typeof content === 'string' ? content : JSON.stringify(content));
  return file;
};

const file = (...statuses: string[]) => ({
  status: statuses.includes('failed') ? 'failed' : 'passed',
  assertionResults: statuses.map((status) => ({ status })),
});

describe('the counts that npm test ends with', () => {
  it('are those of Vitest: passed, failed, and what did not run for whatever reason', () => {
    const testResults = [file('passed', 'failed', 'skipped'), file('passed', 'todo', 'pending', 'disabled')];
    expect(vitestCounts(report({ testResults }), 1)).toEqual({ passed: 2, failed: 1, unrun: 4 });
  });

  it('take a file that could not be loaded, an error outside of all tests and an empty run for failures', () => {
    const broken = { status: 'failed', assertionResults: [] };
    expect(vitestCounts(report({ testResults: [broken, file('passed')] }), 1)).toEqual({
      passed: 1,
      failed: 1,
      unrun: 0,
    });
    expect(vitestCounts(report({ testResults: [file('passed')] }), 1)).toEqual({
      passed: 1,
      failed: 1,
      unrun: 0,
    });
    expect(vitestCounts(report({ testResults: [] }), 0)).toEqual({ passed: 0, failed: 1, unrun: 0 });
    expect(vitestCounts(report('cut o'), 0)).toEqual({ passed: 0, failed: 1, unrun: 0 });
    expect(vitestCounts(join(folder, 'none.json'), 0)).toEqual({ passed: 0, failed: 1, unrun: 0 });
  });

  it('are those of Playwright, where a pass at the second try is a failure', () => {
    const stats = { expected: 5, unexpected: 1, flaky: 2, skipped: 3 };
    expect(playwrightCounts(report({ stats }), 1)).toEqual({ passed: 5, failed: 3, unrun: 3 });
    const fine = { expected: 5, unexpected: 0, flaky: 0, skipped: 0 };
    expect(playwrightCounts(report({ stats: fine }), 0)).toEqual({ passed: 5, failed: 0, unrun: 0 });
    expect(playwrightCounts(report({ stats: fine }), 1)).toEqual({ passed: 5, failed: 1, unrun: 0 });
  });
});
