import { aside, cyclesIn, label, line, type Line } from './assembly.ts';
import type { LoopPort, LoopShape } from './sample.ts';

/**
 * An interrupt handler as a whole, reti included.
 *
 * Symbols it uses: `ready_`, a byte a port; `at_`, the table's address of the next word, two bytes; `phase_`, `step_`
 * and, for two tones, `phase2_` and `step2_`, of the accumulator's bytes. No array's name ends in an underscore. Operands: `sreg`, the ports and, to
 * stop, `mask`, the timer's interrupt mask in data space, and `others`, its bits that stay.
 */
export interface Handler {
  readonly lines: readonly Line[];
  /** Most clock cycles from its first instruction to the end of its return. */
  readonly cycles: number;
}

export interface HandlerShape extends LoopShape {
  /** Words of the table. */
  readonly count: number;
}

export interface PhaseShape extends HandlerShape {
  readonly accumulatorBytes: 2 | 3 | 4;
  /** Table length 2^indexBits. */
  readonly indexBits: number;
}

/** Shows what the handler before has made ready, first of all; then makes the next word ready. */
function handler(shape: LoopShape, registers: readonly string[], work: readonly Line[]): Handler {
  const { ports } = shape;
  const isKept = ports.some((port) => port.isKept);
  const all = ['r18', ...(ports.length > 1 || isKept ? ['r19'] : [])];
  const others = registers.filter((register) => !all.includes(register));
  const push = (list: readonly string[]) => list.map((register) => line('push', register));
  const pop = (list: readonly string[]) => [...list].reverse().map((register) => line('pop', register));
  // Flags are saved before anything changes them: reading a port and masking it does.
  const saveFlags = [line('in', 'r18, %[sreg]'), line('push', 'r18')];
  const show = showReady(ports);
  const lines = [
    ...push(all),
    ...(isKept ? [...saveFlags, ...show] : [...show, ...saveFlags]),
    ...push(others),
    ...work,
    ...pop(others),
    line('pop', 'r18'),
    line('out', '%[sreg], r18'),
    ...pop(all),
    line('reti'),
  ];
  return { lines, cycles: cyclesIn(lines) };
}

/** The ports written one right after the other, the upper byte first; with kept pins each by itself. */
function showReady(ports: readonly LoopPort[]): Line[] {
  if (ports.some(({ isKept }) => isKept)) {
    return ports
      .map(({ letter, driven, isKept }, k) => [
        line('lds', `r18, ready_ + ${k}`),
        ...(isKept
          ? [
              line('in', `r19, %[port${letter}]`),
              line('andi', `r19, ${0xff & ~driven}`),
              line('or', 'r18, r19'),
            ]
          : []),
        line('out', `%[port${letter}], r18`),
      ])
      .reverse()
      .flat();
  }
  const registers = ['r18', 'r19'];
  return [
    ...ports.map((_, k) => line('lds', `${registers[k]}, ready_ + ${k}`)),
    ...ports.map(({ letter }, k) => line('out', `%[port${letter}], ${registers[k]}`)).reverse(),
  ];
}

/** Reads the word at Z and puts it by; Z then is behind it. */
const readReady = ({ load, ports }: LoopShape) =>
  ports.flatMap(({ driven, isMasked }, k) => [
    line(load, 'r18, Z+'),
    ...(isMasked ? [line('andi', `r18, ${driven}`)] : []),
    line('sts', `ready_ + ${k}, r18`),
  ]);

const loadPointer = [line('lds', 'r30, at_'), line('lds', 'r31, at_ + 1')];
const storePointer = [line('sts', 'at_, r30'), line('sts', 'at_ + 1, r31')];

const compareWithEnd = ({ table, count, ports }: HandlerShape) => {
  const end = `${table} + ${count * ports.length}`;
  return [line('ldi', `r18, hi8(${end})`), line('cpi', `r30, lo8(${end})`), line('cpc', 'r31, r18')];
};

/** Word after word, the first behind the last. */
export function tableHandler(shape: HandlerShape): Handler {
  return handler(
    shape,
    ['r18', 'r30', 'r31'],
    [
      ...loadPointer,
      ...readReady(shape),
      ...compareWithEnd(shape),
      { text: 'brne 1f', cycles: 1 },
      line('ldi', `r30, lo8(${shape.table})`),
      line('ldi', `r31, hi8(${shape.table})`),
      label('1'),
      ...storePointer,
    ],
  );
}

/** Word after word to the last, then no interrupt more: the output stays at the last. */
export function onceHandler(shape: HandlerShape): Handler {
  return handler(
    shape,
    ['r18', 'r30', 'r31'],
    [
      ...loadPointer,
      ...compareWithEnd(shape),
      { text: 'breq 1f', cycles: 1 },
      ...readReady(shape),
      ...storePointer,
      line('rjmp', '2f'),
      label('1'),
      aside(line('lds', 'r18, %[mask]')),
      aside(line('andi', 'r18, %[others]')),
      aside(line('sts', '%[mask], r18')),
      label('2'),
    ],
  );
}

