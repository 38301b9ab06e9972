import { boardOptionsFor, type Target } from '../../../../shared/firmware/index.ts';
import type { Board } from '../../../../shared/contract/index.ts';
import { Button } from '../../../components/index.ts';
import type { TypedOptions } from './render-export.ts';

interface BoardOptionsProps {
  board: Board;
  target: Target;
  /** What the target's options are set to now. */
  typed: TypedOptions;
  onTake: (options: TypedOptions) => void;
}

/** Takes over what the chosen board says of clock and pins, as `render --board` does; the fields show it then. */
export function BoardOptions({ board, target, typed, onTake }: BoardOptionsProps) {
  const options = boardOptionsFor(target, board);
  const names = Object.keys(options);
  if (names.length === 0) {
    return (
      <p className="figure-note">
        {target.title} takes neither clock nor pins from {board.name}.
      </p>
    );
  }
  const what = names.includes('portMap') ? 'Pins and clock' : 'The clock';
  if (names.every((name) => typed[name] === options[name])) {
    return (
      <p className="figure-note">
        ✓ {what} {names.includes('portMap') ? 'are those' : 'is that'} of {board.name}.
      </p>
    );
  }
  return (
    <Button size="small" onPress={() => onTake(options)}>
      Take {what.toLowerCase()} from {board.name}
    </Button>
  );
}
