import { writeFile, mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import {
  renderAnswerSchema,
  reportAnswerSchema,
  tableReportSchema,
  type DefinitionInput,
} from '../../shared/contract/index.ts';
import { engineVersion } from '../../shared/engine-version.ts';
import { contentOf, digestOf, renderFiles, targets } from '../../shared/firmware/index.ts';
import { jsonLimit } from '../../server/http/json-body.ts';
import { readTemplates } from '../../server/tables/read-templates.ts';
import { stepwell } from '../support/command-line.ts';
import { anyAddress } from '../support/people.ts';
import { host, makeTestApp, origin, type TestApp } from '../support/test-app.ts';

const definition: DefinitionInput = {
  schema: 1,
  name: 'Fog signal */ ??/ Töne',
  source: {
    kind: 'harmonics',
    partials: [
      { harmonic: 1, amplitude: 1, phaseDeg: 0 },
      { harmonic: 3, amplitude: 0.4, phaseDeg: 30 },
    ],
  },
  table: { length: 100, bits: 10, coding: 'twos-complement' },
};

let test: TestApp;
beforeAll(() => {
  test = makeTestApp();
});
afterAll(() => test.close());

/** From an address of its own, so that the limit on strangers does not stop a test. */
const post = (path: string) =>
  request(test.app)
    .post(`/api/v1${path}`)
    .set('Host', host)
    .set('Origin', origin)
    .set('X-Forwarded-For', anyAddress());

function expectProblem(response: request.Response, status: number, kind: string) {
  expect(response.status).toBe(status);
  expect(response.headers['content-type']).toBe('application/problem+json; charset=utf-8');
  expect(response.body).toMatchObject({ type: `/problems/${kind}`, status });
}

describe('POST /report', () => {
  it('answers the table, its figures and its digest, as the engine has them, to anybody', async () => {
    const response = await post('/report').send(definition);
    const built = buildTable(definition);
    expect(response.status).toBe(200);
    expect(reportAnswerSchema.parse(response.body)).toEqual({
      codes: Array.from(built.codes),
      stored: Array.from(built.stored),
      report: built.report,
      spectrum: Array.from(built.spectrum.amplitudes),
      warnings: [],
      digest: digestOf({ definition: built.definition, engineVersion, codes: built.codes }),
    });
  });

  it('and the command line say the same', async () => {
    const response = await post('/report').send(definition);
    const { stdout } = await stepwell(['report', '-', '--json'], { input: JSON.stringify(definition) });
    const { digest, ...figures } = reportAnswerSchema.parse(response.body);
    expect(digest).toHaveLength(64);
    expect(tableReportSchema.parse(JSON.parse(stdout))).toEqual(figures);
  });

  it.each([
    [{ ...definition, table: { bits: 17 } }, 'table.bits', '17', 'a whole number from 1 to 16'],
    [{ ...definition, colour: 1 }, 'colour', '1', 'no such field'],
    [
      { ...definition, table: { length: 4, cycles: 2 } },
      'table.cycles',
      '2',
      'fewer than half of table.length, which is 4',
    ],
    [[], 'definition', 'a list of 0', 'an object'],
  ])('422 names the field at fault: %#', async (body, path, value, allowed) => {
    const response = await post('/report').send(body);
    expectProblem(response, 422, 'validation');
    expect(response.body.errors[0]).toEqual({ path, value, allowed });
  });
});

describe('POST /render', () => {
  const wanted = { definition, target: 'c99', options: { arrayName: 'mist' } };

  it.each(targets.map(({ id }) => id))(
    'gives for %s the bytes of the library and of the command line',
    async (target) => {
      const response = await post('/render').send({ definition, target });
      const answer = renderAnswerSchema.parse(response.body);
      const built = buildTable(definition);
      expect(response.status).toBe(200);
      expect(answer.files).toEqual(renderFiles(built, target, {}, readTemplates()));
      expect(answer.digest).toBe(
        digestOf({ definition: built.definition, engineVersion, codes: built.codes }),
      );
      // Files without comments have no place for it.
      const hasPlace = targets.find(({ id }) => id === target)?.commentOf !== undefined;
      for (const { text } of answer.files) if (hasPlace) expect(text).toContain(answer.digest);

      const folder = await mkdtemp(join(tmpdir(), 'stepwell-same-'));
      try {
        await writeFile(join(folder, 'fog.json'), JSON.stringify(definition));
        await stepwell(['render', 'fog.json', '--target', target, '--out', 'gen'], { folder });
        for (const file of answer.files) {
          const written = await readFile(join(folder, 'gen', file.name));
          expect(Buffer.compare(written, contentOf(file))).toBe(0);
        }
      } finally {
        await rm(folder, { recursive: true });
      }
    },
  );

  it('takes options, and gives the same entity tag for the same answer only', async () => {
    const first = await post('/render').send(wanted);
    const again = await post('/render').send(wanted);
    const other = await post('/render').send({ ...wanted, options: { arrayName: 'haze' } });
    expect(first.body.files.map(({ name }: { name: string }) => name)).toEqual(['mist.h', 'mist.c']);
    expect(first.headers.etag).toMatch(/^"[\w-]{43}"$/);
    expect(again.headers.etag).toBe(first.headers.etag);
    expect(other.headers.etag).not.toBe(first.headers.etag);
  });

  // RFC 9110 §13.1.2: where If-None-Match is false, 304 is for GET and HEAD, 412 for all other methods.
  it('412 to who has the answer already', async () => {
    const { etag } = (await post('/render').send(wanted)).headers;
    expectProblem(
      await post('/render').set('If-None-Match', `"x", W/${etag}`).send(wanted),
      412,
      'unchanged',
    );
    expect((await post('/render').set('If-None-Match', '"x"').send(wanted)).status).toBe(200);
  });

  it.each([
    [
      { ...wanted, target: 'c98' },
      'target',
      '"c98"',
      `one of ${targets.map(({ id }) => `"${id}"`).join(', ')}`,
    ],
    [{ ...wanted, target: 7 }, 'target', '7', 'the name of a target'],
    [
      { ...wanted, options: { arrayName: '__x' } },
      'options.arrayName',
      '"__x"',
      'an ASCII letter, then letters, digits and single underscores, not ending in an underscore',
    ],
    [{ ...wanted, options: { port: 'B' } }, 'options.port', '"B"', 'no such field'],
    [{ ...wanted, options: [] }, 'options', 'a list of 0', 'an object of options'],
    [{ ...wanted, extra: 1 }, 'extra', '1', 'no such field'],
    [{ target: 'c99' }, 'definition', 'nothing', 'a definition'],
    [{ ...wanted, definition: null }, 'definition', 'null', 'an object'],
    [{ ...wanted, definition: { ...definition, target: 1 } }, 'definition.target', '1', 'no such field'],
    [
      { ...wanted, definition: { ...definition, options: {} } },
      'definition.options',
      'an object with no fields',
      'no such field',
    ],
    [
      { ...wanted, definition: { ...definition, table: { bits: 0 } } },
      'definition.table.bits',
      '0',
      'a whole number from 1 to 16',
    ],
    [
      { ...wanted, target: 'avr', definition: { ...definition, table: { length: 40_000 } } },
      'definition.table.length',
      '40000',
      'at most 32767 entries of 8 bits for the target avr, whose arrays end at 32767 bytes',
    ],
  ])('422 names the field at fault: %#', async (body, path, value, allowed) => {
    const response = await post('/render').send(body);
    expectProblem(response, 422, 'validation');
    expect(response.body.errors[0]).toEqual({ path, value, allowed });
  });
});

describe('no input makes either of them fail', () => {
  const asIs = (path: string, body: string, type = 'application/json') =>
    post(path).set('Content-Type', type).send(body);

  it.each(['/report', '/render'])(
    '%s: bodies that are no JSON, too large, too deep, of another kind',
    async (path) => {
      expectProblem(await asIs(path, JSON.stringify({ definition }).slice(0, 40)), 400, 'malformed-request');
      expectProblem(await asIs(path, '{"definition": NaN}'), 400, 'malformed-request');
      expectProblem(await asIs(path, `"${'x'.repeat(10_000_000)}"`), 413, 'too-large');
      expectProblem(
        await asIs(path, `${'{"source":'.repeat(90_000)}1${'}'.repeat(90_000)}`),
        422,
        'validation',
      );
      expectProblem(await asIs(path, '['.repeat(100_000) + ']'.repeat(100_000)), 422, 'validation');
      expectProblem(
        await asIs(path, JSON.stringify(definition), 'text/plain'),
        415,
        'unsupported-media-type',
      );
      expectProblem(await post(path), 422, 'validation');
    },
  );

  it('any JSON is answered below 500, and refused with a problem', async () => {
    const almost = fc.record(
      {
        definition: fc.oneof(fc.jsonValue(), fc.constant(definition)),
        target: fc.oneof(fc.constant('c99'), fc.constant('avr'), fc.jsonValue()),
        options: fc.oneof(
          fc.record(
            { arrayName: fc.string(), port: fc.string(), highPort: fc.jsonValue() },
            { requiredKeys: [] },
          ),
          fc.jsonValue(),
        ),
      },
      { requiredKeys: [] },
    );
    const fields = fc.constantFrom(
      'schema',
      'name',
      'source',
      'level',
      'table',
      '__proto__',
      'constructor',
      'toJSON',
    );
    // Written as text: of two fields of one name, the last counts.
    const spoilt = fc
      .tuple(fields, fc.json())
      .map(
        ([field, json]) =>
          JSON.parse(JSON.stringify(definition).replace(/\}$/, () => `,"${field}":${json}}`)) as unknown,
      );
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom('/report', '/render'),
        fc.oneof(fc.jsonValue(), almost, spoilt),
        async (path, body) => {
          const response = await asIs(path, JSON.stringify(body));
          expect(response.status).toBeLessThan(500);
          if (response.status !== 200) {
            expect(response.headers['content-type']).toBe('application/problem+json; charset=utf-8');
          }
        },
      ),
      { seed: 20_483, numRuns: 200 },
    );
  });

  it('a definition at the largest size that fits a request is computed', async () => {
    const values = Array.from({ length: 65_536 }, (_, k) => Math.round(Math.sin(k / 10_430) * 1e6) / 1e6);
    const large = {
      ...definition,
      source: { kind: 'samples', resampling: 'linear', values },
      table: { length: 65_536, bits: 16 },
    };
    expect(JSON.stringify(large).length).toBeLessThan(jsonLimit);
    const response = await post('/render').send({ definition: large, target: 'c99' });
    expect(response.status).toBe(200);
  });
});
