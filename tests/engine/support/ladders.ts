import fc from 'fast-check';
import { parseLadder, type Ladder, type LadderInput } from '../../../shared/contract/index.ts';

export const ladderWith = (fields: Partial<LadderInput> = {}): Ladder =>
  parseLadder({ bits: 8, R: 10_000, ...fields });

const ohmsNear = (nominal: number) =>
  fc.double({ min: 0.7 * nominal, max: 1.4 * nominal, noNaN: true, noDefaultInfinity: true });

/** Ladders with resistors of their own, unlike pins, and a load or none. */
export const anyLadder = (mostBits = 6): fc.Arbitrary<Ladder> =>
  fc
    .record({ bits: fc.integer({ min: 1, max: mostBits }), R: fc.constantFrom(100, 1000, 47_000) })
    .chain(({ bits, R }) =>
      fc.record({
        bits: fc.constant(bits),
        R: fc.constant(R),
        rungs: fc.array(ohmsNear(2 * R), { minLength: bits, maxLength: bits }),
        series: fc.array(ohmsNear(R), { minLength: bits - 1, maxLength: bits - 1 }),
        terminator: ohmsNear(2 * R),
        rHigh: fc.double({ min: 0, max: R / 10, noNaN: true }),
        rLow: fc.double({ min: 0, max: R / 10, noNaN: true }),
        vHigh: fc.constantFrom(1.8, 3.3, 5),
        vLow: fc.constantFrom(0, -3.3),
        load: fc.option(fc.constantFrom(8, 1000, 1e6), { nil: undefined }),
      }),
    )
    .map((input) => parseLadder(input));

/** All voltages and currents of one code: the whole nodal matrix, by elimination with pivots. */
export function solveWhole(ladder: Ladder, code: number, shorted = false) {
  const { bits, R, vHigh, vLow, rHigh, rLow, load } = ladder;
  const rungs = ladder.rungs ?? Array.from({ length: bits }, () => 2 * R);
  const series = ladder.series ?? Array.from({ length: bits - 1 }, () => R);
  const matrix = Array.from({ length: bits }, () => new Array<number>(bits + 1).fill(0));
  const toSource = (node: number, volts: number, ohms: number) => {
    matrix[node][node] += 1 / ohms;
    matrix[node][bits] += volts / ohms;
  };
  const pin = (bit: number) =>
    (code >> bit) & 1 ? { volts: vHigh, ohms: rungs[bit] + rHigh } : { volts: vLow, ohms: rungs[bit] + rLow };
  toSource(0, vLow, ladder.terminator ?? 2 * R);
  for (let bit = 0; bit < bits; bit += 1) {
    toSource(bit, pin(bit).volts, pin(bit).ohms);
    if (bit === bits - 1) continue;
    for (const [a, b] of [
      [bit, bit + 1],
      [bit + 1, bit],
    ]) {
      matrix[a][a] += 1 / series[bit];
      matrix[a][b] -= 1 / series[bit];
    }
  }
  if (load !== undefined) toSource(bits - 1, vLow, load);
  if (shorted) matrix[bits - 1] = [...new Array<number>(bits - 1).fill(0), 1, vLow];

  const nodes = eliminate(matrix);
  const pins = nodes.map((node, bit) => (pin(bit).volts - node) / pin(bit).ohms);
  return { output: nodes[bits - 1], pins };
}

function eliminate(matrix: number[][]): number[] {
  const size = matrix.length;
  for (let column = 0; column < size; column += 1) {
    let pivot = column;
    for (let row = column; row < size; row += 1)
      if (Math.abs(matrix[row][column]) > Math.abs(matrix[pivot][column])) pivot = row;
    [matrix[column], matrix[pivot]] = [matrix[pivot], matrix[column]];
    for (let row = 0; row < size; row += 1) {
      if (row === column) continue;
      const factor = matrix[row][column] / matrix[column][column];
      for (let k = column; k <= size; k += 1) matrix[row][k] -= factor * matrix[column][k];
    }
  }
  return matrix.map((row, i) => row[size] / row[i]);
}
