import { Refusal, showValue, type PortMap } from '../contract/index.ts';
import type { ExportableTable } from './exportable-table.ts';
import { packedBitsOf, packWords, type PackedBits } from './packing.ts';
import { mappedPorts, parsePortMap, wordsOnPort, type MappedPort } from './port-map.ts';
import { wordTypeOf } from './word-type.ts';

/** An array as it is stored: a table's words, those of one port, or bytes of packed words. */
export interface StoredArray {
  /** What follows the export's name in its own: empty, or `_b` for port B. */
  readonly suffix: string;
  readonly elements: Int32Array;
  readonly bytes: 1 | 2 | 4;
  readonly signed: boolean;
  /** Ports that its elements are for, that of the lowest byte first; none where elements are plain words. */
  readonly ports: readonly MappedPort[];
}

/** How the words of a table lie in storage. */
export interface Layout {
  readonly arrays: readonly StoredArray[];
  readonly packedBits: PackedBits | undefined;
  readonly map: PortMap | undefined;
  readonly byteCount: number;
}

export interface LayoutOptions {
  readonly packed?: 'no' | 'yes';
  readonly portMap?: string;
  readonly reservedPins?: string;
  readonly reservedBy?: 'baked' | 'kept';
}

/**
 * Lays a table's words out: as they are, packed, or one array a port with the bits on their pins.
 *
 * @param mostPins pins that a port of the target can have
 * @throws {Refusal} naming the option that does not fit the table
 */
export function layOut(
  { definition: { table }, stored }: ExportableTable,
  { packed = 'no', portMap = '', reservedPins = '', reservedBy = 'baked' }: LayoutOptions,
  mostPins = 32,
): Layout {
  if (portMap === '') {
    if (reservedPins !== '') refuse('options.reservedPins', reservedPins, 'nothing without options.portMap');
    if (packed === 'no') {
      const { bytes, signed } = wordTypeOf(table);
      return whole([{ suffix: '', elements: stored, bytes, signed, ports: [] }]);
    }
    const packedBits = packedBitsOf(table.bits);
    const elements = packWords(stored, packedBits);
    return { ...whole([{ suffix: '', elements, bytes: 1, signed: false, ports: [] }]), packedBits };
  }
  if (packed === 'yes') refuse('options.packed', packed, '"no" with options.portMap');
  const map = parsePortMap({ portMap, reservedPins, reservedBy }, { bits: table.bits, mostPins });
  const arrays = mappedPorts(map).map((port): StoredArray => ({
    suffix: `_${port.name.toLowerCase()}`,
    elements: wordsOnPort(stored, map, port),
    bytes: port.bytes,
    signed: false,
    ports: [port],
  }));
  return { ...whole(arrays), map };
}

const whole = (arrays: readonly StoredArray[]): Layout => ({
  arrays,
  packedBits: undefined,
  map: undefined,
  byteCount: arrays.reduce((sum, { elements, bytes }) => sum + elements.length * bytes, 0),
});

function refuse(path: string, value: string, allowed: string): never {
  throw new Refusal({ path, value: showValue(value), allowed });
}

/** The elements as bytes, each element's in the order asked for. */
export function bytesOf({ elements, bytes }: StoredArray, endianness: 'little' | 'big'): Uint8Array {
  const out = new Uint8Array(elements.length * bytes);
  for (let k = 0; k < elements.length; k += 1) {
    for (let byte = 0; byte < bytes; byte += 1) {
      const place = endianness === 'little' ? byte : bytes - 1 - byte;
      out[k * bytes + place] = elements[k] >> (8 * byte);
    }
  }
  return out;
}

/** An element without its sign: its bits as a number from 0. */
export const patternOf = (element: number, bytes: 1 | 2 | 4) =>
  bytes === 4 ? element >>> 0 : element & (2 ** (8 * bytes) - 1);
