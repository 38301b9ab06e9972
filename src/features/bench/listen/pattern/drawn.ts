import { patternMs, type PulsePattern } from '../../../../../shared/contract/index.ts';
import { patternEdges } from '../../../../../shared/listening/pattern-score.ts';

/** A block of the drawing, in its own units. */
export interface Block {
  readonly from: number;
  readonly to: number;
  /** Several pulses that stand too close to be told apart. */
  readonly isDense: boolean;
}

/** Pauses narrower than this cannot be seen. */
const narrowest = 0.8;

/** Where it sounds, from left to right over `width`. */
export function blocksOf(pattern: PulsePattern, width: number): Block[] {
  const scale = width / patternMs(pattern);
  const edges = patternEdges(pattern);
  const blocks: Block[] = [];
  for (let k = 0; k < edges.length; k += 2) {
    const [from, to] = [edges[k] * scale, edges[k + 1] * scale];
    const last = blocks.at(-1);
    if (last !== undefined && from - last.to < narrowest)
      blocks[blocks.length - 1] = { ...last, to, isDense: true };
    else blocks.push({ from, to, isDense: false });
  }
  return blocks;
}

/** Where each step begins, of as many as have room for their number. */
export function stepMarks(
  { steps }: PulsePattern,
  width: number,
  room: number,
): { step: number; at: number }[] {
  const whole = patternMs({ steps, endless: false });
  const marks: { step: number; at: number }[] = [];
  let ms = 0;
  steps.forEach(({ onMs, offMs, repeats }, k) => {
    const at = (ms / whole) * width;
    if (marks.length === 0 || at - (marks.at(-1)?.at ?? 0) >= room) marks.push({ step: k + 1, at });
    ms += (onMs + offMs) * repeats;
  });
  return marks;
}

/** Round times for the axis, in ms: at most `most` parts of 1, 2 or 5 times a power of ten. */
export function axisTimes(wholeMs: number, most: number): number[] {
  let part = 1;
  for (let k = 0; wholeMs / part > most; k += 1) part *= k % 3 === 1 ? 2.5 : 2;
  return Array.from({ length: Math.floor(wholeMs / part) + 1 }, (_, k) => k * part);
}
