/** Where a sender stands with a limit on the rate of requests. */
export interface RateStanding {
  readonly policy: string;
  readonly remaining: number;
  readonly resetSeconds: number;
}

/** Reads `RateLimit` headers (draft-ietf-httpapi-ratelimit-headers); what is not in their form is left out. */
export const readRates = (header: string | null): RateStanding[] =>
  [...(header ?? '').matchAll(/"([\w-]+)";r=(\d+);t=(\d+)/g)].map(([, policy, remaining, seconds]) => ({
    policy,
    remaining: Number(remaining),
    resetSeconds: Number(seconds),
  }));

/** Says a time span as people do: `40 seconds`, `12 minutes`, `3 hours`. */
export function saySeconds(seconds: number): string {
  const [count, unit] =
    seconds < 120
      ? [seconds, 'second']
      : seconds < 7200
        ? [seconds / 60, 'minute']
        : [seconds / 3600, 'hour'];
  const whole = Math.max(1, Math.ceil(count));
  return `${whole} ${unit}${whole === 1 ? '' : 's'}`;
}

/** Tries left from which on they are told. */
const fewTries = 5;

/** Tells how many more tries are allowed, once they are few; the tightest limit counts. */
export function sayTriesLeft(rates: readonly RateStanding[]): string | undefined {
  const [tightest] = [...rates].sort((a, b) => a.remaining - b.remaining);
  if (tightest === undefined || tightest.remaining === 0 || tightest.remaining > fewTries) return undefined;
  const { remaining, resetSeconds } = tightest;
  const tries = remaining === 1 ? 'One more try is' : `${remaining} more tries are`;
  return `${tries} allowed in the next ${saySeconds(resetSeconds)}.`;
}
