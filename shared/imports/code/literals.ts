/** A literal's number, or why it has none. */
export type Literal = { readonly value: number } | { readonly fault: string };

const digitsOf = { 2: /^[01]+$/, 8: /^[0-7]+$/, 10: /^\d+$/, 16: /^[\da-fA-F]+$/ } as const;
type Base = keyof typeof digitsOf;

const wholeNumbers = 'a whole number: decimal, 0x…, 0b… or octal 0…';

/** What a message says is allowed where a literal stands. */
export const literalsAllowed = `${wholeNumbers}, or a character`;

function inBase(digits: string, base: Base): Literal {
  if (!digitsOf[base].test(digits)) {
    return {
      fault: base === 8 ? 'a digit above 7 in an octal number' : `digits that are none of base ${base}`,
    };
  }
  const value = Number.parseInt(digits, base);
  return value > Number.MAX_SAFE_INTEGER ? { fault: 'more than 53 bits' } : { value };
}

/**
 * An integer as C17 §6.4.4.1 and C++20 [lex.icon] write it: decimal, octal, hexadecimal, binary (C23, C++14), digits
 * set apart by ' (C++14), suffixes of u, l, ll and z in either case.
 */
export function cInteger(text: string): Literal {
  const isHex = /^0[xX]/.test(text);
  if (!isHex && /[.]|[eE]|^\d+[fF]$/.test(text))
    return { fault: 'a decimal fraction; such columns come in as CSV' };
  if (isHex && /[.pP]/.test(text)) return { fault: 'a decimal fraction; such columns come in as CSV' };
  const parts = /^(0[xX]|0[bB])?([\da-fA-F']*?)([uUlLzZ]*)$/.exec(text);
  if (!parts) return { fault: 'not a number of C' };
  const [, prefix = '', grouped, suffix] = parts;
  if (!/^(?:u?(?:l|ll|z)?|(?:l|ll|z)u)$/i.test(suffix) || /lL|Ll/.test(suffix)) {
    return { fault: `a suffix that C does not have, ${suffix}` };
  }
  if (/^'|''|'$/.test(grouped)) return { fault: "a ' that does not stand between digits" };
  const digits = grouped.replaceAll("'", '');
  if (prefix !== '') return inBase(digits, isHex ? 16 : 2);
  return digits.length > 1 && digits.startsWith('0') ? inBase(digits, 8) : inBase(digits, 10);
}

const escapes: Readonly<Record<string, number>> = {
  a: 7,
  b: 8,
  f: 12,
  n: 10,
  r: 13,
  t: 9,
  v: 11,
  e: 27,
  '\\': 92,
  "'": 39,
  '"': 34,
  '?': 63,
};

/** A character constant of one ASCII character or escape (C17 §6.4.4.4): 0…255. */
export function cCharacter(text: string): Literal {
  const body = /^(?:u8)?'(.*)'$/s.exec(text)?.[1];
  if (body === undefined) return { fault: 'a wide character' };
  const numeric = /^\\(?:([0-7]{1,3})|x([\da-fA-F]+))$/.exec(body);
  if (numeric) {
    const value = numeric[1] === undefined ? Number.parseInt(numeric[2], 16) : Number.parseInt(numeric[1], 8);
    return value > 255 ? { fault: 'an escape beyond one byte' } : { value };
  }
  if (/^\\.$/s.test(body)) {
    const value = escapes[body[1]] as number | undefined;
    return value === undefined ? { fault: 'an escape that C does not have' } : { value };
  }
  if (body.length !== 1) return { fault: body === '' ? 'an empty character' : 'more than one character' };
  const value = body.charCodeAt(0);
  return value > 126 ? { fault: 'a character beyond ASCII, whose code depends on the compiler' } : { value };
}

/**
 * A number as assemblers write it: as C does, or `$FF`, `0FFh` in hexadecimal; a character `'a` or `'a'`. A leading
 * nought makes it octal, as GNU as has it.
 */
export function assemblyNumber(text: string): Literal {
  const dollar = /^\$([\da-fA-F]+)$/.exec(text);
  if (dollar) return inBase(dollar[1], 16);
  const tailed = /^(\d[\da-fA-F]*)[hH]$/.exec(text);
  if (tailed) return inBase(tailed[1], 16);
  if (text.startsWith("'")) return cCharacter(text.length > 2 && text.endsWith("'") ? text : `${text}'`);
  if (/[.eE]/.test(text) && !/^0[xX]/.test(text))
    return { fault: 'a decimal fraction; such columns come in as CSV' };
  if (!/^\d[\da-fA-FxX]*$/.test(text)) return { fault: 'not a plain number' };
  return cInteger(text);
}
