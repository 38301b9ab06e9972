import { execFileSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { revisions, teams } from '../../server/db/schema/index.ts';
import { projectFolder } from '../../server/project-folder.ts';
import { renderAnswerSchema, teamDefaultsSchema, type GeneratedFile } from '../../shared/contract/index.ts';
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
  folder = mkdtempSync(join(tmpdir(), 'stepwell-export-'));
});
afterAll(async () => {
  await test.close();
  rmSync(folder, { recursive: true });
});

const exported = (slug: string, query: string) =>
  asPerson(test, crew.viewer).get(`${tables}/${slug}/revisions/1/export?${query}`);

const setDefaults = (defaults: { arrayPrefix?: string; licenceLine?: string }) =>
  test.database.db
    .update(teams)
    .set({ defaults: teamDefaultsSchema.parse(defaults) })
    .where(eq(teams.id, crew.team.id));

/** What the command line writes for a definition. */
function rendered(definition: object, flags: readonly string[]): GeneratedFile[] {
  const place = mkdtempSync(join(folder, 'cli-'));
  const file = join(place, 'definition.json');
  writeFileSync(file, JSON.stringify(definition));
  const script = join(projectFolder, 'server', 'cli', 'main.ts');
  const out = join(place, 'out');
  execFileSync(process.execPath, ['--import', 'tsx', script, 'render', file, '--out', out, ...flags], {
    cwd: projectFolder,
  });
  const isBytes = (name: string) => /\.(?:bin|wav)$/.test(name);
  return readdirSync(out).map((name) =>
    isBytes(name)
      ? { name, text: readFileSync(join(out, name), 'base64'), encoding: 'base64' }
      : { name, text: readFileSync(join(out, name), 'utf8'), encoding: 'utf-8' },
  );
}

const byName = (files: readonly GeneratedFile[]) => [...files].sort((a, b) => (a.name < b.name ? -1 : 1));

