import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { limits, type Board } from '../../../../shared/contract/index.ts';
import { boardQueries } from '../../../api/boards.ts';
import { asProblem, type ProblemError } from '../../../api/problem-error.ts';
import { exampleBoard } from '../../../boards/index.ts';
import { useDefinition } from '../state/use-bench.ts';
import { useBoardAt } from './chosen-board.ts';

export type StageBoard =
  | { readonly kind: 'there'; readonly board: Board }
  | { readonly kind: 'waiting' }
  | { readonly kind: 'failed'; readonly problem: ProblemError; readonly tryAgain: () => void };

/** The chosen board as it is now; the example has as many bits as the table. */
export function useStageBoard(): StageBoard {
  const { at } = useBoardAt();
  const tableBits = useDefinition(({ table }) => table.bits);
  const { data, error, refetch } = useQuery({
    ...boardQueries.detail(at?.team ?? '', at?.board ?? ''),
    enabled: at !== null,
  });
  const { min, max } = limits.bits;
  const bits = Number.isInteger(tableBits) ? Math.min(max, Math.max(min, tableBits)) : 8;
  const example = useMemo(() => exampleBoard(bits), [bits]);
  if (at === null) return { kind: 'there', board: example };
  if (data !== undefined) return { kind: 'there', board: data.board };
  if (error) return { kind: 'failed', problem: asProblem(error), tryAgain: () => void refetch() };
  return { kind: 'waiting' };
}
