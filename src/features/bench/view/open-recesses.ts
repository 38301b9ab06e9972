/** Parts of the flights that open in place, by their names in the URL. */
export const recessIds = [
  'noise',
  'sampling',
  'storage',
  'levels',
  'text',
  'device',
  'bits',
  'blind',
  'keys',
  'pattern',
  'keep-sound',
  'rates',
  'accumulator',
  'two-tones',
  'pulses',
  'fades',
  'stage',
  'trials',
  'advice',
  'fit',
] as const;
export type RecessId = (typeof recessIds)[number];

/** Reads which recesses are open from the URL's `more`: names parted by commas; unknown ones are passed over. */
export function readOpenRecesses(text: string | null): readonly RecessId[] {
  const named = text?.split(',') ?? [];
  return recessIds.filter((id) => named.includes(id));
}

/** Writes them; `null`, no parameter at all, where all are closed. */
export function writeOpenRecesses(open: readonly RecessId[]): string | null {
  return recessIds.filter((id) => open.includes(id)).join(',') || null;
}
