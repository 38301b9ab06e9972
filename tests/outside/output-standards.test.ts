import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { parseTrialSettings } from '../../shared/contract/index.ts';
import {
  currentsOf,
  decadeOf,
  drawsOf,
  firstImageOf,
  holdGain,
  linearityOf,
  smallestR,
  Trials,
  voltsOf,
} from '../../shared/output-stage/index.ts';
import { ladderWith } from '../engine/support/ladders.ts';
import { waveOf } from '../engine/support/waves.ts';
import { askPython } from './numpy/python.ts';
import { avrPart, avrProgram } from './support/compilers.ts';
import { portWrites } from './support/avr-simulator.ts';

// Source: A. V. Oppenheim, R. W. Schafer, Discrete-Time Signal Processing, "D/A conversion": the zero-order hold is
// sin(πf/fs)/(πf/fs), 2/π or −3.92 dB at half the sample rate.
describe('the hold (Oppenheim & Schafer)', () => {
  it('takes 3.92 dB at half the sample rate', () => {
    expect(20 * Math.log10(holdGain(24_000, 48_000))).toBeCloseTo(-3.92, 2);
    expect(holdGain(0, 48_000)).toBe(1);
    expect(holdGain(48_000, 48_000)).toBeLessThan(1e-15);
  });

  it('leaves an image as strong as the tone where both meet', () => {
    expect(firstImageOf(24_000, 48_000).heldDb).toBe(0);
  });
});

// Source: IEEE Std 1658-2011, definitions of INL (end points) and DNL, on a ladder worked by hand: 2 bits on 5 V, R
// 1 kΩ, the top rung 2.2 kΩ for 2 kΩ. Behind node 0 and R stand 2.5 V and 2 kΩ, so that bit 0 weighs 5·0.11/2.1 V and
// bit 1 weighs 5·0.2/2.1 V: levels 0, 0.55/0.42, 1/0.42, 1.55/0.42 V.
describe('linearity of a ladder worked by hand (IEEE Std 1658-2011)', () => {
  const volts = voltsOf(ladderWith({ bits: 2, R: 1000, rungs: [2000, 2200] }));

  it('has those levels', () => {
    [0, 0.55, 1, 1.55].forEach((level, code) => expect(volts[code]).toBeCloseTo(level / 0.42, 12));
  });

  it('has INL 2/31 and DNL −4/31 LSB, steps against the mean of all', () => {
    const { lsbVolts, inl, dnl, maxInl, maxDnl, monotonic } = linearityOf(volts);
    expect(lsbVolts).toBeCloseTo(1.55 / 0.42 / 3, 12);
    [0, 2 / 31, -2 / 31, 0].forEach((wanted, code) => expect(inl[code]).toBeCloseTo(wanted, 12));
    [2 / 31, -4 / 31, 2 / 31].forEach((wanted, code) => expect(dnl[code + 1]).toBeCloseTo(wanted, 12));
    expect([maxInl, maxDnl]).toEqual([expect.closeTo(2 / 31, 12), expect.closeTo(4 / 31, 12)]);
    expect(monotonic).toBe(true);
  });
});

// Source: numpy/ladders.py, an independent program of §6 on NumPy's general solver.
describe('tolerance trials against NumPy, given the same ladders', () => {
  const table = buildTable(waveOf({ table: { bits: 6, length: 90 } }));
  it.each(['uniform', 'normal'] as const)('%s', (distribution) => {
    const ladder = ladderWith({ bits: 6, rHigh: 45, rLow: 25, load: 30_000, vLow: -1 });
    const settings = parseTrialSettings({ trials: 300, tolerancePercent: 6, distribution, seed: 9 });
    const draws = drawsOf(ladder, settings);
    const builds = Array.from({ length: settings.trials }, () => {
      const { rungs, series, terminator } = draws.next();
      return { rungs: Array.from(rungs), series: Array.from(series), terminator };
    });
    const wanted = askPython<Record<string, number | boolean>[]>('ladders.py', {
      ...ladder,
      builds,
      codes: Array.from(table.codes),
      cycle: Array.from(table.cycle),
    });
    const trials = new Trials(ladder, settings, { codes: table.codes, cycle: table.cycle, range: 'bipolar' });
    trials.run(settings.trials);
    const figures = trials.figures();
    wanted.forEach((build, k) => {
      expect(figures.monotonic[k] === 1).toBe(build.monotonic);
      for (const name of ['maxInl', 'maxDnl', 'sinadDb', 'unwantedDb'] as const) {
        expect(figures[name][k], `${name} of build ${k}`).toBeCloseTo(build[name] as number, 7);
      }
    });
    const rising = wanted.filter(({ monotonic }) => monotonic).length;
    expect(rising).toBeGreaterThan(0);
    expect(rising).toBeLessThan(settings.trials);
    expect(trials.summary().monotonicShare).toBe(rising / settings.trials);
  });
});