describe('the export of a saved revision', () => {
  it.each([
    ['c99', 'target=c99', ['--target', 'c99']],
    ['avr', 'target=avr&port=D&arrayName=horn', ['--target', 'avr', '--port', 'D', '--name', 'horn']],
    ['wav', 'target=wav&sampleRateHz=8000', ['--target', 'wav', '--sample-rate-hz', '8000']],
    ['binary', 'target=binary', ['--target', 'binary']],
  ])('has the bytes of the command line: %s', async (target, query, flags) => {
    const definition = sineDefinition('Same bytes', { bits: 8, dither: 'triangular', seed: 3 });
    const { slug } = await saveTable(test, crew.team, crew.author, `Same bytes ${target}`, { definition });
    const answer = await exported(slug, query);
    expect(answer.status, answer.text).toBe(200);
    const { files, digest } = renderAnswerSchema.parse(answer.body);
    expect(byName(files)).toEqual(byName(rendered(definition, flags)));
    if (files[0].encoding === 'utf-8') expect(files[0].text).toContain(digest);
  });

  it('comes from what was stored, also where the engine would compute it otherwise today', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Stored');
    const { body: table } = await asPerson(test, crew.viewer).get(`${tables}/${slug}/revisions/1`);
    const report = { ...table.report, snrDb: 12.345 };
    const [row] = await test.database.db.select().from(revisions).where(eq(revisions.digest, table.digest));
    await test.database.db
      .update(revisions)
      .set({
        codes: Buffer.from(Array.from({ length: 128 }, (_, k) => (k % 2 === 0 ? 77 : 0))),
        engineVersion: '0.9.0',
        report,
      })
      .where(eq(revisions.id, row.id));
    const { body } = await exported(slug, 'target=c99');
    const source: string = body.files.find(({ name }: GeneratedFile) => name.endsWith('.c')).text;
    const words = /\{\n([^}]*)\}/.exec(source)?.[1].match(/\d+/g);
    expect(words).toEqual(Array(64).fill('77'));
    expect(body.files[0].text).toContain('12.35 dB');
    expect(body.files[0].text).toContain('0.9.0');
  });

  it('has a strong tag, the same for the same request, and is not sent again to who has it', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Tagged');
    const first = await exported(slug, 'target=c99');
    expect(first.headers.etag).toMatch(/^"[\w-]{43}"$/);
    expect(first.headers['cache-control']).toBe('private, no-cache, no-transform');
    const again = await exported(slug, 'target=c99').set('Accept-Encoding', 'gzip');
    expect([again.text, again.headers.etag]).toEqual([first.text, first.headers.etag]);
    expect(again.headers['content-encoding']).toBeUndefined();
    for (const names of [first.headers.etag, `"x", W/${first.headers.etag}`, '*']) {
      const answer = await exported(slug, 'target=c99').set('If-None-Match', names);
      expect([answer.status, answer.text, answer.headers.etag]).toEqual([304, '', first.headers.etag]);
    }
    const other = await exported(slug, 'target=c99&arrayName=other').set('If-None-Match', first.headers.etag);
    expect(other.status).toBe(200);
  });

  it('is one file as an attachment where one is asked for', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'One file');
    const whole = await exported(slug, 'target=c99');
    for (const { name, text } of whole.body.files) {
      const answer = await exported(slug, `target=c99&file=${name}`);
      expect(answer.headers['content-type']).toBe('text/plain; charset=utf-8');
      expect(answer.headers['content-disposition']).toBe(`attachment; filename=${name}`);
      expect(answer.headers['x-content-type-options']).toBe('nosniff');
      expect(answer.headers.etag).not.toBe(whole.headers.etag);
      expect(answer.text).toBe(text);
    }
    const { body } = await exported(slug, 'target=wav');
    const [sound] = body.files as GeneratedFile[];
    const bytes = await exported(slug, `target=wav&file=${sound.name}`);
    expect(bytes.headers['content-type']).toBe('application/octet-stream');
    expect(Buffer.compare(bytes.body, Buffer.from(sound.text, 'base64'))).toBe(0);
    const missing = await exported(slug, 'target=c99&file=../../etc/passwd');
    expect([missing.status, missing.headers['content-disposition']]).toEqual([422, undefined]);
    expect(missing.body.errors).toEqual([
      { path: 'file', value: '"../../etc/passwd"', allowed: 'one of "one_file.h", "one_file.c"' },
    ]);
  });

  it('begins with the team’s prefix and licence line, unless told otherwise', async () => {
    const definition = sineDefinition('8 bits: Ünïcode');
    const { slug } = await saveTable(test, crew.team, crew.author, 'Defaults', { definition });
    const plain = await exported(slug, 'target=c99');
    expect(plain.body.files[0].name).toBe('table_8_bits_unicode.h');
    await setDefaults({ arrayPrefix: 'nf_', licenceLine: 'SPDX-License-Identifier: MIT' });
    const own = await exported(slug, 'target=c99');
    expect(own.body.files.map(({ name }: GeneratedFile) => name)).toEqual([
      'nf_8_bits_unicode.h',
      'nf_8_bits_unicode.c',
    ]);
    for (const { text } of own.body.files) expect(text).toMatch(/^\/\/ SPDX-License-Identifier: MIT\n\/\*/);
    const flags = [
      '--target',
      'c99',
      '--array-prefix',
      'nf_',
      '--licence-line',
      'SPDX-License-Identifier: MIT',
    ];
    expect(byName(own.body.files)).toEqual(byName(rendered(definition, flags)));

    const told = await exported(slug, 'target=c99&arrayPrefix=&licenceLine=');
    expect(told.text).toBe(plain.text);
    const named = await exported(slug, 'target=c99&arrayName=horn');
    expect(named.body.files[0].name).toBe('horn.h');
    await setDefaults({});
  });

  it('is refused by the name in the address, the value and what is allowed', async () => {
    const { slug } = await saveTable(test, crew.team, crew.author, 'Refused', {
      definition: sineDefinition('Refused', { fold: 'quarter', sampleAt: 'centre' }),
    });
    const errorsOf = async (query: string) => {
      const answer = await exported(slug, query);
      expect(answer.status, answer.text).toBe(422);
      return answer.body.errors;
    };
    expect(await errorsOf('')).toEqual([
      { path: 'target', value: 'nothing', allowed: 'the name of a target' },
    ]);
    expect(await errorsOf('target=pdf')).toMatchObject([{ path: 'target', value: '"pdf"' }]);
    expect(await errorsOf('target=c99&arrayName=int')).toEqual([
      { path: 'arrayName', value: '"int"', allowed: 'a name that is no keyword of C or C++' },
    ]);
    expect(await errorsOf('target=c99&port=B')).toEqual([
      { path: 'port', value: '"B"', allowed: 'no such field' },
    ]);
    expect(await errorsOf('target=c99&arrayPrefix=a__b')).toMatchObject([{ path: 'arrayPrefix' }]);
    expect(await errorsOf('target=c99&licenceLine=a%0Ab')).toMatchObject([{ path: 'licenceLine' }]);
    expect(await errorsOf('target=avr')).toMatchObject([
      { path: 'definition.table.fold', value: '"quarter"' },
    ]);
  });
});

