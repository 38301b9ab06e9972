import { describe, expect, it } from 'vitest';
import { targets } from '../../shared/firmware/index.ts';
import { differencesFrom, provers, storedProofs } from './proofs/matrix.ts';

// The same proofs that `npm run proof` prints: compilers, simulators and readers that are not ours judge each target.
// Cycles are measured anew; `npm run proof -- --store` keeps what is found.

describe('proofs of targets', () => {
  it('cover every target, and no other', () => {
    const ids = targets.map(({ id }) => id).sort();
    expect(Object.keys(provers).sort()).toEqual(ids);
    for (const id of ids) expect(storedProofs[id], id).not.toEqual([]);
  });

  // Side by side, as compilers and simulators are programs of their own: one has the cores while another starts.
  it.concurrent.each(Object.keys(provers))(
    'of %s find what is stored',
    async (target) => {
      const proofs = await provers[target]();
      expect(proofs.length).toBeGreaterThanOrEqual(5);
      expect(differencesFrom(storedProofs[target], proofs)).toEqual([]);
    },
    300_000,
  );
});
