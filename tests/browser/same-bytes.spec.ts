import { readFile } from 'node:fs/promises';
import { expect, test } from '@playwright/test';
import type { DefinitionInput } from '../../shared/contract/index.ts';
import { readTemplates } from '../../server/tables/read-templates.ts';
import { bundleModule } from '../bench/bundle-module.ts';
import { ditheredDefinition } from '../engine/support/definitions.ts';
import { examplesOf } from '../engine/support/seeded.ts';
import { commitSeed } from '../outside/numpy/seed.ts';
import { bytesOfAll } from './same-bytes-page.ts';

const count = 1000;
const batch = 50;

test('1,000 random definitions give the same bytes of every target in Chromium and in Node.js', async ({
  page,
}) => {
  test.setTimeout(180_000);
  const seed = commitSeed();
  console.log(`Random definitions of seed ${seed}; DEFINITIONS_SEED=${seed} tries them again.`);
  const definitions = examplesOf(ditheredDefinition, count, seed);
  const templates = readTemplates();
  const bundle = await bundleModule(new URL('./same-bytes-page.ts', import.meta.url), 'same-bytes');
  await page.goto('about:blank');
  await page.addScriptTag({ type: 'module', content: await readFile(bundle, 'utf8') });
  await page.waitForFunction(() => 'bytesOfAll' in globalThis);

  const faults: string[] = [];
  let tables = 0;
  for (let first = 0; first < count; first += batch) {
    const some = definitions.slice(first, first + batch);
    const inPage = await page.evaluate(
      ([list, texts, start]) => {
        const { bytesOfAll: all } = globalThis as unknown as { bytesOfAll: typeof bytesOfAll };
        return all(list, texts, start);
      },
      [some, templates, first] as [DefinitionInput[], Record<string, string>, number],
    );
    const here = bytesOfAll(some, templates, first);
    here.forEach((bytes, i) => {
      if (bytes !== inPage[i]) faults.push(firstDifference(some[i], inPage[i], bytes));
      if (bytes.startsWith('{')) tables += 1;
    });
  }
  expect(faults).toEqual([]);
  // A refusal compares well, too, but proves little.
  expect(tables).toBeGreaterThan(0.9 * count);
});

function firstDifference(definition: DefinitionInput, inPage: string, here: string): string {
  const at = Array.from(here).findIndex((character, i) => character !== inPage[i]);
  const around = (text: string) => text.slice(Math.max(0, at - 60), at + 20);
  return `Chromium …${around(inPage)}… Node.js …${around(here)}… in ${JSON.stringify(definition)}`;
}
