import type { Board, BoardOutput, OutputKind, PortMap } from '../../../shared/contract/index.ts';

/** A board as it is typed, with the outputs of other kinds that were typed before. */
export interface BoardDraft {
  readonly board: Board;
  readonly others: Partial<Record<OutputKind, BoardOutput>>;
  readonly note: string;
  /** Entity tag of the state that the draft began with; none for a new board. */
  readonly etag: string | null;
}

export type ChangeBoard = (update: (board: Board) => Board) => void;

/** Another kind of output; what was typed for this one is there again when it is chosen again. */
export function withKind({ board, others, ...draft }: BoardDraft, kind: OutputKind): BoardDraft {
  const { output } = board;
  return {
    ...draft,
    others: { ...others, [output.kind]: output },
    board: { ...board, output: others[kind] ?? freshOutput(kind, output.bits) },
  };
}

export function freshOutput(kind: OutputKind, bits: number): BoardOutput {
  switch (kind) {
    case 'ladder':
      return {
        kind,
        bits,
        R: 10_000,
        rHigh: 0,
        rLow: 0,
        tolerancePercent: 1,
        distribution: 'uniform',
        portMap: withBits(
          { bits: [], ports: [{ name: 'B', width: 8, reserved: [], reservedPins: 'baked' }] },
          bits,
        ),
      };
    case 'on-chip':
      return { kind, bits, registerBits: 16, alignment: 'right', outputOhms: 0 };
    case 'serial':
      return { kind, bits, wordBits: 16, shift: 0, command: 0, byteOrder: 'big-endian', outputOhms: 0 };
    case 'pwm':
      return { kind, bits, mode: 'fast', prescaler: 1, outputOhms: 0 };
  }
}

/**
 * Places for so many bits: those there are, and for more the next free pins; a new port where none is free. A port that
 * loses its last bit goes, unless something is reserved there.
 */
export function withBits({ bits, ports }: PortMap, count: number): PortMap {
  const places = bits.slice(0, count);
  const carries = (list: PortMap['bits'], name: string) => list.some(({ port }) => port === name);
  const all = ports.filter(
    ({ name, reserved }) => carries(places, name) || !carries(bits, name) || reserved.length > 0,
  );
  while (places.length < count) {
    const free = all
      .flatMap(({ name, width, reserved }) =>
        Array.from({ length: width }, (_, pin) => ({ port: name, pin })).filter(
          ({ pin }) => !reserved.some((one) => one.pin === pin),
        ),
      )
      .find(({ port, pin }) => !places.some((place) => place.port === port && place.pin === pin));
    if (free !== undefined) places.push(free);
    else all.push({ name: freeName(all), width: 8, reserved: [], reservedPins: 'baked' });
  }
  return { bits: places, ports: all };
}

export function freeName(ports: PortMap['ports']): string {
  const letters = ['B', 'C', 'D', 'E', 'F', 'G', 'H', 'A', 'J'];
  return letters.find((letter) => !ports.some(({ name }) => name === letter)) ?? 'X';
}

/** Reads a kept draft; null where there is none, or an unreadable one. */
export function readDraft(text: string): BoardDraft | null {
  if (text === '') return null;
  try {
    const draft = JSON.parse(text) as Partial<BoardDraft>;
    return draft.board?.schema === 1 ? (draft as BoardDraft) : null;
  } catch {
    return null;
  }
}

export const draftOf = (board: Board, etag: string | null): BoardDraft => ({
  board,
  others: {},
  note: '',
  etag,
});