/** Adds a step to a phase; its top byte then is in r31 and the one below in r30, or the top alone in r30. */
function advance(shape: PhaseShape, phase: string, step: string): Line[] {
  const { accumulatorBytes: bytes } = shape;
  return Array.from({ length: bytes }, (_, k) => {
    const fromTop = bytes - 1 - k;
    const register = isOneByte(shape)
      ? fromTop === 0
        ? 'r30'
        : 'r18'
      : fromTop === 0
        ? 'r31'
        : fromTop === 1
          ? 'r30'
          : 'r18';
    return [
      line('lds', `${register}, ${phase} + ${k}`),
      line('lds', `r19, ${step} + ${k}`),
      line(k === 0 ? 'add' : 'adc', `${register}, r19`),
      line('sts', `${phase} + ${k}, ${register}`),
    ];
  }).flat();
}

/** Whether the table lies within 256 bytes on a boundary of its own size: only the low byte of Z is worked out. */
const isOneByte = ({ indexBits, ports }: PhaseShape) => indexBits <= 8 && ports.length === 1;

export const handlerAlignment = (shape: PhaseShape) => (isOneByte(shape) ? 2 ** shape.indexBits : 0);

/** Z at the word of the phase that `advance` has left in it. */
function pointer(shape: PhaseShape): Line[] {
  const { indexBits, ports, table } = shape;
  if (isOneByte(shape)) {
    const shifts = Array.from({ length: 8 - indexBits }, () => line('lsr', 'r30'));
    const base = indexBits === 8 ? [] : [line('subi', `r30, lo8(-(${table}))`)];
    return [...shifts, ...base, line('ldi', `r31, hi8(${table})`)];
  }
  const shifts = Array.from({ length: 16 - indexBits - ports.length + 1 }, () => [
    line('lsr', 'r31'),
    line('ror', 'r30'),
  ]).flat();
  const even = ports.length === 2 ? [line('andi', 'r30, 254')] : [];
  const base = [line('subi', `r30, lo8(-(${table}))`), line('sbci', `r31, hi8(-(${table}))`)];
  return [...shifts, ...even, ...base];
}

/** The word of a phase accumulator. */
export function phaseHandler(shape: PhaseShape): Handler {
  return handler(
    shape,
    ['r18', 'r19', 'r30', 'r31'],
    [...advance(shape, 'phase_', 'step_'), ...pointer(shape), ...readReady(shape)],
  );
}

/** Half the sum of the codes of two phases. In two's complement half the levels are added to words to get codes. */
export function sumHandler(
  shape: PhaseShape,
  { bits, isSigned }: { bits: number; isSigned: boolean },
): Handler {
  const { load, ports } = shape;
  const half = 2 ** (bits - 1);
  const code = (registers: readonly string[]) => [
    ...ports.map((_, k) => line(load, `${registers[k]}, Z+`)),
    ...(isSigned ? addConstant(registers, half) : []),
    // A sign that reaches over the table's bits is no part of the code.
    ...(isSigned ? ports.map(({ driven }, k) => line('andi', `${registers[k]}, ${driven}`)) : []),
  ];
  const first = ['r20', 'r21'].slice(0, ports.length);
  const second = ['r22', 'r23'].slice(0, ports.length);
  return handler(
    shape,
    ['r18', 'r19', ...first, ...second, 'r30', 'r31'],
    [
      ...advance(shape, 'phase_', 'step_'),
      ...pointer(shape),
      ...code(first),
      ...advance(shape, 'phase2_', 'step2_'),
      ...pointer(shape),
      ...code(second),
      ...first.map((register, k) => line(k === 0 ? 'add' : 'adc', `${register}, ${second[k]}`)),
      // The sum's carry comes back as the top bit of its half.
      ...[...first].reverse().map((register) => line('ror', register)),
      ...(isSigned ? addConstant(first, 2 ** (8 * ports.length) - half) : []),
      ...ports.flatMap(({ driven }, k) => [
        ...(isSigned ? [line('andi', `${first[k]}, ${driven}`)] : []),
        line('sts', `ready_ + ${k}, ${first[k]}`),
      ]),
    ],
  );
}

/** Adds a constant to one register or two: by subtracting its negative, as there is no other instruction for it. */
function addConstant(registers: readonly string[], constant: number): Line[] {
  const negative = 2 ** (8 * registers.length) - constant;
  return registers.map((register, k) =>
    line(k === 0 ? 'subi' : 'sbci', `${register}, ${(negative >> (8 * k)) & 0xff}`),
  );
}
