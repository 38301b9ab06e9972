/** One of the two sounds. */
export type Side = 'a' | 'b';

/** A fair coin: each call is a new throw. Who plays the test draws it, nothing here is random. */
export type Coin = () => boolean;

/** A trial that was answered: which of the two X was, and which it was taken for. */
export interface BlindTrial {
  readonly x: Side;
  readonly said: Side;
}

/** How many trials a run may have: below five not even all of them right says anything. */
export const trialLimits = { min: 5, max: 100, usual: 16 } as const;

/**
 * A run of trials, in each of which X is A or B by the toss of a coin and is to be told. `x` is the secret of the
 * trial that is open; null once the run is over.
 */
export interface BlindRun {
  /** Chosen beforehand. */
  readonly trials: number;
  readonly answered: readonly BlindTrial[];
  readonly x: Side | null;
  readonly end: 'open' | 'complete' | 'given-up';
}

const drawn = (coin: Coin): Side => (coin() ? 'b' : 'a');

/**
 * Begins a run with its first X.
 *
 * @param trials a whole number in `trialLimits`
 * @throws {RangeError} for any other
 */
export function beginRun(trials: number, coin: Coin): BlindRun {
  const { min, max } = trialLimits;
  if (!Number.isInteger(trials) || trials < min || trials > max) {
    throw new RangeError(`trials is ${trials}; allowed: a whole number from ${min} to ${max}`);
  }
  return { trials, answered: [], x: drawn(coin), end: 'open' };
}

/** Notes what X was taken for, and draws the next X unless that was the last trial. A run that is over stays as it is. */
export function answerTrial(run: BlindRun, said: Side, coin: Coin): BlindRun {
  if (run.x === null) return run;
  const answered = [...run.answered, { x: run.x, said }];
  return answered.length === run.trials
    ? { ...run, answered, x: null, end: 'complete' }
    : { ...run, answered, x: drawn(coin) };
}

/** Ends a run before its last trial. */
export function giveUp(run: BlindRun): BlindRun {
  return run.x === null ? run : { ...run, x: null, end: 'given-up' };
}

export interface BlindScore {
  readonly right: number;
  /** Trials that were answered, m. */
  readonly of: number;
  /** Probability of at least as many right by guessing alone. */
  readonly byGuessing: number;
}

/** The score of what has been answered so far. */
export function scoreOf({ answered }: Pick<BlindRun, 'answered'>): BlindScore {
  const right = answered.filter(({ x, said }) => x === said).length;
  return { right, of: answered.length, byGuessing: guessingChance(right, answered.length) };
}

/**
 * P(K ≥ n) of a binomial distribution of m trials with chance ½ each: `Σ_{k=n}^{m} C(m, k)/2^m`. The sum is of whole
 * numbers and exact; only the quotient is rounded.
 *
 * @param right n, a whole number 0…m
 * @param of m, a whole number 0…1000
 */
export function guessingChance(right: number, of: number): number {
  let ways = 1n;
  let tail = 0n;
  // C(m, m − j) = C(m, j): from all right downwards.
  for (let j = 0; j <= of - right; j += 1) {
    tail += ways;
    ways = (ways * BigInt(of - j)) / BigInt(j + 1);
  }
  return Number(tail) / 2 ** of;
}

/** The fewest right of m trials that guessing reaches with at most a given probability; null where not even m does. */
export function rightNeeded(of: number, atMost = 0.05): number | null {
  for (let right = Math.ceil(of / 2); right <= of; right += 1) {
    if (guessingChance(right, of) <= atMost) return right;
  }
  return null;
}
