import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import {
  parseDefinition,
  parseResistorBag,
  parseTrialSettings,
  Refusal,
  type ResistorBag,
} from '../../shared/contract/index.ts';
import {
  assignResistors,
  drawsOf,
  fitLevels,
  levelsFromWeights,
  linearityOf,
  voltsOf,
} from '../../shared/output-stage/index.ts';
import { ladderWith } from './support/ladders.ts';
import { waveOf } from './support/waves.ts';

/** Ladders drawn with a wide tolerance, their resistors named. */
function realLadders(bits: number, count: number, tolerancePercent = 10) {
  const draws = drawsOf(ladderWith({ bits }), parseTrialSettings({ tolerancePercent, seed: 11 }));
  return Array.from({ length: count }, () => {
    const { rungs, series, terminator } = draws.next();
    return ladderWith({ bits, rungs: Array.from(rungs), series: Array.from(series), terminator });
  });
}

describe('a fit to a real converter', () => {
  it('puts the levels into the definition and chooses codes for them', () => {
    const definition = parseDefinition(waveOf({ table: { bits: 8, length: 200 } }));
    for (const ladder of realLadders(8, 10)) {
      const volts = voltsOf(ladder);
      const { definition: fitted, changed, before, after } = fitLevels(definition, volts);
      expect(changed).toEqual([]);
      expect(fitted.table.levels).toHaveLength(256);
      fitted.table.levels?.forEach((level, code) => expect(Math.abs(level - volts[code])).toBeLessThan(1e-8));
      expect(after).toEqual(buildTable(fitted).report);
      // Nearest levels of all codes have no larger error at any sample than the codes of an ideal converter.
      expect(after.rmsErrorLsb).toBeLessThan(before.rmsErrorLsb);
      expect(after.sinadDb as number).toBeGreaterThan((before.sinadDb as number) + 3);
    }
  });

  it('changes nothing where the converter is ideal', () => {
    const definition = parseDefinition(waveOf({ table: { bits: 6, length: 100 } }));
    const { before, after } = fitLevels(definition, voltsOf(ladderWith({ bits: 6 })));
    expect(after.sinadDb).toBeCloseTo(before.sinadDb as number, 6);
    expect(before.sinadDb).toBeCloseTo(buildTable(definition).report.sinadDb as number, 6);
  });

  it('says what it set aside', () => {
    const definition = parseDefinition(
      waveOf({
        table: { bits: 4, dither: 'triangular', rounding: 'half-even', scale: 'mid-tread', shaping: 1 },
      }),
    );
    const { definition: fitted, changed } = fitLevels(definition, voltsOf(ladderWith({ bits: 4 })));
    expect(changed).toEqual([
      { path: 'table.dither', from: 'triangular', to: 'none' },
      { path: 'table.shaping', from: 1, to: 0 },
      { path: 'table.scale', from: 'mid-tread', to: 'full-span' },
      { path: 'table.rounding', from: 'half-even', to: 'half-up' },
    ]);
    expect(fitted.table.dither).toBe('none');
  });

  it('refuses levels of the wrong number by their place', () => {
    const definition = parseDefinition(waveOf({ table: { bits: 4 } }));
    expect(() => fitLevels(definition, [0, 1, 2])).toThrow(Refusal);
    expect(() => fitLevels(definition, [0, 1, 2])).toThrow(/^table\.levels: a list of 3 is not allowed/);
  });

  it('takes bit weights as well as levels', () => {
    const [ladder] = realLadders(7, 1);
    const volts = voltsOf(ladder);
    const weights = Array.from({ length: 7 }, (_, bit) => volts[2 ** bit] - volts[0]);
    levelsFromWeights(weights, volts[0]).forEach((level, code) => expect(level).toBeCloseTo(volts[code], 12));
  });
});

