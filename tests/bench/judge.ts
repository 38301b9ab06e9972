/** Prints a figure beside its goal and answers whether it holds. A figure of time is told, never asserted. */
export function judge(
  what: string,
  value: number,
  goal: number,
  unit = '',
  side: 'at most' | 'at least' = 'at most',
): boolean {
  const holds = side === 'at most' ? value <= goal : value >= goal;
  const digits = value < 10 ? 3 : 1;
  console.log(
    `  ${what}: ${value.toFixed(digits)}${unit} (goal: ${side} ${goal}${unit}) ${holds ? 'met' : 'MISSED'}`,
  );
  return holds;
}

/** The middle of a list, and any other share of it (nearest rank). */
export function quantile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.max(0, Math.ceil(share * sorted.length) - 1))];
}

export const median = (values: readonly number[]) => quantile(values, 0.5);
