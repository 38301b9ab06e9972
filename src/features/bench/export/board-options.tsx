import type { Board, Problem } from '../../../../shared/contract/index.ts';
import { boardShare, notTakenOf, pinOptions, type Target } from '../../../../shared/firmware/index.ts';
import { Button, icons } from '../../../components/index.ts';
import { groupsOf } from './board-origins.tsx';
import type { TypedOptions } from './render-export.ts';

interface BoardOptionsProps {
  board: Board;
  target: Target;
  /** Options as they were set by hand. */
  typed: TypedOptions;
  /** What the target cannot take as the options are. */
  problems: readonly Problem[];
  onSet: (options: TypedOptions) => void;
}

/** What the files have from the chosen board, as `render --board` takes it, what not, and what stands in its place. */
export function BoardOptions({ board, target, typed, problems, onSet }: BoardOptionsProps) {
  const { taken, byHand } = boardShare(target, board, typed);
  const ours = groupsOf(Object.keys(taken));
  const hands = groupsOf(byHand);
  const refused = problems.find(({ path }) => pinOptions.some((name) => path === `options.${name}`));
  const isMapRefused = refused !== undefined && 'portMap' in taken;
  return (
    <section className="board-share" aria-label={`From the board ${board.name}`}>
      <p>
        {ours.length > 0 && !isMapRefused && '✓ '}
        From the board <strong>{board.name}</strong>: {ours.join(' and ') || 'nothing'}.
        {hands.length > 0 && ` Set by hand: ${hands.join(' and ')}; that stays whatever board is chosen.`}
      </p>
      {notTakenOf(target, board).map((phrase) => (
        <p key={phrase}>✗ Not taken: {phrase}.</p>
      ))}
      {isMapRefused && (
        <div className="slab slab-oxide" role="status">
          <icons.fault className="slab-sign" />
          <div className="space-y-2">
            <p>
              The pins of {board.name} do not go with this table and these options: see the port map below,
              and what is allowed there.
            </p>
            <Button size="small" onPress={() => onSet({ portMap: '' })}>
              Go without its pins
            </Button>
          </div>
        </div>
      )}
    </section>
  );
}
