import { expect, test } from '@playwright/test';
import { scriptsOfFirstPage } from '../support/first-page-scripts.ts';

test('the first page needs at most 260 kB of JavaScript, its worker in it, and no editor of code', async ({
  page,
}) => {
  const scripts = await scriptsOfFirstPage(page, '/');
  const names = scripts.map(({ name }) => name);
  expect(names.filter((name) => name.startsWith('engine.worker'))).toHaveLength(1);
  expect(names.filter((name) => /code-?mirror|export-panel|code-view|liquid|proofs/.test(name))).toEqual([]);
  const total = scripts.reduce((sum, { gzipBytes }) => sum + gzipBytes, 0);
  console.log(`First page: ${(total / 1000).toFixed(1)} kB of JavaScript in ${scripts.length} files, gzip`);
  expect(total).toBeLessThanOrEqual(260_000);
});
