import { describe, expect, it } from 'vitest';
import { targets } from '../../shared/firmware/index.ts';
import { readTone, sayCents, sayTone } from '../../src/features/bench/rates/read-tone.ts';
import { withExportOptions } from '../../src/features/bench/rates/to-export.ts';
import { chosenCost, costChoices, costCyclesOf } from '../../src/features/bench/rates/sample-cost.ts';
import { readPrescalers } from '../../src/features/bench/rates/wishes.ts';
import { examples } from '../../src/features/bench/state/examples.ts';
import { readKept, writeKept } from '../../src/features/bench/state/storage.ts';
import { timerOf, type Work } from '../../src/features/bench/state/wave.ts';

describe('a tone as it is typed', () => {
  it.each([
    ['A4', 440],
    ['440', 440],
    ['1.2 kHz', 1_200],
    // Equal temperament: three semitones above A4, 440·2^(3/12).
    ['C5', 523.2511306011972],
  ])('%s', (text, hz) => {
    expect(readTone(text)).toEqual({ hz: expect.closeTo(hz, 9) });
  });

  it.each(['', 'H4', 'A44', '0 Hz', '-3', 'loud'])('%j is refused with what is allowed', (text) => {
    expect(readTone(text)).toHaveProperty('fault', expect.stringMatching(/Allowed: /));
  });

  it('is said with its pitch and how far it lies off', () => {
    expect(sayTone(440)).toBe('440\u00a0Hz, A4');
    expect(sayTone(450)).toMatch(/A4 \+38\.9 cents$/);
    expect(sayTone(5)).toBe('5\u00a0Hz');
    expect(sayCents(-0.001)).toBe('0 cents');
  });
});

it('prescalers are read from a line, and what is none is named', () => {
  expect(readPrescalers('1, 8 64;256')).toEqual({ prescalers: [1, 8, 64, 256] });
  expect(readPrescalers('1, x')).toHaveProperty('fault', expect.stringContaining('“x”'));
  expect(readPrescalers('')).toHaveProperty('fault');
});

describe('the cost of a sample', () => {
  const typed = { costOf: 'own', costCycles: 150 };

  it('is a proven code’s in all, and one’s own number waits beside', () => {
    const chosen = { ...typed, costOf: 'avr timer, 256 × 8' };
    expect(costCyclesOf(chosen)).toBe(52);
    expect(costCyclesOf(typed)).toBe(150);
    expect(costChoices(chosen.costCycles)[0]).toMatchObject({
      value: 'own',
      label: 'Own number: 150 cycles',
    });
    // A case that has gone since.
    expect(costCyclesOf({ ...typed, costOf: 'avr timer, 7 × 8' })).toBe(150);
    expect(chosenCost({ costOf: 'avr timer, 7 × 8' })).toBe('own');
  });

  it('says of each choice whether it was measured or counted', () => {
    const said = (value: string) => costChoices(40).find((choice) => choice.value === value);
    expect(said('avr timer, 256 × 8')).toMatchObject({
      label: 'AVR, timer interrupt, 256 × 8: 52 cycles',
      hint: expect.stringMatching(
        /^Measured .* 48 cycles at most, plus 2 .*, plus 2 .*: 52 in all.* varies by 1 cycle, with calls and returns by 3/,
      ),
    });
    expect(said('avr accumulator, 256 × 8, 24 bits')).toMatchObject({
      label: 'AVR, accumulator in a loop, 256 × 8, 24 bits: 9 cycles',
    });
    expect(said('cortex-m timer, 256 × 8')).toMatchObject({
      label: 'Cortex-M, timer interrupt, 256 × 8: 12 instructions, counted',
      hint: expect.stringContaining('not measured'),
    });
    for (const { label, hint } of costChoices(40).slice(1)) {
      expect(hint, label).toMatch(/counted$/.test(label) ? /^Counted / : /^Measured /);
    }
  });
});

describe('a chosen timer and accumulator', () => {
  const { work } = examples[0];
  const timed: Work = {
    ...work,
    playback: {
      ...work.playback,
      by: 'sampleRate',
      sampleRateHz: 16e6 / 8 / 70,
      timer: { clockHz: 16e6, prescaler: 8, compare: 69 },
      accumulator: { accumulatorBits: 24, stepWord: 258_000 },
    },
  };

  it('hold until the rate is set otherwise', () => {
    expect(timerOf(timed.playback)).toEqual(timed.playback.timer);
    expect(timerOf({ ...timed.playback, sampleRateHz: 28_000 })).toBeUndefined();
    expect(timerOf({ ...timed.playback, by: 'tone' })).toBeUndefined();
  });

  it('are kept with the work', () => {
    expect(readKept(writeKept(timed))).toEqual({ kind: 'work', work: timed });
  });

  it('reach the options of every target that takes them, others as they were typed', () => {
    const typed = { avr: { arrayName: 'horn', compare: '5' } };
    const { options } = withExportOptions({
      ...timed,
      exporting: { target: 'c99', options: typed },
    }).exporting;
    expect(options.avr).toMatchObject({
      arrayName: 'horn',
      clockHz: '16000000',
      prescaler: '8',
      compare: '69',
    });
    expect(options.avr.toneMilliHz).toBe(String(Math.round((1000 * 258_000 * (16e6 / 560)) / 2 ** 24)));
    for (const target of targets) {
      expect(target.options.safeParse(options[target.id] ?? {}).success).toBe(true);
    }
  });
});
