import { describe, expect, it } from 'vitest';
import {
  currentsOf,
  linearityOf,
  scaledLadder,
  smallestR,
  voltsOf,
} from '../../shared/output-stage/index.ts';
import { ladderWith } from './support/ladders.ts';

describe('the smallest R', () => {
  const ladder = ladderWith({ bits: 8, R: 1000, rHigh: 30, rLow: 25, load: 5000 });

  it.each([
    ['pin-current', { pinAmps: 0.0005 }],
    ['total-current', { pinAmps: 0.02, totalAmps: 0.0005 }],
    ['dnl', { pinAmps: 0.02, totalAmps: 0.1 }],
  ] as const)('keeps its limits and no smaller one does: %s', (decidedBy, limits) => {
    for (const shorted of [false, true]) {
      const found = smallestR(ladder, { ...limits, shorted });
      expect(found.decidedBy).toBe(decidedBy);
      const keeps = (ohms: number) => {
        const scaled = scaledLadder(ladder, ohms);
        const currents = currentsOf(scaled, { shorted });
        const total = Math.max(currents.worstSupplyAmps, currents.worstSinkAmps);
        return (
          currents.worstPinAmps <= limits.pinAmps * (1 + 1e-9) &&
          ('totalAmps' in limits ? total <= limits.totalAmps * (1 + 1e-9) : true) &&
          linearityOf(voltsOf(scaled)).maxDnl <= 0.5 * (1 + 1e-9)
        );
      };
      expect(keeps(found.ohms as number)).toBe(true);
      expect(keeps((found.ohms as number) * 0.999)).toBe(false);
      expect(found.ohms).toBe(Math.max(found.pinOhms, found.totalOhms, found.dnlOhms as number));
    }
  });

  it('shows each reason alone', () => {
    const all = smallestR(ladder, { pinAmps: 0.0005, totalAmps: 0.0005 });
    expect(all.pinOhms).toBe(smallestR(ladder, { pinAmps: 0.0005 }).pinOhms);
    expect(all.totalOhms).toBe(smallestR(ladder, { totalAmps: 0.0005 }).totalOhms);
  });

  it('is no question where nothing limits it', () => {
    expect(smallestR(ladderWith(), {})).toEqual({
      ohms: 0,
      decidedBy: 'none',
      pinOhms: 0,
      totalOhms: 0,
      dnlOhms: 0,
    });
  });

  it('does not exist where the resistors themselves are too unlike', () => {
    const rungs = [2000, 2000, 2000, 2000, 2000, 2000, 2000, 2100];
    expect(smallestR(ladderWith({ R: 1000, rungs }), { pinAmps: 0.02 })).toMatchObject({
      ohms: null,
      decidedBy: 'dnl',
      dnlOhms: null,
    });
  });
});
