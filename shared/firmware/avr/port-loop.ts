import { cyclesIn, label, line, taken, wait, type Line } from './assembly.ts';
import { immediateBlock, keepsFlags, rewind, sampleBlock, sampleCycles, type LoopShape } from './sample.ts';

/** A loop for ever, with the clock cycles from each write of a port to its next one: all alike, the seam included. */
export interface PortLoop {
  readonly lines: readonly Line[];
  readonly cyclesPerWord: number;
}

export type Unroll = 'none' | 'two' | 'whole';

/** Rjmp reaches 2048 words; what stands around the samples of a whole unrolled loop takes less than 16. */
const reach = 2032;

/** The words of program memory that the samples of a whole unrolled loop may take, and take. */
export function wholeLoopWords(shape: LoopShape, count: number): { most: number; words: number } {
  return { most: reach, words: sampleBlock(shape).length * count };
}

/**
 * The loop that plays a table of `count` words.
 *
 * Counting and jumping take the same 3 cycles (2 unrolled by two) between any two words. What the seam needs, counts
 * anew and a pointer set back, is spread over the last words, which stand once more behind the loop.
 *
 * @param words the table's words as their ports show them, for the ends of the whole unrolled loop
 * @param unroll `two` only where `keepsFlags`; `whole` only where `wholeLoopWords` fit
 */
export function portLoop(shape: LoopShape, words: ArrayLike<number>, unroll: Unroll): PortLoop {
  const count = words.length;
  if (unroll === 'whole') return wholeLoop(shape, words);
  if (count < 8) return shortLoop(shape, count);
  return unroll === 'two' && keepsFlags(shape) ? pairLoop(shape, count) : rolledLoop(shape, count);
}

/** Few words, one after the other: jump and pointer take 4 cycles, and so each word does. */
function shortLoop(shape: LoopShape, count: number): PortLoop {
  const lines: Line[] = [label('1'), ...rewind(shape)];
  for (let k = 0; k < count; k += 1) {
    lines.push(...sampleBlock(shape), ...(k === count - 1 ? [line('rjmp', '1b')] : wait(4)));
  }
  return { lines, cyclesPerWord: sampleCycles(shape) + 4 };
}

function rolledLoop(shape: LoopShape, count: number): PortLoop {
  const block = sampleBlock(shape);
  if (count <= 258) {
    const turns = ldiCount('r24', count - 2);
    return {
      lines: [
        turns,
        ...rewind(shape),
        line('rjmp', '2f'),
        label('1'),
        ...block,
        line('dec', 'r24'),
        taken('1b'),
        turns,
        ...block,
        ...rewind(shape),
        ...wait(1),
        label('2'),
        ...block,
        ...wait(1),
        line('rjmp', '1b'),
      ],
      cyclesPerWord: cyclesIn(block) + 3,
    };
  }
  // One word behind each inner loop, and three around the seam.
  const { blocks, first, extra } = split(count, { inner: 1, seam: 3 });
  return {
    lines: [
      ldiCount('r24', first),
      ldiCount('r25', blocks),
      ...rewind(shape),
      line('rjmp', '2f'),
      label('1'),
      ...block,
      line('dec', 'r24'),
      taken('1b'),
      ...wait(1),
      ...block,
      line('dec', 'r25'),
      taken('1b'),
      ldiCount('r24', first),
      ...block,
      ldiCount('r25', blocks),
      ...wait(2),
      ...block,
      ...Array.from({ length: extra }, () => [...wait(3), ...block]).flat(),
      ...rewind(shape),
      ...wait(1),
      label('2'),
      ...block,
      ...wait(1),
      line('rjmp', '1b'),
    ],
    cyclesPerWord: cyclesIn(block) + 3,
  };
}

function pairLoop(shape: LoopShape, count: number): PortLoop {
  const block = sampleBlock(shape);
  const { blocks, first, extra } = split(count, { inner: 2, seam: 3 });
  return {
    lines: [
      ldiCount('r24', first),
      ldiCount('r25', blocks),
      ...rewind(shape),
      line('rjmp', '2f'),
      label('1'),
      ...block,
      line('dec', 'r24'),
      ...wait(1),
      ...block,
      taken('1b'),
      line('dec', 'r25'),
      ...block,
      taken('1b'),
      ldiCount('r24', first),
      ...block,
      ldiCount('r25', blocks),
      ...wait(1),
      ...block,
      ...Array.from({ length: extra }, () => [...wait(2), ...block]).flat(),
      ...rewind(shape),
      label('2'),
      ...block,
      line('rjmp', '1b'),
    ],
    cyclesPerWord: cyclesIn(block) + 2,
  };
}

/** Every word has instructions of its own; the first and the last come without a read, which pays for the jump. */
function wholeLoop(shape: LoopShape, words: ArrayLike<number>): PortLoop {
  const count = words.length;
  const block = sampleBlock(shape);
  const first = immediateBlock(shape, words[0]);
  const last = immediateBlock(shape, words[count - 1]);
  const cyclesPerWord = Math.max(cyclesIn(block), cyclesIn(first) + 2);
  const pause = wait(cyclesPerWord - cyclesIn(block));
  const lines: Line[] = [
    ...rewindPastFirst(shape),
    label('1'),
    ...wait(cyclesPerWord - cyclesIn(first) - 2),
    ...first,
  ];
  for (let k = 1; k < count - 1; k += 1) lines.push(...pause, ...block);
  lines.push(
    ...rewindPastFirst(shape),
    ...wait(cyclesPerWord - cyclesIn(last) - 2),
    ...last,
    line('rjmp', '1b'),
  );
  return { lines, cyclesPerWord };
}

const rewindPastFirst = ({ table, ports }: LoopShape) => [
  line('ldi', `r30, lo8(${table} + ${ports.length})`),
  line('ldi', `r31, hi8(${table} + ${ports.length})`),
];

/** A register that counts 1…256 turns down: 256 is 0. */
const ldiCount = (register: string, turns: number) => line('ldi', `${register}, ${turns % 256}`);

/**
 * Splits a count into an outer and an inner loop of 8-bit counters: `inner · (first + 256·(blocks − 1))` words of the
 * inner loop, one behind each of its rounds, `seam` words and `extra` more.
 */
function split(count: number, { inner, seam }: { inner: number; seam: number }) {
  for (let blocks = 1; blocks <= 256; blocks += 1) {
    const rest = count - blocks - seam - inner * 256 * (blocks - 1);
    const first = Math.min(256, Math.floor(rest / inner));
    const extra = rest - inner * first;
    if (first >= 1 && extra <= 4) return { blocks, first, extra };
  }
  throw new Error(`No counts play ${count} words.`);
}
