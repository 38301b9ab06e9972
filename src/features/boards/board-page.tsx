import './boards.css';
import {
  useInfiniteQuery,
  useMutation,
  useQuery,
  useQueryClient,
  useSuspenseQuery,
  type QueryClient,
} from '@tanstack/react-query';
import { Link, useNavigate, useParams, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { includesRole } from '../../../shared/contract/index.ts';
import { boardQueries, copyBoard, setRetired, type TaggedBoard } from '../../api/boards.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { newKey } from '../../api/new-key.ts';
import { asProblem } from '../../api/problem-error.ts';
import { teamQueries } from '../../api/teams.ts';
import { boardLines, sayOutput } from '../../boards/index.ts';
import { Button, Moment, Page, Panel, Waiting, icons, useToast } from '../../components/index.ts';
import { load } from '../../forms/load.ts';
import { ProblemNotice } from '../../forms/problem-notice.tsx';
import { boardOnBenchPath, boardPath, boardsPath, editBoardPath, teamPath } from '../../paths.ts';

export const boardLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const { team = '', board = '' } = args.params;
  await load(
    args,
    Promise.all([
      queryClient.query(boardQueries.detail(team, board)),
      queryClient.query(teamQueries.detail(team)),
    ]),
  );
  void queryClient.infiniteQuery(boardQueries.revisions(team, board)).catch(() => undefined);
  chooseTeam(team);
  return null;
};

/** One board: a revision of it in words, and all the others. */
export function BoardPage() {
  const { team: teamSlug = '', board: slug = '' } = useParams();
  const { data: board } = useSuspenseQuery(boardQueries.detail(teamSlug, slug));
  const { data: team } = useSuspenseQuery(teamQueries.detail(teamSlug));
  const [parameters] = useSearchParams();
  const asked = Number(parameters.get('revision'));
  const isEarlier = Number.isInteger(asked) && asked >= 1 && asked < board.latestRevision;
  const number = isEarlier ? asked : board.latestRevision;
  const mayEdit = includesRole(team.myRole, 'author');
  return (
    <Page
      title={board.name}
      size="wide"
      trail={
        <>
          <Link to={teamPath(teamSlug)}>{team.name}</Link>
          <span aria-hidden="true">/</span>
          <Link to={boardsPath(teamSlug)}>Boards</Link>
        </>
      }
      lead={
        <p>
          {board.isRetired && <strong>Retired. </strong>}
          {sayOutput(board.outputKind, board.bits)}. Newest revision: {board.latestRevision}. Changed{' '}
          <Moment at={board.changedAt} /> by {board.changedBy.name}.
          {!mayEdit && ' As a viewer you read; changing takes the role author.'}
        </p>
      }
      actions={
        <>
          <Link to={boardOnBenchPath(teamSlug, slug)} className="button button-primary">
            Show on the bench
          </Link>
          {mayEdit && <BoardActions team={teamSlug} board={board} number={number} />}
        </>
      }
    >
      <Shown team={teamSlug} board={board} number={number} />
      <History team={teamSlug} board={board} shown={number} />
    </Page>
  );
}

interface PartProps {
  team: string;
  board: TaggedBoard;
  number: number;
}

function BoardActions({ team, board, number }: PartProps) {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const toast = useToast();
  const onError = (fault: Error) => toast({ message: fault.message, tone: 'fault' });
  const take = async (changed: TaggedBoard) => {
    await queryClient.invalidateQueries({ queryKey: boardQueries.all(team) });
    queryClient.setQueryData(boardQueries.detail(team, changed.slug).queryKey, changed);
  };
  const retiring = useMutation({
    mutationFn: (isRetired: boolean) => setRetired(team, board.slug, isRetired, newKey()),
    onSuccess: async (changed) => {
      await take(changed);
      toast(
        changed.isRetired
          ? { message: 'Retired.', action: { label: 'Undo', onPress: () => retiring.mutate(false) } }
          : 'It is in use again.',
      );
    },
    onError,
  });
  const copying = useMutation({
    mutationFn: () => copyBoard(team, board.slug, { revision: number }, newKey()),
    onSuccess: async (made) => {
      await take(made);
      toast({ message: `${made.name} begins with revision ${number} of ${board.name}.`, tone: 'good' });
      await navigate(boardPath(team, made.slug));
    },
    onError,
  });
  const isBusy = retiring.isPending || copying.isPending;
  return (
    <>
      {!board.isRetired && (
        <Link to={editBoardPath(team, board.slug)} className="button button-plain">
          Edit
        </Link>
      )}
      <Button icon={icons.copy} isDisabled={isBusy} onPress={() => copying.mutate()}>
        Copy
      </Button>
      <Button icon={icons.archive} isDisabled={isBusy} onPress={() => retiring.mutate(!board.isRetired)}>
        {board.isRetired ? 'Restore' : 'Retire'}
      </Button>
    </>
  );
}

