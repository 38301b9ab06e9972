import './boards.css';
import { useQueryClient, useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate, useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { includesRole, limits, outputLimits } from '../../../shared/contract/index.ts';
import { boardQueries, createBoard, reviseBoard, type TaggedBoard } from '../../api/boards.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { teamQueries } from '../../api/teams.ts';
import { exampleBoard, outputKindWords } from '../../boards/index.ts';
import {
  Button,
  Notice,
  Page,
  Panel,
  SelectField,
  TextField,
  useUnreadFields,
  useToast,
} from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { load } from '../../forms/load.ts';
import { WithAccount } from '../../forms/with-account.tsx';
import { boardPath, boardsPath, teamPath } from '../../paths.ts';
import { BothBoards } from './both-boards.tsx';
import { draftOf, withKind, type BoardDraft, type ChangeBoard } from './draft.ts';
import { BoundedField } from './fields.tsx';
import { OutputFields } from './output-fields.tsx';
import { PortMapFields } from './port-map-fields.tsx';
import { StageFields } from './stage-fields.tsx';
import { useBoardForm } from './use-board-form.ts';

export const boardFormLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const { team = '', board } = args.params;
  await load(
    args,
    Promise.all([
      queryClient.query(teamQueries.detail(team)),
      board === undefined ? null : queryClient.query(boardQueries.detail(team, board)),
    ]),
  );
  chooseTeam(team);
  return null;
};

/** A board that is not there yet. */
export function NewBoardPage() {
  const { team = '' } = useParams();
  return (
    <BoardForm
      key={team}
      team={team}
      title="New board"
      fresh={() => draftOf({ ...exampleBoard(), name: '' }, null)}
      current={null}
    />
  );
}

/** The next revision of a board. */
export function EditBoardPage() {
  const { team = '', board: slug = '' } = useParams();
  const { data: board } = useSuspenseQuery(boardQueries.detail(team, slug));
  return (
    <BoardForm
      key={slug}
      team={team}
      title={`Edit ${board.name}`}
      fresh={() => draftOf(board.board, board.etag)}
      current={board}
    />
  );
}

interface BoardFormProps {
  team: string;
  title: string;
  fresh: () => BoardDraft;
  /** The board to change; none where it is new. */
  current: TaggedBoard | null;
}

function BoardForm({ team, title, fresh, current }: BoardFormProps) {
  const { data } = useSuspenseQuery(teamQueries.detail(team));
  // Fields hold texts of their own; another number makes them anew.
  const [begun, setBegun] = useState(1);
  return (
    <Page
      title={title}
      size="medium"
      trail={
        <>
          <Link to={teamPath(team)}>{data.name}</Link>
          <span aria-hidden="true">/</span>
          <Link to={boardsPath(team)}>Boards</Link>
        </>
      }
      lead={<p>Numbers take units and prefixes as people write them: 4k7, 4.7 kΩ, 16 MHz, 20 mA.</p>}
    >
      {/* What is typed is kept as a person's own: who that is must be known before anything is typed. */}
      <WithAccount why="Boards are kept for a team.">
        {({ id }) => (
          <Fields
            key={`${begun} ${id}`}
            {...{ team, fresh, current }}
            maySave={includesRole(data.myRole, 'author')}
            onBeginAnew={() => setBegun(begun + 1)}
          />
        )}
      </WithAccount>
    </Page>
  );
}

