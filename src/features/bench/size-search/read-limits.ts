import type { SizeLimits } from '../../../../shared/size-search/index.ts';

export type LimitsReading = { readonly limits: SizeLimits } | { readonly fault: string };

const allowed = 'as “SNR ≥ 45 dB, unwanted ≤ −50 dB, ≤ 512 bytes”, any of them';

/**
 * Reads limits as people write them: parts between commas, semicolons or “and”. A number of dB above 0, or after
 * “SNR”, is the least SNR; one below 0, or after “unwanted”, the most that the strongest unwanted line may have; a
 * number of bytes is the largest size. The sign between is optional, but must not say the contrary.
 */
export function readLimits(text: string): LimitsReading {
  const limits: { -readonly [Name in keyof SizeLimits]: SizeLimits[Name] } = {};
  for (const part of text.split(/[,;]|\band\b/i)) {
    if (part.trim() === '') continue;
    const read = readLimit(part.trim());
    if (read === null) return { fault: `“${part.trim()}” is not allowed. Allowed: ${allowed}.` };
    if (limits[read.name] !== undefined) return { fault: `“${part.trim()}” limits the same a second time.` };
    limits[read.name] = read.value;
  }
  return { limits };
}

const form =
  /^(snr|unwanted(?: line)?|size)?\s*(>=|≥|at least|<=|≤|at most|>|<)?\s*([+−-]?\d+(?:\.\d+)?)\s*(db|bytes?|b|kb|kib)?$/i;

function readLimit(part: string): { name: keyof SizeLimits; value: number } | null {
  const found = form.exec(part);
  if (found === null) return null;
  const [, word = '', sign = '', digits, unit = ''] = found.map((group) => group?.toLowerCase()) as string[];
  const number = Number(digits.replace('−', '-'));
  const isMost = /^(<|≤|at most)/.test(sign);
  const isLeast = /^(>|≥|at least)/.test(sign);
  const isBytes = unit.startsWith('b') || unit.startsWith('k') || word === 'size';
  if (isBytes) {
    const value = number * ({ kb: 1_000, kib: 1_024 }[unit] ?? 1);
    return isLeast || word === 'snr' || word.startsWith('unwanted') || unit === 'db' || value < 0
      ? null
      : { name: 'tableBytes', value };
  }
  if (unit !== 'db' && word === '') return null;
  const isUnwanted = word.startsWith('unwanted') || (word === '' && (number < 0 || isMost));
  if (isUnwanted) return isLeast ? null : { name: 'unwantedDb', value: number };
  return isMost ? null : { name: 'snrDb', value: number };
}

/** Says limits so that there is no doubt how they were read. */
export function sayLimits({ snrDb, unwantedDb, tableBytes }: SizeLimits): string {
  const words = [
    snrDb !== undefined && `SNR at least ${snrDb} dB`,
    unwantedDb !== undefined && `unwanted line at most ${String(unwantedDb).replace('-', '−')} dB`,
    tableBytes !== undefined && `at most ${tableBytes.toLocaleString('en')} bytes`,
  ].filter(Boolean);
  return words.length === 0 ? 'No limit: any table will do.' : `Read as ${words.join(', ')}.`;
}

/** Whether a size keeps the limits; the engine's own choice among them is `smallestThatMeets`. */
export function meets(
  cell: {
    snrDb: number | null;
    unwantedDb: number | null;
    exact: boolean;
    tableBytes: number;
    problem: unknown;
  },
  { snrDb, unwantedDb, tableBytes }: SizeLimits,
): boolean {
  if (cell.problem !== null) return false;
  const keepsSnr = snrDb === undefined || cell.exact || (cell.snrDb !== null && cell.snrDb >= snrDb);
  const keepsUnwanted =
    unwantedDb === undefined || cell.exact || (cell.unwantedDb !== null && cell.unwantedDb <= unwantedDb);
  return keepsSnr && keepsUnwanted && (tableBytes === undefined || cell.tableBytes <= tableBytes);
}
