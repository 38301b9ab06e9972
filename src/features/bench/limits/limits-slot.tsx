import { lazy, Suspense } from 'react';
import { useAccount } from '../../../api/account-state.ts';
import { useCurrentTeam, type Membership } from '../../../api/current-team.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { useSavedView } from '../save/use-saved-links.ts';

/** The bench goes on without it where its program cannot be fetched. */
const LimitsOnBench = lazy(() =>
  import('./limits-on-bench.tsx').then(
    ({ LimitsOnBench }) => ({ default: LimitsOnBench }),
    () => ({ default: () => null }),
  ),
);

/** Whether the table on the bench keeps the team's limits; nothing for those who are in no team. */
export function LimitsSlot({ table }: { table: TableAnswer }) {
  const { link } = useSavedView();
  const own = useTeamOf(link?.team);
  const inUse = useCurrentTeam();
  const team = own ?? inUse;
  if (team === undefined) return null;
  const slug = own === undefined ? undefined : link?.table;
  return (
    <Suspense fallback={null}>
      <LimitsOnBench key={team.teamSlug} team={team} saved={slug} table={table} />
    </Suspense>
  );
}

/** The team that the work was saved for, where the one who is signed in belongs to it. */
function useTeamOf(slug: string | undefined): Membership | undefined {
  return useAccount()?.memberships.find(({ teamSlug }) => teamSlug === slug);
}
