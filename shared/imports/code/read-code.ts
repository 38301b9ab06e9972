import { limits, Refusal } from '../../contract/index.ts';
import { refuseFile } from '../refuse.ts';
import { looksLikeAssembly, readAssemblyArrays } from './assembly-arrays.ts';
import { readCArrays } from './c-arrays.ts';
import type { FoundArrays } from './code-array.ts';
import { looksLikeIntelHex, readIntelHex, wordsOf, type HexWords } from './intel-hex.ts';

export type CodeLanguage = 'c' | 'assembly' | 'intel-hex';

export interface ReadCode extends FoundArrays {
  readonly language: CodeLanguage;
}

/** What a text is written in, by what stands in it. */
export function languageOf(text: string): CodeLanguage {
  if (looksLikeIntelHex(text)) return 'intel-hex';
  return looksLikeAssembly(text) ? 'assembly' : 'c';
}

const bytesOfHex: HexWords = { wordBits: 8, byteOrder: 'low-first', isSigned: false };

/**
 * Every array of whole numbers in a source file or an Intel HEX image, and those that cannot be taken, with the reason.
 *
 * @param words how the bytes of an image are read; sources say it themselves
 * @throws {Refusal} where there is none to be taken: with line and column
 */
export function readCode(text: string, words: HexWords = bytesOfHex): ReadCode {
  if (text.trim() === '')
    refuseFile('an empty text', 'an array in C, C++ or assembly source, or an Intel HEX file');
  const language = languageOf(text);
  if (language === 'intel-hex') {
    return { language, arrays: readIntelHex(text).map((segment) => wordsOf(segment, words)), refused: [] };
  }
  const found = language === 'assembly' ? readAssemblyArrays(text) : readCArrays(text);
  const [first, ...others] = found.refused.map(({ problem }) => problem);
  if (found.arrays.length === 0) throw new Refusal(first, ...others.slice(0, limits.problemsShown - 1));
  return { language, ...found };
}
