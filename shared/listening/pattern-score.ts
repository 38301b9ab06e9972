import { patternMs, type PulsePattern } from '../contract/pulse-pattern.ts';
import type { Score, ScoreEvent } from './sound.ts';

/** Edges of a pass that are kept: more than this sound for an hour and more. */
const mostEdges = 2 * 64 * 255;

/**
 * Milliseconds at which the tone of one pass comes (even places) and goes (odd places), from 0 on. Pulses without a
 * pause between them are one.
 */
export function patternEdges({ steps }: PulsePattern): Float64Array {
  const edges = new Float64Array(mostEdges);
  let count = 0;
  let atMs = 0;
  for (const { onMs, offMs, repeats } of steps) {
    for (let turn = 0; turn < repeats; turn += 1) {
      // A pulse that begins where the last one ends goes on in its place.
      if (count > 0 && edges[count - 1] === atMs) count -= 1;
      else edges[count++] = atMs;
      edges[count++] = atMs + onMs;
      atMs += onMs + offMs;
    }
  }
  return edges.slice(0, count);
}

/**
 * A pattern for the player: the gate opens and closes at the edges, and an endless one begins again with the end of
 * its last pause.
 */
export function patternScore(pattern: PulsePattern): Score {
  const edges = patternEdges(pattern);
  const events = Array.from(edges, (ms, k): ScoreEvent => ({ atSeconds: ms / 1000, gate: k % 2 === 0 }));
  if (!pattern.endless) return { events };
  const totalMs = patternMs(pattern);
  // Where the last pulse runs into the first of the next pass, the gate stays open over the seam.
  if (edges[edges.length - 1] === totalMs) events.pop();
  return { events, repeatSeconds: totalMs / 1000 };
}
