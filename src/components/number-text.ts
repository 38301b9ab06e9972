/** Characters of a number that the narrowest field has room for. */
const room = 9;

/**
 * A number's text with its exponent in sight where a narrow field would cut it off: `3.8981718325193755e-17` becomes
 * `3.89…e-17`. For looking at only: it does not read back. Any other text stays as it is, as what is cut off there are
 * its least digits.
 */
export function withExponentInSight(text: string): string {
  const [, mantissa, exponent] = /^(-?\d\.\d+)(e[+-]\d+)$/.exec(text) ?? [];
  if (mantissa === undefined || text.length <= room) return text;
  const least = mantissa.startsWith('-') ? 4 : 3;
  return `${mantissa.slice(0, Math.max(least, room - exponent.length - 1))}…${exponent}`;
}
