import { Refusal } from '../../shared/contract/index.ts';

/** Jobs that behave badly, for the pool's own tests. */
export const testJobs = {
  double: (input: number) => input * 2,
  spin: (_input: null) => {
    for (;;);
  },
  hoard: (_input: null) => {
    const kept: string[][] = [];
    for (;;) kept.push(new Array(10_000).fill('').map((_, index) => `${kept.length} ${index}`));
  },
  refuse: (input: string) => {
    throw new Refusal({ path: 'table.bits', value: input, allowed: 'less' });
  },
  fail: (input: string) => {
    throw new TypeError(input);
  },
  answerNothingCloneable: (_input: null) => () => 1,
  leave: (_input: null) => process.exit(3),
  throwLater: async (_input: null) => {
    setTimeout(() => {
      throw new Error('outside of the promise');
    });
    await new Promise(() => {});
  },
};
