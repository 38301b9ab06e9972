import { checkLadder, type Board, type Ladder } from '../../../../shared/contract/index.ts';
import { boardVolts, ladderOf, levelsFromWeights, voltsOf } from '../../../../shared/output-stage/index.ts';
import { readList } from '../../../boards/index.ts';
import { readLevels } from '../quantise/levels/read-levels.ts';
import type { FitWishes } from './fit-wishes.ts';

export type MeasuredVolts =
  | { readonly kind: 'nothing' }
  /** What is wrong stands beside its field, but for words that belong to none. */
  | { readonly kind: 'refused'; readonly why?: string }
  | { readonly kind: 'volts'; readonly volts: readonly number[] };

/** Voltage of each code from what was measured. */
export function measuredVolts(wishes: FitWishes, board: Board): MeasuredVolts {
  if (wishes.measured === 'board') return { kind: 'volts', volts: [...boardVolts(board)] };
  if (wishes.measured === 'resistors') return ofResistors(wishes, board);
  const isLevels = wishes.measured === 'levels';
  const reading = isLevels
    ? readLevels(wishes.levels, wishes.levelsComma)
    : readLevels(wishes.weights, wishes.weightsComma);
  if (reading.kind === 'nothing') return reading;
  if (reading.kind !== 'levels') return { kind: 'refused' };
  const { volts } = reading;
  if (!isLevels) {
    const { bits } = board.output;
    return volts.length === bits
      ? { kind: 'volts', volts: [...levelsFromWeights(volts, board.supply.vLow)] }
      : { kind: 'refused', why: `${volts.length} bit weights read; ${bits} bits need ${bits}, bit 0 first.` };
  }
  return Number.isInteger(Math.log2(volts.length)) && volts.length >= 2 && volts.length <= 65_536
    ? { kind: 'volts', volts }
    : {
        kind: 'refused',
        why: `${volts.length} voltages read; allowed: one for each code, 2, 4, 8 and so on up to 65536.`,
      };
}

function ofResistors({ rungs, series, terminator }: FitWishes, board: Board): MeasuredVolts {
  const own = ladderOf(board);
  if (own === null) return { kind: 'refused', why: 'The output of this board is no ladder.' };
  const lists = {
    rungs: readList(rungs, 'Ω'),
    series: readList(series, 'Ω'),
    terminator: readList(terminator, 'Ω'),
  };
  const given: Partial<Pick<Ladder, 'rungs' | 'series' | 'terminator'>> = {};
  for (const name of ['rungs', 'series', 'terminator'] as const) {
    const list = lists[name];
    if ('fault' in list) return { kind: 'refused' };
    if (list.numbers === undefined) continue;
    if (name !== 'terminator') given[name] = list.numbers;
    else if (list.numbers.length === 1) [given.terminator] = list.numbers;
    else return { kind: 'refused', why: 'Terminator: one resistance is allowed.' };
  }
  if (Object.keys(given).length === 0) return { kind: 'nothing' };
  const checked = checkLadder({ ...own, ...given });
  if ('problems' in checked) {
    const [{ path, value, allowed }] = checked.problems;
    return { kind: 'refused', why: `${path}: ${value} is not allowed. Allowed: ${allowed}.` };
  }
  return { kind: 'volts', volts: [...voltsOf(checked.ladder)] };
}
