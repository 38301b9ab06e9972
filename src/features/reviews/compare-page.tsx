import './reviews.css';
import { useQuery, useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import { Link, useParams, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { chooseTeam } from '../../api/current-team.ts';
import { asProblem } from '../../api/problem-error.ts';
import { tableQueries } from '../../api/tables.ts';
import { teamQueries } from '../../api/teams.ts';
import { Button, EmptyState, Page, Waiting } from '../../components/index.ts';
import { load } from '../../forms/load.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { revisionText, tablesPath, teamPath } from '../../paths.ts';
import { CompareView } from './compare/compare-view.tsx';
import type { FiguresOf } from './compare/figures-part.tsx';
import { RevisionPicker } from './compare/revision-picker.tsx';
import { readPicked, type Picked } from './compare/picked.ts';

export const compareLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const team = args.params.team ?? '';
  await load(args, queryClient.query(teamQueries.detail(team)));
  chooseTeam(team);
  return null;
};

/** Any two revisions side by side, of one table or of two. */
export function ComparePage({ figuresOf }: { figuresOf: FiguresOf }) {
  const { team = '' } = useParams();
  return <Compare key={team} slug={team} figuresOf={figuresOf} />;
}

function Compare({ slug, figuresOf }: { slug: string; figuresOf: FiguresOf }) {
  const { data: team } = useSuspenseQuery(teamQueries.detail(slug));
  const [parameters, setParameters] = useSearchParams();
  const [a, b] = [readPicked(parameters.get('a')), readPicked(parameters.get('b'))];
  const pick = (part: { a?: Picked; b?: Picked }) =>
    setParameters(
      (before) => {
        for (const side of ['a', 'b'] as const) {
          const picked = part[side];
          if (picked !== undefined) before.set(side, revisionText(picked.table, picked.number));
        }
        return before;
      },
      { preventScrollReset: true },
    );
  return (
    <Page
      title="Compare"
      size="wide"
      trail={
        <>
          <Link to={teamPath(slug)}>{team.name}</Link>
          <span aria-hidden="true">/</span>
          <Link to={tablesPath(slug)}>Tables</Link>
        </>
      }
      lead={<p>Differences are told from the first to the second.</p>}
    >
      <div className="compare-pickers">
        <RevisionPicker title="First" team={slug} picked={a} onPick={(next) => pick({ a: next })} />
        <div className="compare-swap">
          <Button
            isDisabled={a === null || b === null}
            disabledReason="Choose both first"
            onPress={() => {
              if (a !== null && b !== null) pick({ a: b, b: a });
            }}
          >
            Swap
          </Button>
        </div>
        <RevisionPicker title="Second" team={slug} picked={b} onPick={(next) => pick({ b: next })} />
      </div>
      {a !== null && b !== null ? (
        <Both team={slug} a={a} b={b} figuresOf={figuresOf} />
      ) : (
        <EmptyState title="Choose two revisions">
          <p>
            Of one table, to see what a change has done, or of two. What is chosen stands in the address, so
            that it can be sent to somebody.
          </p>
        </EmptyState>
      )}
    </Page>
  );
}

interface BothProps {
  team: string;
  a: Picked;
  b: Picked;
  figuresOf: FiguresOf;
}

function Both({ team, a, b, figuresOf }: BothProps) {
  const [first, second] = [
    useQuery(tableQueries.detail(team, a.table)),
    useQuery(tableQueries.detail(team, b.table)),
  ];
  const error = first.error ?? second.error;
  if (error) return <ProblemNotice fault={asProblem(error)} onTryAgain={() => void first.refetch()} />;
  if (first.data === undefined || second.data === undefined) return <Waiting>Reading the tables…</Waiting>;
  if (a.table === b.table && a.number === b.number) {
    return (
      <EmptyState title="Both are the same revision">
        <p>Choose another number for one of them.</p>
      </EmptyState>
    );
  }
  return (
    <CompareView
      key={`${revisionText(a.table, a.number)} ${revisionText(b.table, b.number)}`}
      a={{ team, ...a, title: first.data.title }}
      b={{ team, ...b, title: second.data.title }}
      figuresOf={figuresOf}
    />
  );
}
