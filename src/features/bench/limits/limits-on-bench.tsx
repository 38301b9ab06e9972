import './limits.css';
import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import type { Membership } from '../../../api/current-team.ts';
import { limitSetQueries } from '../../../api/limit-sets.ts';
import { tableQueries } from '../../../api/tables.ts';
import { checkLimits, limitSetsFor } from '../../../../shared/vetting/index.ts';
import { icons } from '../../../components/index.ts';
import { LimitList, sayStanding } from '../../../limits/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';

interface LimitsOnBenchProps {
  team: Membership;
  /** Slug of the table that the work was saved as; its tags' limits count too. */
  saved: string | undefined;
  table: TableAnswer;
}

/** Says with each new table whether the team's limits are kept; opened, it lists them. Nothing while none are set. */
export function LimitsOnBench({ team: { teamSlug, teamName }, saved, table }: LimitsOnBenchProps) {
  const { data: sets } = useQuery(limitSetQueries.list(teamSlug));
  const { data: tags } = useQuery({
    ...tableQueries.detail(teamSlug, saved ?? ''),
    enabled: saved !== undefined,
    select: ({ tags }) => tags,
  });
  const outcomes = useMemo(() => {
    const { report, definition } = table;
    const { length, bits } = definition.table;
    return checkLimits(limitSetsFor(sets ?? [], tags ?? []), { length, bits, report });
  }, [sets, tags, table]);
  if (outcomes.length === 0) return null;
  const areKept = outcomes.every(({ passed }) => passed);
  const Sign = areKept ? icons.good : icons.fault;
  return (
    <details className="bench-limits" data-kept={areKept}>
      <summary>
        <Sign width="18" height="18" />
        <span role="status">{sayStanding(outcomes)}</span>
        <span className="quiet">
          {teamName}
          {saved !== undefined && tags !== undefined && tags.length > 0 && `, tags ${tags.join(', ')}`}
        </span>
        <icons.chevron />
      </summary>
      <LimitList outcomes={outcomes} />
    </details>
  );
}
