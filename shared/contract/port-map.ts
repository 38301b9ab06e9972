import { z } from 'zod';
import { oneWordOf, shortListOf, wholeNumberIn } from './number-fields.ts';
import { outputLimits } from './output-limits.ts';
import type { Problem } from './refusal.ts';

const portNameError = 'a letter, then up to 7 letters, digits or underscores';
const portNameField = z.string({ error: portNameError }).regex(/^[A-Za-z]\w{0,7}$/, { error: portNameError });
const pinField = wholeNumberIn({ min: 0, max: outputLimits.portWidth.max - 1 });

export const restLevels = ['low', 'high'] as const;
export const reservedPinsWays = ['baked', 'kept'] as const;

const portSchema = z.strictObject({
  name: portNameField,
  /** Pins that one write reaches, 1…32. */
  width: wholeNumberIn(outputLimits.portWidth).default(8),
  /** Pins that belong to something else. */
  reserved: shortListOf(
    z.strictObject({ pin: pinField, rest: oneWordOf(restLevels).default('low') }),
    { min: 0, max: outputLimits.portWidth.max },
    'reserved pins',
  ).default([]),
  /** How they keep their level: `baked` writes their rest level with each word, `kept` reads and puts back what is there. */
  reservedPins: oneWordOf(reservedPinsWays).default('baked'),
});

/** Which pin carries which bit of the code. */
export const portMapSchema = z.strictObject({
  /** Place of each bit, least significant first. */
  bits: shortListOf(
    z.strictObject({ port: portNameField, pin: pinField }),
    outputLimits.bits,
    'places, one for each bit',
  ),
  ports: shortListOf(portSchema, outputLimits.ports, 'ports'),
});

export type Port = z.infer<typeof portSchema>;
export type PortMap = z.infer<typeof portMapSchema>;
export type PortMapInput = z.input<typeof portMapSchema>;

/** Every bit on one pin, every pin with at most one bit, no bit on a reserved pin. */
export function brokenPortRules({ bits, ports }: PortMap, bitCount: number, prefix: string): Problem[] {
  const problems: Problem[] = [];
  const refuse = (path: string, value: string, allowed: string) =>
    problems.push({ path: `${prefix}${path}`, value, allowed });

  if (bits.length !== bitCount) {
    refuse('bits', `a list of ${bits.length}`, `${bitCount} places, one for each bit of the output`);
  }
  const byName = new Map<string, Port>();
  ports.forEach((port, index) => {
    if (byName.has(port.name))
      refuse(`ports[${index}].name`, JSON.stringify(port.name), 'a name that no port before it has');
    byName.set(port.name, port);
    const reservedBefore = new Set<number>();
    port.reserved.forEach(({ pin }, place) => {
      const path = `ports[${index}].reserved[${place}].pin`;
      if (pin >= port.width) refuse(path, String(pin), `a pin of port ${port.name}, 0 to ${port.width - 1}`);
      else if (reservedBefore.has(pin)) refuse(path, String(pin), 'a pin that is not reserved already');
      reservedBefore.add(pin);
    });
    if (!bits.some((bit) => bit.port === port.name)) {
      refuse(`ports[${index}].name`, JSON.stringify(port.name), 'a port that carries a bit');
    }
  });
  const taken = new Map<string, number>();
  bits.forEach(({ port: name, pin }, bit) => {
    const port = byName.get(name);
    const path = `bits[${bit}]`;
    const place = `${name}.${pin}`;
    if (port === undefined)
      return refuse(
        `${path}.port`,
        JSON.stringify(name),
        `a port of the map: ${[...byName.keys()].join(', ')}`,
      );
    if (pin >= port.width)
      return refuse(`${path}.pin`, String(pin), `a pin of port ${name}, 0 to ${port.width - 1}`);
    if (port.reserved.some((reserved) => reserved.pin === pin)) {
      refuse(`${path}.pin`, String(pin), `a pin of port ${name} that is not reserved`);
    }
    const before = taken.get(place);
    if (before !== undefined) refuse(`${path}.pin`, String(pin), `a pin that bit ${before} does not use`);
    else taken.set(place, bit);
  });
  return problems;
}
