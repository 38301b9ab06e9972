import type { Board } from '../../../shared/contract/index.ts';
import { boardLines } from '../../boards/index.ts';

/** What one typed beside what somebody else has saved meanwhile. */
export function BothBoards({ mine, theirs }: { mine: Board; theirs: Board }) {
  const [ours, others] = [mine, theirs].map(
    (board) => new Map(boardLines(board).map(({ name, says }) => [name, says])),
  );
  const names = [...new Set([...ours.keys(), ...others.keys()])].filter(
    (name) => ours.get(name) !== others.get(name),
  );
  return (
    <section className="slab slab-saffron" aria-label="Both sides">
      <div className="min-w-0 grow">
        <p role="alert">
          <strong>Somebody else has saved a revision of this board meanwhile.</strong>{' '}
          {names.length === 0
            ? 'It says the same as yours.'
            : 'Save yours after theirs or take theirs; until then nothing of yours is lost.'}
        </p>
        {names.length > 0 && (
          <div className="board-scroll" role="region" aria-label="Differences" tabIndex={0}>
            <table className="ledger">
              <thead>
                <tr>
                  <th scope="col">Setting</th>
                  <th scope="col">Mine</th>
                  <th scope="col">Theirs</th>
                </tr>
              </thead>
              <tbody>
                {names.map((name) => (
                  <tr key={name}>
                    <th scope="row">{name}</th>
                    <td>{ours.get(name) ?? '–'}</td>
                    <td>{others.get(name) ?? '–'}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          </div>
        )}
      </div>
    </section>
  );
}
