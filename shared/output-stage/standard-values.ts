export const resistorSeries = ['E12', 'E24', 'E48', 'E96'] as const;
export type ResistorSeries = (typeof resistorSeries)[number];

// IEC 60063: E24 and its part E12 are lists of their own, some values off the rounded geometric series.
const e24 = [10, 11, 12, 13, 15, 16, 18, 20, 22, 24, 27, 30, 33, 36, 39, 43, 47, 51, 56, 62, 68, 75, 82, 91];

/** Values of one decade as whole numbers: two digits in E12 and E24, three in E48 and E96 (IEC 60063). */
export function decadeOf(series: ResistorSeries): readonly number[] {
  if (series === 'E24') return e24;
  if (series === 'E12') return e24.filter((_, index) => index % 2 === 0);
  const count = series === 'E48' ? 48 : 96;
  return Array.from({ length: count }, (_, index) => Math.round(100 * 10 ** (index / count)));
}

/** Standard values from `least` to `most`, in Ω, in rising order. */
export function standardValues(series: ResistorSeries, least: number, most: number): number[] {
  const decade = decadeOf(series);
  const digits = decade[0] === 10 ? 1 : 2;
  const values: number[] = [];
  for (let power = Math.floor(Math.log10(least)) - 1; power <= Math.ceil(Math.log10(most)); power += 1) {
    // Read as decimal text, so that 4.7 is the double nearest to 4.7.
    for (const value of decade) values.push(Number(`${value}e${power - digits}`));
  }
  return values.filter((value) => value >= least && value <= most);
}

export interface LadderValues {
  /** Two values; 2R from two R in series; R from two 2R in parallel. */
  readonly from: 'pair' | 'series' | 'parallel';
  /** Values to buy, in Ω: R and 2R of a pair, else one. */
  readonly values: readonly number[];
  /** What they make, in Ω. */
  readonly R: number;
  readonly twoR: number;
  /** `2R/(2·R) − 1`: 0 where the ratio is exact. */
  readonly ratioError: number;
}

/**
 * Ways to make R and 2R from standard values, R within a factor √10 of the wanted one.
 *
 * @param mostRatioError pairs whose ratio is further off are left out
 * @returns exact ratios first, then by error, then by distance from the wanted R
 */
export function ladderValues(
  series: ResistorSeries,
  wantedOhms: number,
  mostRatioError = 0.01,
): LadderValues[] {
  const near = standardValues(series, wantedOhms / Math.sqrt(10), wantedOhms * Math.sqrt(10));
  const all = standardValues(series, wantedOhms / 4, wantedOhms * 8);
  const ways: LadderValues[] = [];
  for (const value of near) {
    ways.push({ from: 'series', values: [value], R: value, twoR: 2 * value, ratioError: 0 });
    for (const other of all) {
      const ratioError = other / (2 * value) - 1;
      if (Math.abs(ratioError) <= mostRatioError)
        ways.push({ from: 'pair', values: [value, other], R: value, twoR: other, ratioError });
    }
  }
  for (const value of standardValues(series, 2 * near[0], 2 * near[near.length - 1]))
    ways.push({ from: 'parallel', values: [value], R: value / 2, twoR: value, ratioError: 0 });
  const distance = ({ R }: LadderValues) => Math.abs(Math.log(R / wantedOhms));
  return ways.sort((a, b) => Math.abs(a.ratioError) - Math.abs(b.ratioError) || distance(a) - distance(b));
}

/** Resistors to solder for a ladder of b bits: b + 1 of 2R, b − 1 of R, two parts for each that is made of two. */
export function partsOf({ from }: Pick<LadderValues, 'from'>, bits: number): number {
  if (from === 'pair') return 2 * bits;
  return from === 'series' ? 3 * bits + 1 : 3 * bits - 1;
}
