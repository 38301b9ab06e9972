import type { Problem } from '../../shared/contract/index.ts';
import type { RateStanding } from './rate-standing.ts';

export interface ProblemParts {
  /** What ends the problem's `type` for good: `validation`, `precondition-failed` … (RFC 9457 §3.1.1). */
  readonly kind: string;
  /** 0 where no answer came. */
  readonly status: number;
  readonly message: string;
  readonly problems?: readonly Problem[];
  /** What is there now, where a race was lost (412). */
  readonly current?: unknown;
  readonly rates?: readonly RateStanding[];
  readonly cause?: unknown;
}

/** Anything that kept a request from being done, in words for the screen. */
export class ProblemError extends Error {
  override readonly name = 'ProblemError';
  readonly kind: string;
  readonly status: number;
  /** The fields at fault. */
  readonly problems: readonly Problem[];
  readonly current: unknown;
  /** Where the sender stands with limits on the rate of requests. */
  readonly rates: readonly RateStanding[];

  constructor({ kind, status, message, problems = [], current, rates = [], cause }: ProblemParts) {
    super(message, { cause });
    this.kind = kind;
    this.status = status;
    this.problems = problems;
    this.current = current;
    this.rates = rates;
  }

  /** Whether the same request may succeed later: nothing is wrong with what was sent. */
  get isPassing(): boolean {
    return this.status === 0 || this.status === 429 || this.status >= 500;
  }

  /** What is wrong at a path of what was sent. */
  at(path: string): Problem | undefined {
    return this.problems.find((problem) => problem.path === path);
  }
}

/** Any error as one with words to show. */
export const asProblem = (error: unknown): ProblemError =>
  error instanceof ProblemError
    ? error
    : new ProblemError({
        kind: 'unforeseen',
        status: 0,
        message: `Something went wrong in this page: ${error instanceof Error ? error.message : String(error)}`,
        cause: error,
      });
