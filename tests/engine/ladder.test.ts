import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseLadder, type LadderInput } from '../../shared/contract/index.ts';
import {
  currentsOf,
  ladderReport,
  linearityOf,
  meanSupplyAmps,
  outputOhmsOf,
  pinAmpsOf,
  supplyAmpsOf,
  voltsOf,
} from '../../shared/output-stage/index.ts';
import { anyLadder, ladderWith, solveWhole } from './support/ladders.ts';
import { holds } from './support/seeded.ts';

interface GoldenLadder {
  ladder: LadderInput;
  volts: number[];
  monotonic: boolean;
  [figure: string]: unknown;
}
// The file's digest is held in golden.test.ts.
const { ladders } = JSON.parse(readFileSync(new URL('golden/golden.json', import.meta.url), 'utf8')) as {
  ladders: GoldenLadder[];
};

const isClose = (actual: number, wanted: number) =>
  Math.abs(actual - wanted) <= 1e-9 * Math.abs(wanted) + 1e-12;

describe('golden ladders', () => {
  it.each(ladders.map((golden) => [JSON.stringify(golden.ladder).slice(0, 60), golden] as const))(
    '%s',
    (_name, { ladder, volts, monotonic, ...figures }) => {
      const report = ladderReport(parseLadder(ladder));
      expect(report.volts.length).toBe(volts.length);
      volts.forEach((wanted, code) => expect(isClose(report.volts[code], wanted), `code ${code}`).toBe(true));
      expect(report.monotonic).toBe(monotonic);
      expect(Object.keys(figures)).toHaveLength(5);
      for (const [figure, wanted] of Object.entries(figures)) {
        const actual = report[figure as 'maxInl'];
        expect(isClose(actual, wanted as number), `${figure}: ${actual}, wanted ${wanted}`).toBe(true);
      }
    },
  );
});

describe('an ideal ladder', () => {
  it('has Vlow + (Vhigh − Vlow)·code/2^b at every code, and R behind it', () => {
    for (let bits = 1; bits <= 16; bits += 1) {
      const ladder = ladderWith({ bits, R: 4700, vHigh: 3.3, vLow: -1.2 });
      const volts = voltsOf(ladder);
      volts.forEach((v, code) => {
        if (Math.abs(v - (-1.2 + (4.5 * code) / 2 ** bits)) > 1e-13) throw new Error(`code ${code}: ${v}`);
      });
      const { maxInl, maxDnl, monotonic } = linearityOf(volts);
      expect(Math.max(maxInl, maxDnl)).toBeLessThan(1e-9);
      expect(monotonic).toBe(true);
      const ohms = outputOhmsOf(ladder);
      expect(ohms.every((r) => isClose(r, 4700))).toBe(true);
    }
  });
});

describe('any ladder', () => {
  const withCode = anyLadder().chain((ladder) =>
    fc.tuple(fc.constant(ladder), fc.integer({ min: 0, max: 2 ** ladder.bits - 1 })),
  );

  it('has the voltage of the whole nodal matrix', () => {
    holds(
      fc.property(withCode, ([ladder, code]) =>
        isClose(voltsOf(ladder)[code] - ladder.vLow, solveWhole(ladder, code).output - ladder.vLow),
      ),
    );
  });

  it.each([false, true])('has the pin currents of the whole nodal matrix, shorted: %s', (shorted) => {
    holds(
      fc.property(withCode, ([ladder, code]) => {
        const wanted = solveWhole(ladder, code, shorted).pins;
        return pinAmpsOf(ladder, code, { shorted }).every(
          (amps, bit) => Math.abs(amps - wanted[bit]) < 1e-9 * Math.max(...wanted.map(Math.abs)) + 1e-15,
        );
      }),
    );
  });

  it('gives its largest currents as those of single codes', () => {
    holds(
      fc.property(anyLadder(), fc.boolean(), (ladder, shorted) => {
        const figures = currentsOf(ladder, { shorted });
        let [pin, supply, sink] = [0, 0, 0];
        for (let code = 0; code < 2 ** ladder.bits; code += 1) {
          const amps = solveWhole(ladder, code, shorted).pins;
          pin = Math.max(pin, ...amps.map(Math.abs));
          supply = Math.max(
            supply,
            amps.reduce((sum, own, bit) => sum + ((code >> bit) & 1 ? own : 0), 0),
          );
          sink = Math.max(
            sink,
            amps.reduce((sum, own, bit) => sum - ((code >> bit) & 1 ? 0 : own), 0),
          );
        }
        const at = (code: number) => pinAmpsOf(ladder, code, { shorted });
        return (
          isClose(figures.worstPinAmps, pin) &&
          isClose(figures.worstSupplyAmps, supply) &&
          isClose(figures.worstSinkAmps, sink) &&
          isClose(Math.abs(at(figures.worstPin.code)[figures.worstPin.bit]), pin) &&
          isClose(supplyAmpsOf(ladder, { shorted })[figures.worstSupplyCode], supply)
        );
      }),
      40,
    );
  });

  it('gives what pins put in through load and terminator: the output falls by its resistance times the load', () => {
    holds(
      fc.property(withCode, ([{ load: _, ...ladder }, code]) => {
        const open = voltsOf(ladder)[code] - ladder.vLow;
        const loaded = voltsOf({ ...ladder, load: 1000 })[code] - ladder.vLow;
        return isClose(loaded, (open * 1000) / (1000 + outputOhmsOf(ladder)[code]));
      }),
    );
  });
});

describe('linearity', () => {
  it('is 0 on a straight line and tells single steps', () => {
    expect(linearityOf([1, 2, 3, 4])).toMatchObject({ lsbVolts: 1, maxInl: 0, maxDnl: 0, monotonic: true });
    const bent = linearityOf([0, 1.5, 1, 3]);
    expect(bent.lsbVolts).toBe(1);
    expect(Array.from(bent.inl)).toEqual([0, 0.5, -1, 0]);
    expect(Array.from(bent.dnl)).toEqual([0, 0.5, -1.5, 1]);
    expect(bent).toMatchObject({ maxInl: 1, maxDnl: 1.5, monotonic: false });
  });

  it('calls a flat step not monotonic', () => {
    expect(linearityOf([0, 1, 1, 2]).monotonic).toBe(false);
  });

  it('is that of the spec after any scale and offset of the voltages', () => {
    holds(
      fc.property(anyLadder(), fc.double({ min: 0.1, max: 10, noNaN: true }), (ladder, by) => {
        const volts = voltsOf(ladder);
        const one = linearityOf(volts);
        const other = linearityOf(volts.map((v) => by * v - 7));
        return Math.abs(one.maxInl - other.maxInl) < 1e-8 && Math.abs(one.maxDnl - other.maxDnl) < 1e-8;
      }),
    );
  });
});

it('the mean supply current of a table is that of its codes', () => {
  const ladder = ladderWith({ bits: 4, rHigh: 30, rLow: 20 });
  const supply = supplyAmpsOf(ladder);
  expect(meanSupplyAmps(ladder, [3, 3, 9, 0])).toBeCloseTo((2 * supply[3] + supply[9] + supply[0]) / 4, 15);
  expect(supply[0]).toBe(0);
});