function Shown({ team, board, number }: PartProps) {
  const isNewest = number === board.latestRevision;
  const { data, error, refetch } = useQuery({
    ...boardQueries.revision(team, board.slug, number),
    enabled: !isNewest,
  });
  const shown = isNewest ? board.board : data?.board;
  const note = isNewest ? board.revisions.at(0)?.note : data?.note;
  return (
    <Panel title={`Revision ${number}${isNewest ? ', the newest' : ` of ${board.latestRevision}`}`}>
      <ProblemNotice fault={error && asProblem(error)} onTryAgain={() => void refetch()} />
      {shown === undefined && !error && <Waiting>Reading revision {number}…</Waiting>}
      {note && <p>{note}</p>}
      {shown !== undefined && (
        <dl className="board-lines">
          {boardLines(shown).map(({ name, says }) => (
            <div key={name}>
              <dt>{name}</dt>
              <dd>{says}</dd>
            </div>
          ))}
        </dl>
      )}
      <p className="quiet">
        Limits of currents come from the data sheet of the part and are absolute maxima: check them there, and
        leave what matters to a qualified engineer. Nothing here is for the mains.
      </p>
    </Panel>
  );
}

function History({ team, board, shown }: Omit<PartProps, 'number'> & { shown: number }) {
  const { data, error, refetch, hasNextPage, fetchNextPage, isFetchingNextPage } = useInfiniteQuery(
    boardQueries.revisions(team, board.slug),
  );
  const revisions = data?.pages.flatMap(({ items }) => items);
  return (
    <Panel title="Revisions">
      <ProblemNotice fault={error && asProblem(error)} onTryAgain={() => void refetch()} />
      {revisions === undefined && !error && <Waiting>Reading the revisions…</Waiting>}
      {revisions !== undefined && (
        <>
          <div className="board-scroll" role="region" aria-label="Revisions" tabIndex={0}>
            <table className="ledger">
              <caption className="sr-only">Revisions, newest first</caption>
              <thead>
                <tr>
                  <th scope="col">Revision</th>
                  <th scope="col">Note</th>
                  <th scope="col">Output</th>
                  <th scope="col">Made</th>
                </tr>
              </thead>
              <tbody>
                {revisions.map(({ number, note, outputKind, bits, madeAt, madeBy }) => (
                  <tr key={number} aria-current={number === shown}>
                    <td>
                      <Link
                        to={boardPath(team, board.slug, number)}
                        className="link"
                        aria-label={`Revision ${number}`}
                        preventScrollReset
                      >
                        {number}
                      </Link>
                    </td>
                    <td>{note === '' ? <span className="quiet">no note</span> : note}</td>
                    <td>{sayOutput(outputKind, bits)}</td>
                    <td>
                      <Moment at={madeAt} /> <span className="quiet">{madeBy.name}</span>
                    </td>
                  </tr>
                ))}
              </tbody>
            </table>
          </div>
          <div className="pager">
            <span className="quiet">
              {revisions.length} of {board.latestRevision} shown. A revision never changes.
            </span>
            {hasNextPage && (
              <Button size="small" isDisabled={isFetchingNextPage} onPress={() => void fetchNextPage()}>
                Older ones
              </Button>
            )}
          </div>
        </>
      )}
    </Panel>
  );
}
