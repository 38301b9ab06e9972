import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import type { Definition, Revision, Warning } from '../../../../../shared/contract/index.ts';
import type { Voice } from '../../../../../shared/listening/index.ts';
import { asProblem } from '../../../../api/problem-error.ts';
import { tableQueries } from '../../../../api/tables.ts';
import { asStored } from '../../../../workers/as-stored.ts';
import type { TableAnswer } from '../../../../workers/engine-messages.ts';
import { useTable } from '../../../../workers/use-table.ts';
import { useListening } from '../listening.tsx';
import { planSide } from './plan-side.ts';
import type { SideChoice } from './side-choice.ts';

export type SideState =
  | {
      readonly kind: 'ready';
      readonly voice: Voice;
      /** What it is: `the table of 8 bits`. */
      readonly words: string;
      readonly note: string | null;
    }
  | { readonly kind: 'waiting' }
  | { readonly kind: 'fault'; readonly fault: string };

/**
 * One of the two as a voice, its table built where it is not the bench's own.
 *
 * @param team whose library a revision is picked from
 */
export function useSide(choice: SideChoice, team: string | undefined): SideState {
  const { table, sound } = useListening();
  const { definition } = table;
  const { drive } = sound;
  const revision = useRevision(choice, team);
  const { data } = revision;
  const plan = useMemo(() => {
    const stored = data && {
      definition: data.revision.definition,
      words: `${data.title}, revision ${data.revision.number}`,
    };
    return planSide(choice, { definition, drive }, stored ?? null);
  }, [choice, definition, drive, data]);
  const built = useTable(plan.kind === 'build' ? plan.definition : null);

  return useMemo((): SideState => {
    if (choice.kind === 'revision' && team === undefined) {
      return { kind: 'fault', fault: 'Sign in to a team to hear another revision.' };
    }
    if (plan.kind === 'fault') return plan;
    if (plan.kind === 'own') {
      const values = plan.form === 'curve' ? table.cycle : table.values;
      return ready(values, definition, plan);
    }
    if (revision.fault !== null) return { kind: 'fault', fault: revision.fault };
    if (plan.kind === 'waiting' || built === null) return { kind: 'waiting' };
    if ('fault' in built) return { kind: 'fault', fault: built.fault };
    const made: TableAnswer =
      choice.kind === 'revision' && data !== undefined ? asStored(built.table, data.revision) : built.table;
    const note = [plan.note, leftOut(made.warnings)].filter((one) => one !== undefined).join(' ');
    return ready(made.values, plan.definition, { ...plan, form: 'staircase', note });
  }, [plan, built, table, definition, choice.kind, team, data, revision.fault]);
}

type Ready = Omit<Extract<SideState, { kind: 'ready' }>, 'kind' | 'voice' | 'note'> &
  Pick<Voice, 'form' | 'drive'> & { readonly note?: string };

function ready(values: Float64Array, { table }: Definition, { form, drive, words, note }: Ready): SideState {
  return {
    kind: 'ready',
    voice: {
      values: table.range === 'unipolar' ? values.map((value) => 2 * value) : values,
      cycles: table.cycles,
      form,
      ...(drive && { drive }),
    },
    words,
    note: note === undefined || note === '' ? null : note,
  };
}

const leftOut = (warnings: readonly Warning[]) =>
  warnings.find(({ code }) => code === 'partial-above-nyquist')?.message;

interface RevisionState {
  readonly data: { readonly revision: Revision; readonly title: string } | undefined;
  readonly fault: string | null;
}

function useRevision({ kind, picked }: SideChoice, team: string | undefined): RevisionState {
  const isWanted = kind === 'revision' && picked !== null && team !== undefined;
  const [inTeam, table, number] = [team ?? '', picked?.table ?? '', picked?.number ?? 1];
  const revision = useQuery({ ...tableQueries.revision(inTeam, table, number), enabled: isWanted });
  const detail = useQuery({ ...tableQueries.detail(inTeam, table), enabled: isWanted });
  const error = revision.error ?? detail.error;
  const [whole, title] = [revision.data, detail.data?.title];
  const data = useMemo(
    () => (!isWanted || whole === undefined || title === undefined ? undefined : { revision: whole, title }),
    [isWanted, whole, title],
  );
  return { data, fault: isWanted && error ? asProblem(error).message : null };
}
