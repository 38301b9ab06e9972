import { Refusal, showValue, type PortMap } from '../contract/index.ts';

/** A port of a map as masks over its pins: those driven, those reserved, those of the reserved that rest high. */
export interface MappedPort {
  readonly name: string;
  /** Bytes that one write takes: 1, 2 or 4. */
  readonly bytes: 1 | 2 | 4;
  readonly driven: number;
  readonly reserved: number;
  readonly rest: number;
  /** Whether reserved pins keep what they show: each write reads the port first. */
  readonly isKept: boolean;
}

/** The texts of a map in options: `B.0 B.1 D.4`, bit 0 first, and `B.2=high D.7=low`. */
export interface PortMapTexts {
  readonly portMap: string;
  readonly reservedPins: string;
  readonly reservedBy: 'baked' | 'kept';
}

/** Words shown as they are, eight bits a port: bit 0 on pin 0 of the first. */
export const straightMap = (bits: number, ports: readonly string[]): PortMap => ({
  bits: Array.from({ length: bits }, (_, bit) => ({ port: ports[bit >> 3], pin: bit & 7 })),
  ports: ports
    .slice(0, Math.ceil(bits / 8))
    .map((name) => ({ name, width: 8, reserved: [], reservedPins: 'baked' })),
});

/**
 * Reads a map from its texts; places are apart by spaces or commas.
 *
 * @param mostPins pins that a port can have: 8 to 32
 * @throws {Refusal} naming `options.portMap` or `options.reservedPins`
 */
export function parsePortMap(
  { portMap, reservedPins, reservedBy }: PortMapTexts,
  { bits, mostPins }: { bits: number; mostPins: number },
): PortMap {
  const seen = new Set<string>();
  const place = (text: string, path: string) => {
    const [, port, digits] = /^([A-Za-z]\w{0,7})\.(\d{1,2})$/.exec(text) ?? [];
    const pin = Number(digits);
    if (port === undefined || pin >= mostPins) {
      refuse(path, text, `places as B.0: a port's name and a pin from 0 to ${mostPins - 1}`);
    }
    if (seen.has(text)) refuse(path, text, 'each pin once');
    seen.add(text);
    return { port, pin };
  };
  const driven = wordsOf(portMap).map((text) => place(text, 'options.portMap'));
  if (driven.length !== bits) {
    refuse('options.portMap', portMap, `one place for each of the ${bits} bits, that of bit 0 first`);
  }
  const names = [...new Set(driven.map(({ port }) => port))];
  const reserved = wordsOf(reservedPins).map((text) => {
    const path = 'options.reservedPins';
    const [, where, rest] = /^(.*)=(low|high)$/.exec(text) ?? [];
    if (where === undefined) refuse(path, text, 'places with their rest level, as B.2=high');
    const { port, pin } = place(where, path);
    if (!names.includes(port))
      refuse(path, text, `pins of the ports of options.portMap: ${names.join(', ')}`);
    return { port, pin, rest: rest as 'low' | 'high' };
  });
  return {
    bits: driven,
    ports: names.map((name) => ({
      name,
      width: mostPins,
      reserved: reserved.filter(({ port }) => port === name).map(({ pin, rest }) => ({ pin, rest })),
      reservedPins: reservedBy,
    })),
  };
}

/** The texts that lead to a map again; ports that differ in how they keep reserved pins are taken as kept. */
export function portMapTexts({ bits, ports }: PortMap): PortMapTexts {
  return {
    portMap: bits.map(({ port, pin }) => `${port}.${pin}`).join(' '),
    reservedPins: ports
      .flatMap(({ name, reserved }) => reserved.map(({ pin, rest }) => `${name}.${pin}=${rest}`))
      .join(' '),
    reservedBy: ports.some(({ reserved, reservedPins }) => reserved.length > 0 && reservedPins === 'kept')
      ? 'kept'
      : 'baked',
  };
}

const wordsOf = (text: string) => text.split(/[\s,]+/).filter(Boolean);

/** The map's ports in the order of their names. */
export function mappedPorts({ bits, ports }: PortMap): MappedPort[] {
  const sorted = [...ports].sort((a, b) => (a.name < b.name ? -1 : 1));
  return sorted.map(({ name, reserved, reservedPins }) => {
    const driven = maskOf(bits.filter(({ port }) => port === name));
    const reservedMask = maskOf(reserved);
    const topPin = 31 - Math.clz32(driven | reservedMask);
    return {
      name,
      bytes: topPin < 8 ? 1 : topPin < 16 ? 2 : 4,
      driven,
      reserved: reservedMask,
      rest: maskOf(reserved.filter(({ rest }) => rest === 'high')),
      isKept: reservedPins === 'kept' && reserved.length > 0,
    };
  });
}

const maskOf = (pins: readonly { readonly pin: number }[]) =>
  pins.reduce((mask, { pin }) => (mask | (1 << pin)) >>> 0, 0);

/**
 * What one port shows for each word: bits on their pins, reserved pins at their rest levels unless they are kept, 0
 * elsewhere. Negative words give the bits of two's complement; pin 31 is the sign of an Int32.
 */
export function wordsOnPort(words: Int32Array, { bits }: PortMap, port: MappedPort): Int32Array {
  const moves = bits.flatMap((place, bit) => (place.port === port.name ? [{ bit, pin: place.pin }] : []));
  const rest = port.isKept ? 0 : port.rest;
  return words.map((word) => {
    let shown = rest;
    for (const { bit, pin } of moves) shown |= ((word >> bit) & 1) << pin;
    return shown;
  });
}

function refuse(path: string, value: string, allowed: string): never {
  throw new Refusal({ path, value: showValue(value), allowed });
}
