import { Refusal } from '../contract/index.ts';
import { readCode, type ReadCode } from './code/read-code.ts';
import { readCsv, type CsvOutcome } from './csv/read-csv.ts';
import { decodeText } from './decode-text.ts';
import { importLimits } from './limits.ts';
import { looksLikeWav, type WavHeader } from './recording/wav-header.ts';
import { readWav } from './recording/read-wav.ts';
import { refuseFile } from './refuse.ts';

/** A file of any kind that is read, by what is in it. */
export type AnyFile =
  | { readonly kind: 'recording'; readonly header: WavHeader }
  | { readonly kind: 'columns'; readonly text: string; readonly outcome: CsvOutcome }
  | { readonly kind: 'code'; readonly text: string; readonly code: ReadCode };

const sourceNames = /\.(?:c|h|cc|cpp|cxx|hpp|hh|ino|inc|s|asm|hex|ihx|ihex)$/i;

/**
 * Reads a file by its content. A name tells at most which reader of text is asked first, and whose refusal is handed on
 * where none takes it.
 *
 * @throws {Refusal} where nothing here reads it
 */
export function readAny(bytes: Uint8Array, fileName = ''): AnyFile {
  if (bytes.length === 0)
    refuseFile('an empty file', 'a recording, a column of numbers, or source with an array');
  if (bytes.length > importLimits.fileBytes) {
    refuseFile(`${bytes.length} bytes`, `at most ${importLimits.fileBytes} bytes`);
  }
  if (looksLikeWav(bytes)) return { kind: 'recording', header: readWav(bytes).header };
  const text = decodeText(bytes);
  const asCode = (): AnyFile => ({ kind: 'code', text, code: readCode(text) });
  const asColumns = (): AnyFile => ({ kind: 'columns', text, outcome: readCsv(text) });
  const isSource =
    sourceNames.test(fileName) || /^\s*:[\da-f]{10}|[{};]|^\s*[.#]/im.test(text.slice(0, 20_000));
  const [first, second] = isSource ? [asCode, asColumns] : [asColumns, asCode];
  try {
    return first();
  } catch (refusal) {
    if (!(refusal instanceof Refusal)) throw refusal;
    try {
      return second();
    } catch (other) {
      throw other instanceof Refusal ? refusal : other;
    }
  }
}