// Source: IEC 60063, "Preferred number series for resistors and capacitors": the tables as data sheets and catalogues
// print them; remembered values.
describe('preferred values (IEC 60063)', () => {
  const printed = {
    E12: '10 12 15 18 22 27 33 39 47 56 68 82',
    E24: '10 11 12 13 15 16 18 20 22 24 27 30 33 36 39 43 47 51 56 62 68 75 82 91',
    E48: `100 105 110 115 121 127 133 140 147 154 162 169 178 187 196 205 215 226 237 249 261 274 287 301
      316 332 348 365 383 402 422 442 464 487 511 536 562 590 619 649 681 715 750 787 825 866 909 953`,
    E96: `100 102 105 107 110 113 115 118 121 124 127 130 133 137 140 143 147 150 154 158 162 165 169 174
      178 182 187 191 196 200 205 210 215 221 226 232 237 243 249 255 261 267 274 280 287 294 301 309
      316 324 332 340 348 357 365 374 383 392 402 412 422 432 442 453 464 475 487 499 511 523 536 549
      562 576 590 604 619 634 649 665 681 698 715 732 750 768 787 806 825 845 866 887 909 931 953 976`,
  };
  it.each(Object.entries(printed))('%s', (series, values) => {
    expect(decadeOf(series as 'E12')).toEqual(values.split(/\s+/).map(Number));
  });
});

describe('ladders in use (common practice, no source)', () => {
  it('2 bits on 5 V reach 3.75 V', () => {
    expect(voltsOf(ladderWith({ bits: 2 }))[3]).toBeCloseTo(3.75, 12);
  });

  it('5 V and 40 mA need 125 Ω between a high pin and ground: R of 62.5 Ω for the top pin into a short', () => {
    expect(5 / 0.04).toBe(125);
    for (const bits of [1, 4, 8]) {
      const ladder = ladderWith({ bits });
      const { ohms, decidedBy } = smallestR(ladder, { pinAmps: 0.04, shorted: true });
      expect(decidedBy).toBe('pin-current');
      expect(ohms).toBeCloseTo(62.5, 9);
      const { worstPinAmps, worstPin } = currentsOf({ ...ladder, R: 62.5 }, { shorted: true });
      expect(worstPinAmps).toBeCloseTo(0.04, 12);
      expect(worstPin.bit).toBe(bits - 1);
    }
  });

  it('a ladder of 1 kΩ loses nearly all of its voltage in a loudspeaker of 8 Ω', () => {
    const open = voltsOf(ladderWith({ R: 1000 }));
    const loaded = voltsOf(ladderWith({ R: 1000, load: 8 }));
    expect(loaded[255] / open[255]).toBeCloseTo(8 / 1008, 9);
  });

  it('the top bit alone makes a square wave of half the span', () => {
    const volts = voltsOf(ladderWith());
    const { codes } = buildTable(waveOf({ table: { length: 64, sampleAt: 'centre' } }));
    const square = Array.from(codes, (code) => volts[code & 128]);
    expect(new Set(square)).toEqual(new Set([0, volts[128]]));
    expect(volts[128]).toBeCloseTo(2.5, 12);
    expect(square.indexOf(0)).toBe(32);
  });

  it('a plain loop over a port at 16 MHz changes the level about every 300 ns', async () => {
    const text = [
      '#include <avr/io.h>',
      'static volatile uint8_t levels[4] = {1, 2, 3, 4};',
      'int main(void)',
      '{',
      '    uint8_t level = levels[0];',
      '    DDRB = 0xff;',
      '    for (;;) PORTB = level++;',
      '}',
      '',
    ].join('\n');
    const program = await avrProgram([{ name: 'loop.c', text }], 'attiny4313');
    const writes = portWrites(program, await avrPart('attiny4313', ['B']), 20).filter(
      ({ register }) => register === 'PORTB',
    );
    const gaps = writes.slice(1).map(({ cycle }, k) => (cycle - writes[k].cycle) / 16e6);
    expect(new Set(gaps).size).toBe(1);
    expect(gaps[0]).toBeGreaterThan(200e-9);
    expect(gaps[0]).toBeLessThan(400e-9);
  });
});
