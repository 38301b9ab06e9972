import { execFileSync } from 'node:child_process';

const fallback = 0x5eed;

/**
 * Seed of this commit's random definitions: each commit tries others, all machines try the same. Given by
 * `DEFINITIONS_SEED` to try one again.
 */
export function commitSeed(): number {
  const given = process.env.DEFINITIONS_SEED;
  if (given !== undefined) return Number(given);
  try {
    const hash = execFileSync('git', ['rev-parse', 'HEAD'], {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
    });
    return Number.parseInt(hash.slice(0, 7), 16);
  } catch {
    return fallback;
  }
}
