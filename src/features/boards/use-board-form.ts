import { useState } from 'react';
import { checkBoard } from '../../../shared/contract/index.ts';
import { readCurrentBoard, type TaggedBoard } from '../../api/boards.ts';
import { newKey } from '../../api/new-key.ts';
import { ProblemError } from '../../api/problem-error.ts';
import { useKeptText } from '../../forms/use-kept-text.ts';
import { useSubmit, type Submitting } from '../../forms/use-submit.ts';
import { readDraft, type BoardDraft } from './draft.ts';

/** What is wrong at a path of the board, to stand beside its field. */
export type ProblemAt = (path: string) => string | undefined;

interface BoardForm {
  readonly draft: BoardDraft;
  readonly change: (update: (draft: BoardDraft) => BoardDraft) => void;
  readonly at: ProblemAt;
  readonly saving: Submitting<BoardDraft>;
  /** The board as somebody else has left it meanwhile. */
  readonly theirs: TaggedBoard | null;
  /** Whether the draft was begun earlier and found again. */
  readonly isKept: boolean;
  readonly letGo: () => void;
}

/** A board that is being described; what is typed is kept in this tab until it is saved. */
export function useBoardForm(
  name: string,
  fresh: () => BoardDraft,
  save: (draft: BoardDraft, key: string) => Promise<unknown>,
): BoardForm {
  const [text, setText] = useKeptText(name);
  const [first] = useState(fresh);
  const [isKept] = useState(text !== '');
  const [key, setKey] = useState(newKey);
  const [theirs, setTheirs] = useState<TaggedBoard | null>(null);
  const draft = readDraft(text) ?? first;
  const checked = checkBoard(draft.board);
  const problems = 'problems' in checked ? checked.problems : [];

  const saving = useSubmit(async (wanted: BoardDraft) => {
    if (problems.length > 0) {
      throw new ProblemError({
        kind: 'validation',
        status: 422,
        message: 'Some values are not allowed.',
        problems,
      });
    }
    try {
      await save(wanted, key);
    } catch (error) {
      if (error instanceof ProblemError && error.status === 412) setTheirs(readCurrentBoard(error.current));
      throw error;
    }
    setText('');
  });

  return {
    draft,
    change: (update) => {
      setText(JSON.stringify(update(draft)));
      setKey(newKey());
    },
    at: (path) => {
      const problem = problems.find((one) => one.path === path);
      return problem && `${problem.value} is not allowed. Allowed: ${problem.allowed}.`;
    },
    saving,
    theirs,
    isKept,
    letGo: () => {
      setText('');
      setTheirs(null);
    },
  };
}