function Fields({
  team,
  fresh,
  current,
  maySave,
  onBeginAnew,
}: Omit<BoardFormProps, 'title'> & { maySave: boolean; onBeginAnew: () => void }) {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const toast = useToast();
  const unread = useUnreadFields();
  const form = useBoardForm(
    `board ${team} ${current?.slug ?? 'new'}`,
    fresh,
    async ({ board, note, etag }, key) => {
      const body = { board, note };
      const ifMatch = form.theirs?.etag ?? etag ?? '';
      const made =
        current === null
          ? await createBoard(team, body, key)
          : await reviseBoard(team, current.slug, body, { ifMatch, key });
      await queryClient.invalidateQueries({ queryKey: boardQueries.all(team) });
      queryClient.setQueryData(boardQueries.detail(team, made.slug).queryKey, made);
      toast({ message: `Saved as revision ${made.latestRevision}.`, tone: 'good' });
      await navigate(boardPath(team, made.slug));
    },
  );
  const { draft, at, saving, theirs } = form;
  const { board, note } = draft;
  const change: ChangeBoard = (update) =>
    form.change((before) => ({ ...before, board: update(before.board) }));
  const beginAnew = () => {
    form.letGo();
    onBeginAnew();
  };
  return (
    <>
      {form.isKept && (
        <Notice
          actions={
            <Button size="small" onPress={beginAnew}>
              Begin anew
            </Button>
          }
        >
          What you typed here before is still there.
        </Notice>
      )}
      <Form
        label="Board"
        action={theirs === null ? 'Save the board' : 'Save mine as the next revision'}
        submitting={saving}
        onSubmit={() => void saving.submit(draft)}
        refusedBecause={
          maySave ? unreadIn(unread) : 'As a viewer you read boards; saving one takes the role author.'
        }
        fields={[]}
        aside={
          theirs !== null && (
            <Button
              onPress={() => {
                if (current)
                  queryClient.setQueryData(boardQueries.detail(team, current.slug).queryKey, theirs);
                form.letGo();
                void navigate(boardPath(team, theirs.slug));
              }}
            >
              Take theirs
            </Button>
          )
        }
      >
        <Panel title="Supply">
          <TextField
            label="Name"
            autoComplete="off"
            value={board.name}
            description={`${limits.nameLength.min} to ${limits.nameLength.max} characters.`}
            onChange={(name) => change((before) => ({ ...before, name }))}
            problem={saving.fault?.at('name') && at('name')}
          />
          <div className="field-pair">
            <BoundedField
              label="High rail"
              unit="V"
              bounds={outputLimits.volts}
              value={board.supply.vHigh}
              onChange={(vHigh) => change((before) => ({ ...before, supply: { ...before.supply, vHigh } }))}
              problem={at('supply.vHigh')}
            />
            <BoundedField
              label="Low rail"
              unit="V"
              bounds={outputLimits.volts}
              value={board.supply.vLow}
              onChange={(vLow) => change((before) => ({ ...before, supply: { ...before.supply, vLow } }))}
            />
          </div>
        </Panel>
        <Panel title="Output kind">
          <SelectField
            label="Converter"
            value={board.output.kind}
            options={(['ladder', 'on-chip', 'serial', 'pwm'] as const).map((value) => ({
              value,
              label: outputKindWords[value],
            }))}
            onChange={(kind) => form.change((before) => withKind(before, kind))}
          />
        </Panel>
        <OutputFields key={board.output.kind} {...{ board, change, at }} />
        <StageFields {...{ board, change, at }}>
          {board.output.kind === 'ladder' && (
            <PortMapFields
              output={board.output}
              onChange={(portMap) =>
                change((before) =>
                  before.output.kind === 'ladder'
                    ? { ...before, output: { ...before.output, portMap } }
                    : before,
                )
              }
              at={at}
            />
          )}
        </StageFields>
        <TextField
          label="Note"
          autoComplete="off"
          value={note}
          description="What is new in this revision."
          onChange={(next) => form.change((before) => ({ ...before, note: next }))}
          problem={saving.at('note')}
        />
        {theirs !== null && <BothBoards mine={board} theirs={theirs.board} />}
      </Form>
    </>
  );
}

const unreadIn = (fields: readonly { readonly label: string }[]): string | undefined =>
  fields.length === 0 ? undefined : `Put right first: ${fields.map(({ label }) => label).join(', ')}.`;
