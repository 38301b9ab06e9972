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
