import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readTemplates } from '../../server/tables/read-templates.ts';
import { buildTable } from '../../shared/build-table.ts';
import {
  parsePulsePattern,
  patternMs,
  pulseLimits,
  Refusal,
  type PulsePattern,
} from '../../shared/contract/index.ts';
import {
  arrayNameLength,
  parsePatternText,
  patternText,
  pulsesOptionFor,
  renderFiles,
  targetOf,
  targets,
} from '../../shared/firmware/index.ts';
import { patternEdges, patternScore } from '../../shared/listening/pattern-score.ts';
import { holds } from './support/seeded.ts';

const whole = ({ min, max }: { min: number; max: number }) =>
  fc.oneof(fc.integer({ min, max }), fc.constantFrom(min, max));
const { onMs, offMs, repeats, steps } = pulseLimits;
const anyPattern = fc.record({
  steps: fc.array(fc.record({ onMs: whole(onMs), offMs: whole(offMs), repeats: whole(repeats) }), {
    minLength: steps.min,
    maxLength: steps.max,
  }),
  endless: fc.boolean(),
});

const table = buildTable({
  schema: 1,
  name: 'Fog horn',
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
  table: { length: 16 },
});
const rendered = (target: string, options: object) =>
  renderFiles(table, target, { ...(target === 'avr' && { playback: 'none' }), ...options }, readTemplates());
const withPulses = targets.filter(({ options }) => 'pulses' in options.shape).map(({ id }) => id);

const problemsOf = (work: () => unknown) => {
  try {
    work();
  } catch (error) {
    if (error instanceof Refusal)
      return error.problems.map(({ path, value, allowed }) => [path, value, allowed]);
    throw error;
  }
  return [];
};

describe('a pattern as text', () => {
  it('reads back what was written, at the edges of what is allowed too', () =>
    holds(
      fc.property(anyPattern, (pattern) => {
        expect(parsePatternText(patternText(pattern))).toEqual(pattern);
        expect(parsePulsePattern(pattern)).toEqual(pattern);
      }),
    ));

  it('reads spaces as they come, and nothing or none as no pattern', () => {
    const pattern: PulsePattern = {
      steps: [
        { onMs: 200, offMs: 100, repeats: 3 },
        { onMs: 500, offMs: 0, repeats: 1 },
      ],
      endless: true,
    };
    expect(patternText(pattern)).toBe('200/100x3 500/0 endless');
    expect(parsePatternText('  200/100x3   500/0x1 endless ')).toEqual(pattern);
    expect(['', ' ', 'none'].map(parsePatternText)).toEqual([undefined, undefined, undefined]);
  });

  const step = 'on/off in whole milliseconds, with its repeats behind an x, as 200/100x3';
  it.each<[text: string, allowed: string]>([
    ['0/100', 'in step 1, on from 1 to 60000 ms'],
    ['200/100 60001/0', 'in step 2, on from 1 to 60000 ms'],
    ['1/60001', 'in step 1, off from 0 to 60000 ms'],
    ['1/1x256', 'in step 1, 1 to 255 repeats'],
    ['1/1x0', 'in step 1, 1 to 255 repeats'],
    ['1.5/1', `in step 1, ${step}`],
    ['-1/1', `in step 1, ${step}`],
    ['1/1 endless 1/1', `in step 2, ${step}`],
    ['1e3/1', `in step 1, ${step}`],
    ['1/1\n2/2', `in step 1, ${step}`],
    ['１/1', `in step 1, ${step}`],
    ['*/ int main(void) { /*', `in step 1, ${step}`],
    ['endless', '1 to 64 steps, as 200/100x3 500/0'],
    [Array.from({ length: 65 }, () => '1/1').join(' '), '1 to 64 steps, as 200/100x3 500/0'],
    ['9'.repeat(2000), 'at most 1031 characters'],
  ])('refuses %j and says what is allowed', (text, allowed) => {
    const [[path, , said]] = problemsOf(() => parsePatternText(text));
    expect([path, said]).toEqual(['options.pulses', allowed]);
    for (const target of withPulses) {
      expect(problemsOf(() => rendered(target, { pulses: text }))[0].slice(0, 1)).toEqual(['options.pulses']);
    }
  });
});

it('a pattern that is refused names each field at fault', () => {
  const good = { onMs: 1, offMs: 0, repeats: 1 };
  const input = {
    steps: [
      good,
      { ...good, onMs: 0 },
      { ...good, offMs: 1.5 },
      { ...good, repeats: 256 },
      { onMs: 1, offMs: 1 },
    ],
    endless: 'yes',
  };
  const milliseconds = (from: number) => `a whole number from ${from} to 60000, in milliseconds`;
  expect(problemsOf(() => parsePulsePattern(input))).toEqual([
    ['pattern.steps[1].onMs', '0', milliseconds(1)],
    ['pattern.steps[2].offMs', '1.5', milliseconds(0)],
    ['pattern.steps[3].repeats', '256', 'a whole number from 1 to 255'],
    ['pattern.steps[4].repeats', 'nothing', 'a whole number from 1 to 255'],
    ['pattern.endless', '"yes"', 'true or false'],
  ]);
  const many = Array.from({ length: 65 }, () => good);
  expect(problemsOf(() => parsePulsePattern({ steps: many, endless: false }))).toEqual([
    ['pattern.steps', 'a list of 65', 'a list of 1 to 64 steps'],
  ]);
});

