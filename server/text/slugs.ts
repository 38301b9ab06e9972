import { plainText } from './plain-text.ts';

/** Leaves room for a number behind it in the 60 characters of an address. */
const longest = 50;

/** A title as part of an address: ASCII letters and digits, hyphens between them; `nothingLeft` where nothing is left. */
export const slugOfTitle = (title: string, nothingLeft: string): string =>
  plainText(title)
    .replace(/[^a-z0-9]+/g, '-')
    .slice(0, longest)
    .replace(/^-+|-+$/g, '') || nothingLeft;

export const numbered = (base: string, number: number): string => (number === 1 ? base : `${base}-${number}`);
