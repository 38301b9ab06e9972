import { codingNames, keyFigures } from './key-figures.ts';
import { engineVersion as thisEngine } from '../engine-version.ts';
import { inertText } from './inert-text.ts';
import type { Layout, StoredArray } from './layout.ts';
import type { ExportInput, Facts, SharedOptions, Target } from './target.ts';
import { plainStyle, wordLiteral, wordRows, wordSpan, type NumberStyle } from './word-rows.ts';
import { wordTypeOf } from './word-type.ts';

/** Facts that every target's templates can print. */
export function sharedFacts(
  input: ExportInput<SharedOptions>,
  numbersOf: Target['numbersOf'] = () => ({}),
): Facts {
  const { table, layout, options, arrayName, digest } = input;
  const { definition, stored, report, engineVersion = thisEngine } = table;
  const { bits, coding, complement, fold, length, range, scale, levels } = definition.table;
  const wordType = wordTypeOf(definition.table);
  const words = wordSpan(stored);
  const { numberBase: base = 'decimal', columns = 0 } = options;
  return {
    title: inertText(definition.name) || arrayName,
    arrayName,
    macro: arrayName.toUpperCase(),
    storedCount: stored.length,
    tableLength: length,
    bits,
    levelCount: 2 ** bits,
    halfLevels: 2 ** (bits - 1),
    topCode: 2 ** bits - 1,
    coding: codingNames[coding],
    twosComplement: coding === 'twos-complement',
    complement,
    folded: fold === 'quarter',
    packedBits: layout.packedBits ?? false,
    mapped: layout.map !== undefined,
    hasReader: fold === 'quarter' || layout.packedBits !== undefined,
    range,
    scale: levels === undefined ? scale : 'measured',
    wordType: wordType.name,
    wordBytes: wordType.bytes,
    minWord: words.min,
    maxWord: words.max,
    minWordLiteral: wordLiteral(words.min, wordType),
    maxWordLiteral: wordLiteral(words.max, wordType),
    offsetType: layout.byteCount > 65_535 ? 'uint32_t' : 'uint16_t',
    once: false,
    dma: false,
    extraInclude: false,
    attribute: '',
    stepWord: false,
    readerStart: arrayName,
    readerEnd: '_word',
    fetchOpen: '',
    fetchClose: '',
    readCast: '',
    sourceEnding: '.c',
    arrays: layout.arrays.map((array) =>
      arrayFacts(array, arrayName, {
        ...plainStyle,
        base,
        columns,
        hexDigits: 2 * array.bytes,
        ...numbersOf(array.bytes),
      }),
    ),
    figures: keyFigures({
      definition,
      report,
      storage: sayStorage(layout, stored.length, wordType.name),
      words,
      layout,
      engineVersion,
      digest,
    }),
  };
}

/** What a template prints of one array. Rows are made when they are asked for: some targets write bytes. */
function arrayFacts(
  { suffix, elements, bytes, signed, ports }: StoredArray,
  name: string,
  style: NumberStyle,
) {
  const hex = (mask: number, digits = 2 * bytes) =>
    `0x${mask.toString(16).toUpperCase().padStart(digits, '0')}`;
  const portFacts = ports.map((port) => ({
    name: port.name,
    macro: port.name.toUpperCase(),
    driven: hex(port.driven, 2 * port.bytes),
    reserved: hex(port.reserved, 2 * port.bytes),
    rest: hex(port.rest, 2 * port.bytes),
    hasReserved: port.reserved !== 0,
    isKept: port.isKept,
  }));
  let rows: string | undefined;
  return {
    name: name + suffix,
    suffix,
    macro: `${name}${suffix}`.toUpperCase(),
    count: elements.length,
    elementBytes: bytes,
    signed,
    type: `${signed ? '' : 'u'}int${8 * bytes}_t`,
    rustType: `${signed ? 'i' : 'u'}${8 * bytes}`,
    ports: portFacts,
    port: ports.length > 0 && portFacts[0],
    isKept: ports.some(({ isKept }) => isKept),
    /** Turns a word of mapped ports upside down. */
    flip: hex(ports.reduce((mask, { driven }, k) => mask + driven * 2 ** (8 * k), 0)),
    get rows() {
      rows ??= wordRows(bytes === 4 ? new Uint32Array(elements) : elements, style);
      return rows;
    },
  };
}

function sayStorage({ arrays, packedBits, byteCount }: Layout, count: number, wordType: string): string {
  const bytes = `${byteCount} bytes`;
  if (packedBits !== undefined) {
    return `${count} of ${packedBits} bits, two in ${packedBits === 4 ? 'a byte' : 'three bytes'}; ${bytes}`;
  }
  if (arrays.length === 1 && arrays[0].ports.length === 0) return `${count} of ${wordType}, ${bytes}`;
  const ports = arrays.reduce((sum, array) => sum + array.ports.length, 0);
  return `${count} for each of ${ports} port${ports === 1 ? '' : 's'}, ${bytes}`;
}
