/** Writes a number with so many significant digits, a true minus and no needless zeros: `0.0312`, `−1.25`, `16,384`. */
export function significant(value: number, digits = 3): string {
  const shown = value.toLocaleString('en', { maximumSignificantDigits: digits });
  return (shown === '-0' ? '0' : shown).replace('-', '−');
}

/** Writes a number to so many places: decibels to 0.1, ratios to 0.01. */
export function fixed(value: number, places: number): string {
  const shown = value.toFixed(places);
  return (Number(shown) === 0 ? shown.replace('-', '') : shown).replace('-', '−');
}
