import type { Board } from '../../../../shared/contract/index.ts';
import { boardOptionsFor, boardShare, pinOptions, type Target } from '../../../../shared/firmware/index.ts';
import type { OptionOrigin } from '../../../components/code/index.ts';
import { optionLabels } from '../../../components/code/option-words.ts';
import { Button } from '../../../components/index.ts';
import type { TypedOptions } from './render-export.ts';

interface Chosen {
  readonly target: Target;
  readonly board: Board;
  /** Options as they were set by hand. */
  readonly typed: TypedOptions;
  readonly onTake: (options: TypedOptions) => void;
}

const plainPorts = ['port', 'highPort'];

/**
 * What stands beside an option that the chosen board has a say in: that it is the board's, or that it is set by hand,
 * with the way back to the board's.
 */
export function originFrom({ target, board, typed, onTake }: Chosen, name: string): OptionOrigin | undefined {
  const { taken, byHand } = boardShare(target, board, typed);
  if (name in taken) return { says: `From the board ${board.name}.` };
  if (!byHand.includes(name)) return undefined;
  const offered = boardOptionsFor(target, board)[name];
  const says =
    offered === undefined
      ? `Set by hand: the pins of the board ${board.name} are not taken.`
      : typed[name] === offered
        ? `Set by hand, to what the board ${board.name} has.`
        : `Set by hand; the board ${board.name} has ${offered === '' ? 'none' : offered}.`;
  return {
    says,
    action: (
      <Button
        size="small"
        variant="quiet"
        aria-label={`Take the board’s: ${optionLabels[name] ?? name}`}
        onPress={() => onTake(withoutHand(name))}
      >
        Take the board’s
      </Button>
    ),
  };
}

/** What is by hand no more where the board's value of an option is to count: with a map, ports without one. */
export const withoutHand = (name: string): TypedOptions =>
  Object.fromEntries(
    (name === 'portMap' || plainPorts.includes(name) ? ['portMap', ...plainPorts] : [name]).map((each) => [
      each,
      undefined,
    ]),
  );

/** The board's options as a person counts them: the clock, the pins. */
export function groupsOf(names: readonly string[]): string[] {
  const isPin = (name: string) => pinOptions.includes(name) || plainPorts.includes(name);
  return [...(names.includes('clockHz') ? ['clock'] : []), ...(names.some(isPin) ? ['pins'] : [])];
}
