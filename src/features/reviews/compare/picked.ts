/** A revision chosen to be compared. */
export interface Picked {
  readonly table: string;
  readonly number: number;
}

/** Reads a revision from an address, as `fog-signal:3`; null where it is none. */
export function readPicked(text: string | null): Picked | null {
  const found = /^([a-z0-9-]{1,60}):([1-9]\d{0,5})$/.exec(text ?? '');
  return found === null ? null : { table: found[1], number: Number(found[2]) };
}
