export interface Counts {
  readonly passed: number;
  readonly failed: number;
  /** Skipped, todo or never reached. */
  readonly unrun: number;
}

/** Counts of Vitest's JSON report, given the runner's exit status. */
export function vitestCounts(file: string, status: number): Counts;

/** Counts of Playwright's JSON report, given the runner's exit status. */
export function playwrightCounts(file: string, status: number): Counts;
