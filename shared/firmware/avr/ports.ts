import { Refusal, showValue } from '../../contract/index.ts';
import type { ExportableTable } from '../exportable-table.ts';
import { layOut, type Layout } from '../layout.ts';
import type { AvrOptions } from './options.ts';
import type { LoopPort } from './sample.ts';

/** Pins of a port of the part. */
const portPins = 8;
/** avr-gcc's largest object: sizes and differences of pointers are 16-bit, signed. */
const largestObject = 32_767;

/**
 * Words for a part whose reads from program memory go through one pointer: two ports of a map share an array, the
 * port that comes first in the alphabet in the lower byte.
 *
 * @throws {Refusal} where the ports, the option or the size do not fit the part
 */
export function layOutForAvr(table: ExportableTable, options: AvrOptions): Layout {
  const layout = layOut(table, options, portPins);
  if (layout.map === undefined) return withinObject(table, layout);
  for (const { name } of layout.map.ports) {
    if (!/^[A-L]$/.test(name)) refuse('options.portMap', name, 'port letters, A to L, for the target avr');
  }
  const [low, high, third] = layout.arrays;
  if (third !== undefined) {
    refuse('options.portMap', options.portMap, 'places on one port or two for the target avr');
  }
  const elements =
    high === undefined ? low.elements : low.elements.map((word, k) => word | (high.elements[k] << 8));
  const ports = [...low.ports, ...(high?.ports ?? [])];
  const bytes = high === undefined ? 1 : 2;
  return withinObject(table, {
    ...layout,
    arrays: [{ suffix: '', elements, bytes, signed: false, ports }],
    byteCount: elements.length * bytes,
  });
}

function withinObject({ definition: { table } }: ExportableTable, layout: Layout): Layout {
  const [{ elements, bytes }] = layout.arrays;
  if (layout.byteCount <= largestObject) return layout;
  const most = Math.floor(largestObject / bytes);
  return refuse(
    'table.length',
    elements.length,
    `at most ${most} entries of ${table.bits} bits for the target avr, whose arrays end at ${largestObject} bytes`,
  );
}

/** The ports that the words go to, that of the lower byte first. */
export function loopPorts(
  { definition: { table } }: ExportableTable,
  layout: Layout,
  options: AvrOptions,
): LoopPort[] {
  const [{ ports }] = layout.arrays;
  if (layout.map !== undefined) {
    return ports.map(({ name, driven, isKept }) => ({ letter: name, driven, isMasked: false, isKept }));
  }
  const { port, highPort = port === 'D' ? 'B' : 'D' } = options;
  if (table.bits > portPins && highPort === port) {
    refuse('options.highPort', highPort, `a port letter other than options.port, ${port}`);
  }
  const isSigned = table.coding === 'twos-complement';
  return [port, highPort].slice(0, Math.ceil(table.bits / portPins)).map((letter, k) => {
    const driven = 2 ** Math.min(table.bits - portPins * k, portPins) - 1;
    return { letter, driven, isMasked: isSigned && driven !== 0xff, isKept: false };
  });
}

function refuse(path: string, value: unknown, allowed: string): never {
  throw new Refusal({ path, value: showValue(value), allowed });
}
