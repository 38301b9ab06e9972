import type { FlightId } from '../problems/field-names.ts';

export const flightIds = ['shape', 'quantise', 'output', 'export'] as const satisfies readonly FlightId[];

const atFirst: readonly FlightId[] = ['shape'];
const nothing = 'none';

/** Reads which flights are open from the URL's `open`: names parted by commas; unknown ones are passed over. */
export function readOpenFlights(text: string | null): readonly FlightId[] {
  if (text === null) return atFirst;
  const named = text.split(',');
  return flightIds.filter((id) => named.includes(id));
}

/** Writes them; `null`, no parameter at all, stands for what is open at first. */
export function writeOpenFlights(open: readonly FlightId[]): string | null {
  const inOrder = flightIds.filter((id) => open.includes(id));
  if (inOrder.join() === atFirst.join()) return null;
  return inOrder.length === 0 ? nothing : inOrder.join(',');
}
