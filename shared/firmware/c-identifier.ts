import { takenBy } from './c-words.ts';

/** Significant characters of an internal identifier or a macro name (C17 §5.2.4.1). */
const significantCharacters = 63;

/** The longest ending that templates put behind an array's name; what comes of it stays significant to its end. */
const longestEnding = '_STEP_FOR_MILLIHZ'.length;

export const arrayNameLength = { min: 1, max: significantCharacters - longestEnding } as const;

/**
 * Why a name cannot be an array's in every target's language: what is allowed, in words; `undefined` where it can.
 *
 * Allowed is an ASCII letter, then letters, digits and single underscores, not ending in one. A leading underscore is
 * reserved at file scope in C, two in a row anywhere in C++, and a trailing one would make two in `NAME__LENGTH`.
 */
export function arrayNameFault(name: string): string | undefined {
  if (!/^[A-Za-z](?:_?[A-Za-z0-9])*$/.test(name)) {
    return 'an ASCII letter, then letters, digits and single underscores, not ending in an underscore';
  }
  if (name.length > arrayNameLength.max) {
    return `at most ${arrayNameLength.max} characters, so that names made from it keep to C's ${significantCharacters}`;
  }
  return takenBy(name);
}

/**
 * An array's name made from a definition's: accents dropped, every run of other characters than ASCII letters and
 * digits one underscore, in lower case, cut to length; `table_` before a leading digit, `_table` behind a name that
 * is taken, `wave_table` where nothing is left.
 *
 * @param prefix put before all that as it is; see `arrayPrefixOption`
 */
export function arrayNameFrom(name: string, prefix = ''): string {
  const plain = name.normalize('NFKD').replace(/\p{M}+/gu, '');
  const words = plain
    .replace(/[^A-Za-z0-9]+/g, '_')
    .replace(/^_|_$/g, '')
    .toLowerCase();
  const led = prefix === '' && /^\d/.test(words) ? `table_${words}` : words;
  const whole = `${prefix}${led || 'wave_table'}`;
  const cut = whole.slice(0, arrayNameLength.max - '_table'.length).replace(/_$/, '');
  return arrayNameFault(cut) === undefined ? cut : `${cut}_table`;
}