describe('text made to be taken for something else', () => {
  const hostile = [
    '*/ int injected; /*',
    '// \\',
    '??/',
    '<script>alert(1)</script>',
    '"><img src=x onerror=alert(1)>',
    "'; DROP TABLE users; --",
    '\u2028\u2029\r\nint injected;',
    '{{ 7 | times: 7 }} {% raw %}',
    '\u202e evil',
    '= 1 + 1',
  ];

  it.each(hostile)('is kept as it was typed and comes out as data: %j', async (text) => {
    const definition = sineDefinition(text);
    const saved = await saveTable(test, crew.team, crew.author, text, { definition, note: text });
    const { title, slug, revisions: listed } = saved;
    expect([title, listed[0].note]).toEqual([text.trim(), text.trim()]);
    const answer = await asPerson(test, crew.viewer).get(`${tables}/${slug}/revisions/1`);
    expect(answer.body.definition.name).toBe(text);
    // What a browser would do with it is decided by these, not by what is in it.
    expect(answer.headers['content-type']).toBe('application/json; charset=utf-8');
    expect(answer.headers['x-content-type-options']).toBe('nosniff');
    expect(answer.headers['content-security-policy']).toContain("default-src 'self'");

    const found = await asPerson(test, crew.viewer).get(
      `${tables}?search=${encodeURIComponent(text)}&limit=100`,
    );
    expect(found.status).toBe(200);
    expect(found.body.items.map((item: { slug: string }) => item.slug)).toContain(slug);
  });

  it('changes nothing in exported files: gcc compiles them to the plain ones’ array, without a warning', async () => {
    const program = `#include <stdio.h>\n#include "named.h"\nint main(void) {\n  for (unsigned k = 0; k < NAMED_LENGTH; k++) printf("%d ", (int)named[k]);\n  return 0;\n}\n`;
    const outputs = new Set<string>();
    for (const text of ['plain', ...hostile]) {
      const { slug } = await saveTable(test, crew.team, crew.author, text, {
        definition: sineDefinition(text),
      });
      // A licence line is one line; whoever types it may try as well.
      const licence = text.replace(/[\r\n\u2028\u2029]/g, ' ');
      await setDefaults({ licenceLine: licence });
      const answer = await exported(slug, 'target=c99&arrayName=named');
      expect(answer.status, answer.text).toBe(200);
      const place = mkdtempSync(join(folder, 'gcc-'));
      for (const file of answer.body.files as GeneratedFile[])
        writeFileSync(join(place, file.name), file.text);
      writeFileSync(join(place, 'main.c'), program);
      const strict = ['-std=c99', '-trigraphs', '-Wall', '-Wextra', '-Wpedantic', '-Werror'];
      execFileSync('gcc', [...strict, '-o', 'program', 'main.c', 'named.c'], { cwd: place, stdio: 'pipe' });
      outputs.add(execFileSync(join(place, 'program')).toString());
    }
    await setDefaults({});
    expect(outputs.size).toBe(1);
    expect([...outputs][0].trim().split(' ')).toHaveLength(64);
  });
});
