/** Writes a number with so many significant digits, a true minus and no needless zeros: `0.0312`, `−1.25`, `16,384`. */
export function significant(value: number, digits = 3): string {
  const shown = formatOf(digits).format(value);
  return (shown === '-0' ? '0' : shown).replace('-', '−');
}

const formats = new Map<number, Intl.NumberFormat>();

/** Kept, because making one takes longer than using it a hundred times. */
function formatOf(digits: number): Intl.NumberFormat {
  const known = formats.get(digits) ?? new Intl.NumberFormat('en', { maximumSignificantDigits: digits });
  formats.set(digits, known);
  return known;
}

/** Writes a number to so many places: decibels to 0.1, ratios to 0.01. */
export function fixed(value: number, places: number): string {
  const shown = value.toFixed(places);
  return (Number(shown) === 0 ? shown.replace('-', '') : shown).replace('-', '−');
}
