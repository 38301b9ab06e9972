import { useQuery } from '@tanstack/react-query';
import { asProblem } from '../../../api/problem-error.ts';
import { tableQueries, type TaggedTable } from '../../../api/tables.ts';
import { Moment, Waiting } from '../../../components/index.ts';
import { ProblemNotice } from '../../../forms/problem-notice.tsx';
import { tablePath } from '../../../paths.ts';
import { StairDrawing } from '../../../plots/index.ts';
import { useBench, useDefinition } from '../state/use-bench.ts';
import { differencesOf } from './differences.ts';
import type { SavedLink } from './saved-links.ts';

interface ConflictProps {
  link: SavedLink;
  /** The table as somebody else has left it. */
  theirs: TaggedTable;
}

/** Both sides of a save that came second: what is on the bench, and what is in the library by now. */
export function Conflict({ link, theirs }: ConflictProps) {
  const number = theirs.latestRevision;
  if (number === link.newest) {
    return (
      <section className="slab slab-saffron" aria-label="Both sides">
        <p role="alert">
          <strong>{theirs.changedBy.name} has changed the table’s name, tags or state meanwhile.</strong> It
          is now {theirs.title}; revision {number} is still the newest. Nothing stands in the way of yours.
        </p>
      </section>
    );
  }
  return (
    <section className="slab slab-saffron" aria-label="Both sides">
      <div className="min-w-0 grow space-y-3">
        <p role="alert">
          <strong>Somebody else was faster.</strong> Revision {number} was saved while you worked on revision{' '}
          {link.revision}. Save yours as the next one, or look at theirs first; nothing of yours is lost.
        </p>
        <Sides link={link} theirs={theirs} />
      </div>
    </section>
  );
}

function Sides({ link, theirs }: ConflictProps) {
  const number = theirs.latestRevision;
  const { data: revision, error, refetch } = useQuery(tableQueries.revision(link.team, link.table, number));
  const mine = useBench((state) => state.table);
  const definition = useDefinition((whole) => whole);
  if (error) return <ProblemNotice fault={asProblem(error)} onTryAgain={() => void refetch()} />;
  if (revision === undefined) return <Waiting>Reading revision {number}…</Waiting>;
  const { differences, others } = differencesOf(definition, revision.definition);
  return (
    <>
      <div className="sides">
        <div className="side">
          <h3>Mine, on the bench</h3>
          {mine !== null && (
            <StairDrawing codes={mine.codes} bits={mine.definition.table.bits} label="Staircase of mine" />
          )}
          <p>Begun from revision {link.revision}.</p>
        </div>
        <div className="side">
          <h3>Theirs, revision {number}</h3>
          <StairDrawing
            codes={revision.codes}
            bits={revision.bits}
            label={`Staircase of revision ${number}`}
          />
          <p>
            {revision.madeBy.name}, <Moment at={revision.madeAt} />
            {revision.note !== '' && `: ${revision.note}`}
          </p>
          <p>
            <a
              className="link"
              href={tablePath(link.team, link.table, number)}
              target="_blank"
              rel="noreferrer"
            >
              Look at theirs in a new tab
            </a>
          </p>
        </div>
      </div>
      {differences.length === 0 ? (
        <p>Both are set alike: there is no difference between the waves.</p>
      ) : (
        <table className="ledger">
          <caption>What differs</caption>
          <thead>
            <tr>
              <th scope="col">Setting</th>
              <th scope="col">Mine</th>
              <th scope="col">Theirs</th>
            </tr>
          </thead>
          <tbody>
            {differences.map(({ name, mine: own, theirs: other }) => (
              <tr key={name}>
                <th scope="row">{name}</th>
                <td>{own}</td>
                <td>{other}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      {others > 0 && <p className="quiet">And {others} more.</p>}
    </>
  );
}
