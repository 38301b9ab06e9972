/** The longest loop or pass that the preview renders, in seconds: 60 s at 48 kHz are 12 MB. */
export const longestPreviewSeconds = 60;

/** A loop buffer: `frames` frames of the context hold `rounds` rounds of the table, so that its end meets its start. */
export interface LoopPlan {
  readonly frames: number;
  readonly rounds: number;
  /** Rounds a second that are really played, `rounds·contextRate/frames`. */
  readonly loopHz: number;
  /** Highest multiple of `loopHz` below half of the context's rate; 0 where not even the first one is. */
  readonly highestLine: number;
}

/** A buffer of at least half a second costs little to loop and finds a whole number of frames close by. */
const shortestSeconds = 0.5;
const spanSeconds = 0.5;
const closeEnough = 1e-10;

/**
 * Finds how many rounds come closest to a whole number of frames. A round lasts `contextRate/loopHz` frames, rarely
 * a whole number; among all counts of rounds that last 0.5…1 s the best is taken. The relative error of the pitch is
 * at most `0.5/(0.5 s·contextRate)`, 0.04 cent at 44.1 kHz, and far less as soon as a second holds many rounds.
 *
 * @param loopHz rounds of the table a second, above 0
 * @param contextRateHz rate of the audio context, above 0
 */
export function planLoop(loopHz: number, contextRateHz: number): LoopPlan {
  const framesOfRound = contextRateHz / loopHz;
  const fewest = Math.max(1, Math.ceil(shortestSeconds * loopHz));
  const most = Math.max(fewest, Math.floor((shortestSeconds + spanSeconds) * loopHz));
  let rounds = fewest;
  let least = Infinity;
  for (let count = fewest; count <= most && least > closeEnough; count += 1) {
    const frames = Math.max(1, Math.round(count * framesOfRound));
    const error = Math.abs(frames / (count * framesOfRound) - 1);
    if (error < least) {
      least = error;
      rounds = count;
    }
  }
  const frames = Math.max(1, Math.round(rounds * framesOfRound));
  // `m·rounds/frames < ½` in whole numbers: a line on half of the rate itself cannot be played.
  const highestLine = Math.max(0, Math.ceil(frames / (2 * rounds)) - 1);
  return { frames, rounds, loopHz: (rounds * contextRateHz) / frames, highestLine };
}
