import './boards.css';
import { useInfiniteQuery, useQueryClient, useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate, useParams, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { includesRole, type BoardSummary } from '../../../shared/contract/index.ts';
import { boardQueries, createBoard } from '../../api/boards.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { newKey } from '../../api/new-key.ts';
import { asProblem } from '../../api/problem-error.ts';
import { teamQueries } from '../../api/teams.ts';
import { exampleBoardInput, sayOutput } from '../../boards/index.ts';
import { Button, ChoiceField, EmptyState, Moment, Page, Waiting } from '../../components/index.ts';
import { load } from '../../forms/load.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { boardPath, newBoardPath, teamPath } from '../../paths.ts';

type Retired = 'no' | 'yes';

const retiredOf = (parameters: URLSearchParams): Retired =>
  parameters.get('retired') === 'yes' ? 'yes' : 'no';

export const boardsLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const team = args.params.team ?? '';
  const retired = retiredOf(new URL(args.request.url).searchParams);
  await load(
    args,
    Promise.all([
      queryClient.query(teamQueries.detail(team)),
      queryClient.infiniteQuery(boardQueries.list(team, retired)),
    ]),
  );
  chooseTeam(team);
  return null;
};

/** What a team's tables play on. */
export function BoardsPage() {
  const { team: slug = '' } = useParams();
  const { data: team } = useSuspenseQuery(teamQueries.detail(slug));
  const [parameters, setParameters] = useSearchParams();
  const retired = retiredOf(parameters);
  const mayEdit = includesRole(team.myRole, 'author');
  return (
    <Page
      title="Boards"
      size="wide"
      trail={<Link to={teamPath(slug)}>{team.name}</Link>}
      lead={
        <p>
          A board is what tables play on: supply, converter, pins, op-amp, filter and clock.
          {!mayEdit && ' As a viewer you read them; changing takes the role author.'}
        </p>
      }
      actions={
        mayEdit && (
          <Link to={newBoardPath(slug)} className="button button-primary">
            New board
          </Link>
        )
      }
    >
      <ChoiceField
        label="Shown"
        value={retired}
        options={[
          { value: 'no', label: 'In use' },
          { value: 'yes', label: 'Retired' },
        ]}
        onChange={(next: Retired) => setParameters(next === 'yes' ? { retired: 'yes' } : {})}
      />
      <Found key={`${slug} ${retired}`} team={slug} retired={retired} mayEdit={mayEdit} />
    </Page>
  );
}

interface FoundProps {
  team: string;
  retired: Retired;
  mayEdit: boolean;
}

function Found({ team, retired, mayEdit }: FoundProps) {
  const { data, error, refetch, hasNextPage, fetchNextPage, isFetchingNextPage } = useInfiniteQuery(
    boardQueries.list(team, retired),
  );
  if (error) return <ProblemNotice fault={asProblem(error)} onTryAgain={() => void refetch()} />;
  if (data === undefined) return <Waiting>Reading the boards…</Waiting>;
  const boards = data.pages.flatMap(({ items }) => items);
  if (boards.length === 0) return <NoBoards {...{ team, retired, mayEdit }} />;
  return (
    <>
      <div className="board-scroll" role="region" aria-label="Boards" tabIndex={0}>
        <Rows team={team} boards={boards} />
      </div>
      {hasNextPage && (
        <div className="pager">
          <Button size="small" isDisabled={isFetchingNextPage} onPress={() => void fetchNextPage()}>
            More
          </Button>
        </div>
      )}
    </>
  );
}

function Rows({ team, boards }: { team: string; boards: readonly BoardSummary[] }) {
  return (
    <table className="ledger">
      <caption className="sr-only">Boards by name</caption>
      <thead>
        <tr>
          <th scope="col">Board</th>
          <th scope="col">Output</th>
          <th scope="col" className="is-number">
            Revision
          </th>
          <th scope="col">Changed</th>
        </tr>
      </thead>
      <tbody>
        {boards.map((board) => (
          <tr key={board.slug}>
            <td>
              <Link to={boardPath(team, board.slug)} className="link">
                {board.name}
              </Link>
            </td>
            <td>{sayOutput(board.outputKind, board.bits)}</td>
            <td className="is-number">{board.latestRevision}</td>
            <td>
              <Moment at={board.changedAt} /> <span className="quiet">{board.changedBy.name}</span>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function NoBoards({ team, retired, mayEdit }: FoundProps) {
  if (retired === 'yes') {
    return (
      <EmptyState title="No board is retired">
        <p>A board that is out of use can be retired; it keeps its revisions and can be restored.</p>
      </EmptyState>
    );
  }
  if (!mayEdit) {
    return (
      <EmptyState title="There are no boards yet">
        <p>They appear here once an author of the team makes one.</p>
      </EmptyState>
    );
  }
  return <FirstBoard team={team} />;
}

function FirstBoard({ team }: { team: string }) {
  const [key] = useState(newKey);
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const adding = useSubmit(async () => {
    const made = await createBoard(team, { board: exampleBoardInput(), note: 'A working example.' }, key);
    await queryClient.invalidateQueries({ queryKey: boardQueries.all(team) });
    await navigate(boardPath(team, made.slug));
  });
  return (
    <EmptyState
      title="There are no boards yet"
      actions={
        <>
          <Link to={newBoardPath(team)} className="button button-primary">
            Describe a board
          </Link>
          <Button isDisabled={adding.isBusy} onPress={() => void adding.submit(undefined)}>
            Add one working example
          </Button>
        </>
      }
    >
      <p>
        Describe the supply, the converter and its pins, and the bench shows volts, currents and the spectrum
        at the output. The example is an R-2R ladder of 8 bits on port B.
      </p>
      <ProblemNotice fault={adding.fault} />
    </EmptyState>
  );
}