describe('a score of a pattern', () => {
  const few = anyPattern.map((pattern) => ({ ...pattern, steps: pattern.steps.slice(0, 6) }));

  it('rises, opens and closes in turn, and sounds as long as the pulses are', () =>
    holds(
      fc.property(few, (pattern) => {
        const edges = Array.from(patternEdges(pattern));
        expect(edges.length % 2).toBe(0);
        expect(edges.every((ms, k) => k === 0 || ms > edges[k - 1])).toBe(true);
        const sounding = edges.reduce((sum, ms, k) => sum + (k % 2 === 0 ? -ms : ms), 0);
        expect(sounding).toBe(pattern.steps.reduce((sum, one) => sum + one.onMs * one.repeats, 0));
        const { events, repeatSeconds } = patternScore(pattern);
        expect(events.map(({ gate }) => gate)).toEqual(events.map((_, k) => k % 2 === 0));
        expect(repeatSeconds).toBe(pattern.endless ? patternMs(pattern) / 1000 : undefined);
        expect(events.every(({ atSeconds }) => atSeconds < (repeatSeconds ?? Infinity))).toBe(true);
        expect(pattern.endless || events.at(-1)?.gate === false).toBe(true);
      }),
    ));

  it('stays open over the seam where the last pulse runs into the first', () => {
    const { events } = patternScore({ steps: [{ onMs: 250, offMs: 0, repeats: 2 }], endless: true });
    expect(events).toEqual([{ atSeconds: 0, gate: true }]);
  });
});

describe('the export of a pattern', () => {
  it('adds files of its own and changes no byte of the others; JSON takes it into its document', () => {
    expect(withPulses).toEqual(['c99', 'avr', 'cpp17', 'cortex-m', 'riscv', 'rust', 'python', 'json']);
    for (const target of withPulses) {
      const plain = rendered(target, {});
      expect(rendered(target, { pulses: 'none' })).toEqual(plain);
      const both = rendered(target, { pulses: '200/100x3 500/0' });
      if (target === 'json') {
        const { pulses, ...rest } = JSON.parse(both[0].text) as { pulses: object };
        expect(rest).toEqual(JSON.parse(plain[0].text));
        expect(pulses).toMatchObject({ endless: false, totalMs: 1400 });
        continue;
      }
      expect(both.slice(0, plain.length)).toEqual(plain);
      expect(both.length).toBeGreaterThan(plain.length);
      for (const { name } of both.slice(plain.length)) expect(name).toMatch(/^fog_horn_pulses\./);
    }
  });

  it('keeps names within the characters that C tells apart, and inert what a person typed', () => {
    const arrayName = 'a'.repeat(arrayNameLength.max);
    const hostile = { ...table, definition: { ...table.definition, name: '*/ #error "x" /* \\u000a' } };
    for (const target of ['c99', 'avr', 'cpp17', 'cortex-m', 'riscv']) {
      const options = { arrayName, pulses: '1/1', ...(target === 'avr' && { playback: 'none' }) };
      const files = renderFiles(hostile, target, options, readTemplates()).filter(({ name }) =>
        name.includes('_pulses.'),
      );
      for (const { text } of files) {
        const names = text.match(/[A-Za-z_]\w*/g) ?? [];
        expect(
          Math.max(...names.filter((name) => name.startsWith('a')).map(({ length }) => length)),
        ).toBeLessThan(64);
        expect(text.split('*/').length).toBe(text.split('/*').length);
        expect(text).not.toMatch(/^\s*#error/m);
      }
    }
  });

  it('is refused by name where a target carries none', () => {
    for (const { id } of targets.filter((target) => !withPulses.includes(target.id))) {
      const [[path, , allowed]] = problemsOf(() => rendered(id, { pulses: '1/1' }));
      expect([path, allowed]).toEqual(['options.pulses', 'no such field']);
      expect(pulsesOptionFor(targetOf(id), { steps: [], endless: false })).toEqual({});
    }
  });

  it('keeps line ends, licence and name as they are asked for', () => {
    const files = rendered('c99', {
      pulses: '1/1',
      arrayName: 'horn',
      licenceLine: 'SPDX-License-Identifier: MIT',
      lineEnding: 'crlf',
    }).slice(2);
    expect(files.map(({ name }) => name)).toEqual(['horn_pulses.h', 'horn_pulses.c']);
    for (const { text } of files) {
      expect(text.startsWith('// SPDX-License-Identifier: MIT\r\n')).toBe(true);
      expect(text.replaceAll('\r\n', '')).not.toContain('\n');
    }
  });
});