describe('a bag of measured resistors', () => {
  const bagOf = (bits: number, singles: number, doubles: number, seed: number): ResistorBag => {
    const draws = drawsOf(ladderWith({ bits: 16 }), parseTrialSettings({ tolerancePercent: 5, seed }));
    const { rungs, series } = draws.next();
    return parseResistorBag({
      bits,
      singles: Array.from(series.subarray(0, singles)),
      doubles: Array.from(rungs.subarray(0, doubles)),
    });
  };
  const dnlOf = (
    bits: number,
    {
      rungs,
      series,
      terminator,
    }: Pick<ReturnType<typeof assignResistors>, 'rungs' | 'series' | 'terminator'>,
    pinOhms = 0,
  ) =>
    linearityOf(
      voltsOf(
        ladderWith({
          bits,
          rungs: [...rungs],
          series: [...series],
          terminator,
          rHigh: pinOhms,
          rLow: pinOhms,
        }),
      ),
    ).maxDnl;

  /** Every order of a list. */
  const orders = (list: readonly number[]): number[][] =>
    list.length === 0
      ? [[]]
      : list.flatMap((first, i) =>
          orders([...list.slice(0, i), ...list.slice(i + 1)]).map((rest) => [first, ...rest]),
        );

  it('of 4 bits is placed as well as any order of its resistors', () => {
    for (const seed of [1, 2, 3]) {
      const bag = bagOf(4, 3, 5, seed);
      let best = Infinity;
      for (const series of orders(bag.singles))
        for (const [terminator, ...rungs] of orders(bag.doubles))
          best = Math.min(best, dnlOf(4, { rungs, series, terminator }));
      const found = assignResistors(bag);
      expect(found).toMatchObject({ method: 'exhaustive', tried: 6 * 120 });
      expect(found.maxDnl).toBeCloseTo(best, 10);
      expect(dnlOf(4, found)).toBeCloseTo(found.maxDnl, 10);
    }
  });

  it.each([
    [
      { bits: 4, singles: [1, 1], doubles: [2, 2, 2, 2, 2] },
      /^singles: a list of 2 is not allowed; allowed: at least 3/,
    ],
    [
      { bits: 4, singles: [1, 1, 1], doubles: [2, 2, 2, 2] },
      /^doubles: a list of 4 is not allowed; allowed: at least 5/,
    ],
    [{ bits: 2, singles: [0], doubles: [2, 2, 2] }, /^singles\[0\]: 0 is not allowed/],
  ])('with too little in it, or nothing of a resistor, is refused: %j', (input, line) => {
    expect(() => parseResistorBag(input)).toThrow(line);
  });

  it('uses each resistor once, and those to spare where they serve better', () => {
    const bag = bagOf(4, 5, 7, 5);
    const found = assignResistors(bag);
    const used = [...found.rungs, found.terminator];
    expect(new Set(used).size).toBe(5);
    expect(used.every((ohms) => bag.doubles.includes(ohms))).toBe(true);
    expect(new Set(found.series).size).toBe(3);
    expect(found.series.every((ohms) => bag.singles.includes(ohms))).toBe(true);
    const exact = assignResistors({
      ...bag,
      singles: bag.singles.slice(0, 3),
      doubles: bag.doubles.slice(0, 5),
    });
    expect(found.maxDnl).toBeLessThanOrEqual(exact.maxDnl);
  });

  it('counts pins in', () => {
    const found = assignResistors({ ...bagOf(4, 3, 5, 6), pinOhms: 200 });
    expect(dnlOf(4, found, 200)).toBeCloseTo(found.maxDnl, 10);
  });

  it('of many resistors is placed by a search that finds what every order of 5 bits finds', () => {
    let asGood = 0;
    for (let seed = 1; seed <= 8; seed += 1) {
      const bag = bagOf(5, 4, 6, seed);
      const best = assignResistors(bag);
      expect(best.method).toBe('exhaustive');
      const found = assignResistors(bag, { seed, mostTried: 0 });
      expect(found.method).toBe('search');
      expect(dnlOf(5, found)).toBeCloseTo(found.maxDnl, 10);
      if (found.maxDnl <= best.maxDnl * (1 + 1e-9)) asGood += 1;
    }
    expect(asGood).toBe(8);
  });

  it('of 8 bits comes out far better than as it fell', () => {
    const bag = bagOf(8, 12, 16, 2);
    const found = assignResistors(bag);
    expect(found.method).toBe('search');
    const asItFell = dnlOf(8, {
      rungs: bag.doubles.slice(0, 8),
      series: bag.singles.slice(0, 7),
      terminator: bag.doubles[8],
    });
    expect(found.maxDnl).toBeLessThan(asItFell / 4);
    expect(assignResistors(bag)).toEqual(found);
  });
});
