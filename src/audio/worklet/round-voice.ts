import { readRound } from '../../../shared/listening/cycle.ts';
import type { Pitch, PitchGrid, VoiceProgram } from '../player-messages.ts';
import { loopHzOf, type Performed } from './performed.ts';

/** Frames over which one grid gives way to that of another pitch: they differ in their highest lines only. */
const changeFrames = 64;
/** Grids of pitches that were performed, the oldest forgotten first. */
const mostGrids = 256;
/** A pitch that was rounded once more than its grid's is still that pitch. */
const slack = 1 - 1e-9;

/** Reads a round of a wave, over and over, at the rate of its pitch. */
export class RoundVoice {
  readonly #rateHz: number;
  readonly #pitch: Pitch;
  readonly #grids: PitchGrid[];
  #grid: PitchGrid;
  #before: PitchGrid;
  #changing = 0;
  #loopHz: number;
  #step: number;
  /** Of the next frame, in rounds, 0 ≤ phase < 1. */
  #phase: number;

  /** @param phase of its first frame, in rounds */
  constructor(
    { pitch, grids }: VoiceProgram & { kind: 'round' },
    rateHz: number,
    performed: Performed,
    phase: number,
  ) {
    this.#rateHz = rateHz;
    this.#pitch = pitch;
    this.#grids = [...grids];
    this.#loopHz = loopHzOf(pitch, performed);
    this.#step = this.#loopHz / rateHz;
    this.#phase = phase - Math.floor(phase);
    this.#grid = this.#before = this.#gridFor(this.#loopHz);
  }

  /** What is heard now, in rounds. */
  get heardPhase(): number {
    return this.#phase;
  }

  addGrids(grids: readonly PitchGrid[]): void {
    this.#grids.push(...grids);
    if (this.#grids.length > mostGrids) this.#grids.splice(0, this.#grids.length - mostGrids);
  }

  perform(performed: Performed): void {
    const loopHz = loopHzOf(this.#pitch, performed);
    if (loopHz === this.#loopHz) return;
    this.#loopHz = loopHz;
    this.#step = loopHz / this.#rateHz;
    const grid = this.#gridFor(loopHz);
    if (grid === this.#grid) return;
    this.#before = this.#grid;
    this.#grid = grid;
    this.#changing = changeFrames;
  }

  /** Fills `out[from … to − 1]`. */
  render(out: Float32Array, from: number, to: number): void {
    const { grid, size } = this.#grid;
    const step = this.#step;
    let phase = this.#phase;
    for (let i = from; i < to; i += 1) {
      let value = readRound(grid, size, phase);
      if (this.#changing > 0) {
        const before = readRound(this.#before.grid, this.#before.size, phase);
        value += (before - value) * (this.#changing / changeFrames);
        this.#changing -= 1;
      }
      out[i] = value;
      phase += step;
      if (phase >= 1) phase -= Math.floor(phase);
    }
    this.#phase = phase;
  }

  /** Goes on unheard. */
  skip(frames: number): void {
    const phase = this.#phase + frames * this.#step;
    this.#phase = phase - Math.floor(phase);
    this.#changing = 0;
  }

  /** The grid of the pitch itself or of the next above: none that would fold. */
  #gridFor(loopHz: number): PitchGrid {
    let best = this.#grids[0];
    for (const grid of this.#grids) {
      const [isFit, isBestFit] = [grid.upToHz >= loopHz * slack, best.upToHz >= loopHz * slack];
      if (isFit ? !isBestFit || grid.upToHz < best.upToHz : !isBestFit && grid.upToHz > best.upToHz)
        best = grid;
    }
    return best;
  }
}
