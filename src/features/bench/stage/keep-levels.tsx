import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { includesRole } from '../../../../shared/contract/index.ts';
import { useAccount } from '../../../api/account-state.ts';
import { boardQueries, readCurrentBoard, reviseBoard, type TaggedBoard } from '../../../api/boards.ts';
import { newKey } from '../../../api/new-key.ts';
import { ProblemError } from '../../../api/problem-error.ts';
import { Button, useToast } from '../../../components/index.ts';
import { ProblemNotice } from '../../../forms/problem-notice.tsx';
import { useSubmit } from '../../../forms/use-submit.ts';
import { sameValue } from '../state/same-value.ts';
import { useBoardAt } from './chosen-board.ts';

interface Keeping {
  readonly onto: TaggedBoard;
  readonly key: string;
}

/** Writes what was measured down with the chosen board, as its next revision; for who may change boards. */
export function KeepLevels({ volts }: { volts: readonly number[] }) {
  const { at } = useBoardAt();
  const role = useAccount()?.memberships.find(({ teamSlug }) => teamSlug === at?.team)?.role;
  const { team, board } = at ?? { team: '', board: '' };
  const { data } = useQuery({ ...boardQueries.detail(team, board), enabled: at !== null });
  const queryClient = useQueryClient();
  const toast = useToast();
  const [theirs, setTheirs] = useState<TaggedBoard | null>(null);
  const [key, setKey] = useState(newKey);

  const take = async (changed: TaggedBoard) => {
    await queryClient.invalidateQueries({ queryKey: boardQueries.all(team) });
    queryClient.setQueryData(boardQueries.detail(team, changed.slug).queryKey, changed);
  };
  const keeping = useSubmit(async ({ onto, key: own }: Keeping) => {
    try {
      const body = { board: { ...onto.board, levels: [...volts] }, note: 'Levels as measured' };
      const kept = await reviseBoard(team, board, body, { ifMatch: onto.etag, key: own });
      setTheirs(null);
      setKey(newKey());
      await take(kept);
      toast({
        message: `The levels are kept as revision ${kept.latestRevision} of ${kept.board.name}.`,
        tone: 'good',
      });
    } catch (error) {
      if (error instanceof ProblemError && error.status === 412) {
        setTheirs(readCurrentBoard(error.current));
        setKey(newKey());
      }
      throw error;
    }
  });

  if (data === undefined || role === undefined || !includesRole(role, 'author')) return null;
  const onto = theirs ?? data;
  if (onto.isRetired || volts.length !== 2 ** onto.board.output.bits) return null;
  if (sameValue(onto.board.levels, volts)) {
    return (
      <p role="status" className="figure-note">
        {onto.board.name} has these levels as its measured ones.
      </p>
    );
  }
  return (
    <div className="space-y-2">
      {theirs !== null ? (
        <p role="alert" className="figure-note">
          {theirs.board.name} has been changed meanwhile and is at revision {theirs.latestRevision} now.
          Nothing of that is lost: the levels go onto it.
        </p>
      ) : (
        <ProblemNotice fault={keeping.fault} onTryAgain={() => void keeping.submit({ onto, key })} />
      )}
      <Button
        size="small"
        isDisabled={keeping.isBusy}
        disabledReason="The levels are being kept."
        onPress={() => void keeping.submit({ onto, key })}
      >
        {onto.board.levels === undefined ? 'Keep the levels with' : 'Replace the measured levels of'}{' '}
        {onto.board.name}
      </Button>
    </div>
  );
}
