import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { readTemplates } from '../../server/tables/read-templates.ts';
import { buildTable } from '../../shared/build-table.ts';
import { revisionSchema, type GeneratedFile, type PulsePattern } from '../../shared/contract/index.ts';
import { patternText, renderFiles } from '../../shared/firmware/index.ts';
import { expectOneLine, stepwell } from '../support/command-line.ts';
import { saveTable, sineDefinition } from '../support/library.ts';
import { asPerson, makeCrew } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let test: TestApp;
let crew: Awaited<ReturnType<typeof makeCrew>>;
let tables: string;
let folder: string;
beforeAll(async () => {
  test = makeTestApp();
  crew = await makeCrew(test);
  tables = `/teams/${crew.team.slug}/tables`;
  folder = await mkdtemp(join(tmpdir(), 'stepwell-pulses-'));
});
afterAll(async () => {
  await test.close();
  await rm(folder, { recursive: true });
});

const playback = { mode: 'loop', by: 'tone', toneHz: 440, sampleRateHz: 32_000 };
const pattern: PulsePattern = {
  steps: [
    { onMs: 200, offMs: 100, repeats: 3 },
    { onMs: 500, offMs: 0, repeats: 1 },
  ],
  endless: true,
};
const definition = sineDefinition('Fog pulses');

const viewer = () => asPerson(test, crew.viewer);
const exported = async (slug: string, query: string): Promise<GeneratedFile[]> => {
  const answer = await viewer().get(`${tables}/${slug}/revisions/1/export?${query}`);
  expect(answer.status, answer.text).toBe(200);
  return answer.body.files;
};

it('a pattern is saved with a revision and answered as it was, the longest too; one without stays without', async () => {
  const longest = {
    steps: Array.from({ length: 64 }, () => ({ onMs: 60_000, offMs: 60_000, repeats: 255 })),
    endless: false,
  };
  for (const [title, kept] of [
    ['Short', pattern],
    ['Longest', longest],
    ['None', undefined],
  ] as const) {
    const { slug } = await saveTable(test, crew.team, crew.author, title, {
      playback: { ...playback, ...(kept && { pattern: kept }) },
    });
    const revision = revisionSchema.parse((await viewer().get(`${tables}/${slug}/revisions/1`)).body);
    expect(revision.playback?.pattern).toEqual(kept);
  }
});

it('a pattern that is refused names its fields, and nothing is stored', async () => {
  const good = { onMs: 1, offMs: 0, repeats: 1 };
  const post = (changed: object) =>
    asPerson(test, crew.author).post(tables, {
      title: 'Refused',
      definition,
      playback: { ...playback, pattern: { ...pattern, ...changed } },
    });
  const answers: [object, object[]][] = [
    [
      { steps: [good, good, good, { ...good, onMs: 0 }] },
      [
        {
          path: 'playback.pattern.steps[3].onMs',
          value: '0',
          allowed: 'a whole number from 1 to 60000, in milliseconds',
        },
      ],
    ],
    [
      { steps: [{ ...good, repeats: 256 }] },
      [{ path: 'playback.pattern.steps[0].repeats', value: '256', allowed: 'a whole number from 1 to 255' }],
    ],
    [
      { steps: Array.from({ length: 65 }, () => good) },
      [{ path: 'playback.pattern.steps', value: 'a list of 65', allowed: 'a list of 1 to 64 steps' }],
    ],
    [
      { steps: [good], loud: true },
      [{ path: 'playback.pattern.loud', value: 'true', allowed: 'no such field' }],
    ],
  ];
  for (const [changed, errors] of answers) {
    const refused = await post(changed);
    expect(refused.status, refused.text).toBe(422);
    expect(refused.body.errors).toEqual(errors);
  }
  expect((await viewer().get(`${tables}/refused`)).status).toBe(404);
});

it('the export of a revision has its pattern: the bytes of the bench’s renderer and of the command line', async () => {
  const { slug } = await saveTable(test, crew.team, crew.author, 'Fog pulses', {
    definition,
    playback: { ...playback, pattern },
  });
  const input = join(folder, 'fog.json');
  await writeFile(input, JSON.stringify(definition));
  const table = buildTable(definition);
  for (const target of ['c99', 'avr', 'cpp17']) {
    const files = await exported(slug, `target=${target}`);
    expect(files.some(({ name }) => name.startsWith('fog_pulses_pulses.'))).toBe(true);
    expect(files).toEqual(renderFiles(table, target, { pulses: patternText(pattern) }, readTemplates()));
    const out = join(folder, target);
    const flags = ['--target', target, '--pulses', '200/100x3 500/0 endless', '--out', out];
    const { status, stderr } = await stepwell(['render', input, ...flags]);
    expect([status, stderr]).toEqual([0, '']);
    expect((await readdir(out)).sort()).toEqual(files.map(({ name }) => name).sort());
    for (const { name, text } of files) expect(await readFile(join(out, name), 'utf8')).toBe(text);

    const without = await exported(slug, `target=${target}&pulses=none`);
    expect(without).toEqual(renderFiles(table, target, {}, readTemplates()));
    const other = await exported(slug, `target=${target}&pulses=${encodeURIComponent('7/8x9')}`);
    expect(other).toEqual(renderFiles(table, target, { pulses: '7/8x9' }, readTemplates()));
  }
  // A target that carries no pattern is exported as ever.
  const sound = await exported(slug, 'target=wav');
  expect(sound).toEqual(renderFiles(table, 'wav', {}, readTemplates()));
  const refused = await viewer().get(`${tables}/${slug}/revisions/1/export?target=c99&pulses=0/1`);
  expect([refused.status, refused.body.errors]).toEqual([
    422,
    [{ path: 'pulses', value: '"0/1"', allowed: 'in step 1, on from 1 to 60000 ms' }],
  ]);
});

it('the command line refuses a pattern in one line, with status 2', async () => {
  const input = JSON.stringify(definition);
  const render = (target: string, pulses: string) =>
    stepwell(['render', '-', '--target', target, '--pulses', pulses], { input });
  const many = Array.from({ length: 65 }, () => '1/1').join(' ');
  expectOneLine(
    await render('c99', '0/1'),
    /^--pulses: "0\/1" is not allowed; allowed: in step 1, on from 1 to/,
  );
  expectOneLine(await render('avr', '1/1 1/1x256'), /^--pulses: .*allowed: in step 2, 1 to 255 repeats$/);
  expectOneLine(await render('cpp17', many), /^--pulses: .*allowed: 1 to 64 steps, as 200\/100x3 500\/0$/);
  expectOneLine(
    await render('c99', '1/1\n*/ #error \u202e'),
    /^--pulses: .*allowed: in step 1, on\/off in whole/,
  );
  expectOneLine(await render('wav', '1/1'), /^--pulses: "1\/1" is not allowed; allowed: no such field$/);
});
