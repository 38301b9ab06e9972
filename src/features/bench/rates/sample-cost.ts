import { sampleCosts, type SampleCost } from '../../../../shared/firmware/index.ts';
import type { SelectOption } from '../../../components/index.ts';
import { ownCost, type RateWishes } from './wishes.ts';

const targetNames: Readonly<Record<string, string>> = { avr: 'AVR', 'cortex-m': 'Cortex-M', riscv: 'RISC-V' };

const playbackNames: Readonly<Record<string, string>> = {
  loop: 'loop',
  accumulator: 'accumulator in a loop',
  timer: 'timer interrupt',
  'timer-accumulator': 'accumulator on a timer interrupt',
  'two-accumulators': 'two accumulators on a timer interrupt',
  once: 'once, on a timer interrupt',
};

const costs = new Map(sampleCosts().map((cost) => [cost.id, cost]));

/** Cycles that a sample is reckoned to cost: those of the playback code that is chosen, else one's own number. */
export const costCyclesOf = ({ costOf, costCycles }: Pick<RateWishes, 'costOf' | 'costCycles'>): number =>
  costs.get(costOf)?.inAll ?? costCycles;

/** Whose number counts; a code that is proven no more leaves one's own. */
export const chosenCost = ({ costOf }: Pick<RateWishes, 'costOf'>): string =>
  costs.has(costOf) ? costOf : ownCost;

/** One's own number, then every playback code that has a figure. */
export const costChoices = (ownCycles: number): SelectOption[] => [
  {
    value: ownCost,
    label: `Own number: ${ownCycles} cycles`,
    hint: 'What the handler or the loop takes, by your own measurement or count.',
  },
  ...[...costs.values()].map((cost) => ({ value: cost.id, label: labelOf(cost), hint: hintOf(cost) })),
];

function labelOf({ target, playback, table, found, inAll }: SampleCost): string {
  const unit = found === 'instructions' ? 'instructions, counted' : 'cycles';
  return `${targetNames[target] ?? target}, ${playbackNames[playback] ?? playback}, ${table}: ${inAll} ${unit}`;
}

function hintOf(cost: SampleCost): string {
  const { playback, found, figure, responseCycles, mainCycles, inAll } = cost;
  switch (found) {
    case 'handler cycles':
      return `Measured in a simulator: ${figure} cycles at most, plus ${responseCycles} as data sheets have a longer response, plus ${mainCycles} for the longest main instruction, the jump it waits in: ${inAll} in all. A main program with calls and returns has instructions of 4 cycles or 5: add the difference. ${entryOf(cost)}`;
    case 'loop cycles':
      return `Measured in a simulator: ${figure} cycles from word to word, always. No timer paces a loop.`;
    case 'instructions':
      return `Counted in the disassembly, not measured: ${figure} instructions ${playback === 'loop' ? 'a turn' : 'in the handler'}, taken for a cycle each. Response, slower instructions and wait states come on top.`;
  }
}

function entryOf({ entryVariesBy: own, entryVariesWithCalls: busy }: SampleCost): string {
  if (own === undefined) return '';
  return `From the timer’s match to the write the time varies by ${own} ${own === 1 ? 'cycle' : 'cycles'}, with calls and returns by ${busy}: measured at every alignment.`;
}
