import type { Board, Ladder } from '../contract/index.ts';
import type { StageParts } from './filter.ts';
import { outputOhmsOf, voltsOf } from './ladder-volts.ts';
import { pwmVolts } from './pwm.ts';

/** The ladder of a board; null where its output is none. An op-amp takes the load off the ladder. */
export function ladderOf({ output, supply, stage }: Board): Ladder | null {
  if (output.kind !== 'ladder') return null;
  const { bits, R, rungs, series, terminator, rHigh, rLow } = output;
  const load = stage.opAmp === undefined ? stage.load : undefined;
  return {
    bits,
    R,
    ...(rungs && { rungs }),
    ...(series && { series }),
    ...(terminator !== undefined && { terminator }),
    rHigh,
    rLow,
    ...supply,
    ...(load !== undefined && { load }),
  };
}

/**
 * Level of every code of a board, in V: as measured where it was measured; else of the ladder, or
 * `Vlow + span·code/2^b` of a converter, or the mean of the pulses, the load taken into account.
 */
export function boardVolts(board: Board): Float64Array {
  const { levels, output, supply } = board;
  if (levels !== undefined) return Float64Array.from(levels);
  const ladder = ladderOf(board);
  if (ladder !== null) return voltsOf(ladder);
  const { vHigh, vLow } = supply;
  const volts =
    output.kind === 'pwm'
      ? pwmVolts(output, supply)
      : Float64Array.from(
          { length: 2 ** output.bits },
          (_, code) => vLow + ((vHigh - vLow) * code) / 2 ** output.bits,
        );
  const kept = loadShare(board);
  return kept === 1 ? volts : volts.map((level) => vLow + (level - vLow) * kept);
}

/** Resistance of the converter's output for every code, in Ω, a load without op-amp included. */
export function boardOhms(board: Board): Float64Array {
  const ladder = ladderOf(board);
  if (ladder !== null) return outputOhmsOf(ladder);
  const { output } = board;
  const own = output.kind === 'ladder' ? 0 : output.outputOhms;
  return new Float64Array(2 ** output.bits).fill(own * loadShare(board));
}

/** What a load leaves of a converter's voltage: `load/(load + outputOhms)`. */
function loadShare({ output, stage }: Board): number {
  if (stage.load === undefined || stage.opAmp !== undefined || output.kind === 'ladder') return 1;
  return stage.load / (stage.load + output.outputOhms);
}

/** What follows the converter, for `stageGain`; the output resistance is the largest of all codes. */
export function stagePartsOf(board: Board): StageParts {
  const { outputCapacitanceF, opAmp, filter } = board.stage;
  return {
    outputOhms: boardOhms(board).reduce((a, b) => Math.max(a, b)),
    capacitanceF: outputCapacitanceF,
    ...(opAmp && { opAmp }),
    filter,
  };
}
