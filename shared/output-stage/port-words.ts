import type { OnChipOutput, Port, PortMap, SerialOutput } from '../contract/index.ts';

/** The words of one port. */
export interface PortWords {
  readonly name: string;
  readonly width: number;
  /** One word an entry; pins of other ports and, where they are kept, reserved pins are 0. */
  readonly words: Uint32Array;
  /** Pins that the table drives. */
  readonly mask: number;
  /** Reserved pins that rest high. */
  readonly restWord: number;
  readonly reservedPins: Port['reservedPins'];
}

export interface MappedWords {
  readonly ports: readonly PortWords[];
  /** Whether bits of one code change at different instants, as several ports are written one after another. */
  readonly isSplit: boolean;
}

/**
 * Words for each port of a map, so that one write a port is enough (engine specification §6): the bits of each code
 * on their pins, and the rest level of reserved pins where those are baked in.
 *
 * @param codes as the converter takes them: unsigned, or negative in two's complement
 */
export function portWordsOf(codes: ArrayLike<number>, { bits, ports }: PortMap): MappedWords {
  return { ports: ports.map((port) => wordsOfPort(codes, port, bits)), isSplit: ports.length > 1 };
}

function wordsOfPort(codes: ArrayLike<number>, port: Port, places: PortMap['bits']): PortWords {
  const own = places.flatMap(({ port: name, pin }, bit) => (name === port.name ? [{ bit, pin }] : []));
  const wordOf = (pins: readonly number[]) => pins.reduce((word, pin) => word + 2 ** pin, 0);
  const restWord = wordOf(port.reserved.filter(({ rest }) => rest === 'high').map(({ pin }) => pin));
  const baked = port.reservedPins === 'baked' ? restWord : 0;
  const words = new Uint32Array(codes.length);
  for (let k = 0; k < codes.length; k += 1) {
    let word = baked;
    for (const { bit, pin } of own) if ((codes[k] >> bit) & 1) word += 2 ** pin;
    words[k] = word;
  }
  return {
    name: port.name,
    width: port.width,
    words,
    mask: wordOf(own.map(({ pin }) => pin)),
    restWord,
    reservedPins: port.reservedPins,
  };
}

/** Words for the data register of a converter on the chip. */
export function registerWordsOf(
  codes: ArrayLike<number>,
  { bits, registerBits, alignment }: Pick<OnChipOutput, 'bits' | 'registerBits' | 'alignment'>,
): Uint32Array {
  const by = alignment === 'left' ? 2 ** (registerBits - bits) : 1;
  return Uint32Array.from(codes, (code) => unsigned(code, bits) * by);
}

type SerialWord = Pick<SerialOutput, 'bits' | 'wordBits' | 'shift' | 'mask' | 'command' | 'byteOrder'>;

/** Words for a converter behind a serial line: `command | ((code << shift) & mask)`. */
export function serialWordsOf(
  codes: ArrayLike<number>,
  { bits, shift, mask, command }: SerialWord,
): Uint32Array {
  const kept = mask ?? (2 ** bits - 1) * 2 ** shift;
  return Uint32Array.from(codes, (code) => (command | ((unsigned(code, bits) << shift) & kept)) >>> 0);
}

/** Those words as the bytes that go out, one word after another. */
export function serialBytesOf(codes: ArrayLike<number>, output: SerialWord): Uint8Array {
  const words = serialWordsOf(codes, output);
  const each = output.wordBits / 8;
  const bytes = new Uint8Array(words.length * each);
  words.forEach((word, k) => {
    for (let place = 0; place < each; place += 1) {
      const byte = output.byteOrder === 'little-endian' ? place : each - 1 - place;
      bytes[k * each + place] = word >>> (8 * byte);
    }
  });
  return bytes;
}

const unsigned = (code: number, bits: number) => code & (2 ** bits - 1);
