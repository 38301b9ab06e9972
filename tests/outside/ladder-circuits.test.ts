import { beforeAll, describe, expect, it } from 'vitest';
import { parseTrialSettings, type Ladder } from '../../shared/contract/index.ts';
import { drawsOf, pinAmpsOf, voltsOf } from '../../shared/output-stage/index.ts';
import { ladderWith } from '../engine/support/ladders.ts';
import { simulate, vectorOf, type SpiceVectors } from './support/spice.ts';

// Source: ngspice 39 (Debian), a circuit simulator: the same resistors, written as a circuit, node by node.

const withTolerance = (ladder: Ladder): Ladder => {
  const draws = drawsOf(ladder, parseTrialSettings({ tolerancePercent: 10, seed: 42 }));
  const { rungs, series, terminator } = draws.next();
  return { ...ladder, rungs: Array.from(rungs), series: Array.from(series), terminator };
};

const cases = [4, 8].flatMap((bits) =>
  Object.entries({
    ideal: ladderWith({ bits }),
    'with tolerances': withTolerance(ladderWith({ bits })),
    'with unlike pins': ladderWith({ bits, R: 1000, rHigh: 35, rLow: 22 }),
    'with a load': ladderWith({ bits, R: 1000, load: 150 }),
    'with all of these, from −2 V': withTolerance(
      ladderWith({ bits, R: 1000, rHigh: 35, rLow: 22, load: 600, vHigh: 3, vLow: -2 }),
    ),
  }).map(([name, ladder]) => ({ name: `${bits} bits, ${name}`, ladder })),
);

/** One copy of a ladder for one code; its nodes are named by a prefix. */
function circuitOf(ladder: Ladder, code: number, prefix: string): string[] {
  const { bits, R, rHigh, rLow, load } = ladder;
  const rail = (name: string) => `${prefix.split('_')[0]}_${name}`;
  const node = (bit: number) => `${prefix}_n${bit}`;
  const lines = [`R${prefix}_t ${node(0)} ${rail('low')} ${ladder.terminator ?? 2 * R}`];
  for (let bit = 0; bit < bits; bit += 1) {
    const isHigh = (code >> bit) & 1;
    const ohms = (ladder.rungs?.[bit] ?? 2 * R) + (isHigh ? rHigh : rLow);
    lines.push(`R${prefix}_r${bit} ${rail(isHigh ? 'high' : 'low')} ${node(bit)} ${ohms}`);
    if (bit > 0)
      lines.push(`R${prefix}_s${bit} ${node(bit - 1)} ${node(bit)} ${ladder.series?.[bit - 1] ?? R}`);
  }
  if (load !== undefined) lines.push(`R${prefix}_l ${node(bits - 1)} ${rail('low')} ${load}`);
  return lines;
}

describe('every code of a ladder is what ngspice solves, within 1 µV', () => {
  let answer: SpiceVectors;
  beforeAll(async () => {
    // All codes of all ladders as copies in one circuit: one start of the program for all of them.
    const elements = cases.flatMap(({ ladder }, index) => [
      `Vc${index}_h c${index}_high 0 ${ladder.vHigh}`,
      `Vc${index}_l c${index}_low 0 ${ladder.vLow}`,
      ...Array.from({ length: 2 ** ladder.bits }, (_, code) =>
        circuitOf(ladder, code, `c${index}_${code}`),
      ).flat(),
    ]);
    answer = await simulate(elements, 'op', []);
  });

  it.each(cases.map((each, index) => [each.name, each.ladder, index] as const))(
    '%s',
    (_name, ladder, index) => {
      const volts = voltsOf(ladder);
      let farthest = 0;
      volts.forEach((own, code) => {
        const theirs = vectorOf(answer, `v(c${index}_${code}_n${ladder.bits - 1})`)[0];
        farthest = Math.max(farthest, Math.abs(own - theirs));
      });
      expect(farthest).toBeLessThan(1e-6);
    },
  );

  it.each(cases.map((each, index) => [each.name, each.ladder, index] as const))(
    'pin currents of %s, within 1 part in 10⁶',
    (_name, ladder, index) => {
      const { bits, R, rHigh, rLow, vHigh, vLow } = ladder;
      for (let code = 0; code < 2 ** bits; code += 1) {
        pinAmpsOf(ladder, code).forEach((amps, bit) => {
          const [level, series] = (code >> bit) & 1 ? [vHigh, rHigh] : [vLow, rLow];
          const node = vectorOf(answer, `v(c${index}_${code}_n${bit})`)[0];
          const theirs = (level - node) / ((ladder.rungs?.[bit] ?? 2 * R) + series);
          if (!(Math.abs(amps - theirs) < (1e-6 * (vHigh - vLow)) / R)) {
            throw new Error(`code ${code}, bit ${bit}: ${amps} A, ngspice ${theirs} A`);
          }
        });
      }
    },
  );
});
