import fc from 'fast-check';

/** One seed for all laws, so that a failure comes back on every machine; `LAW_SEED` tries another. */
const seed = Number(process.env.LAW_SEED ?? 20_261_201);

/** Holds a property for `runs` seeded examples; what fails is shrunk and printed with its seed. */
export function holds<Values>(property: fc.IProperty<Values>, runs = 100): void {
  fc.assert(property, { seed, numRuns: runs });
}

/** Seeded examples themselves, where a test wants a list. */
export function examplesOf<Value>(arbitrary: fc.Arbitrary<Value>, count: number, ownSeed = seed): Value[] {
  return fc.sample(arbitrary, { seed: ownSeed, numRuns: count });
}

/** A list of `count` numbers from −1 to 1 by a linear congruential generator: long signals, cheaply. */
export function noise(count: number, start = 1): Float64Array {
  let state = start >>> 0;
  return Float64Array.from({ length: count }, () => {
    // Constants of Numerical Recipes' quick generator (Press et al., 3rd ed., §7.1).
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return state / 2 ** 31 - 1;
  });
}
