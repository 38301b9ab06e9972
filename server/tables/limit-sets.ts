import { asc, eq } from 'drizzle-orm';
import type { LimitSet } from '../../shared/contract/index.ts';
import type { Executor } from '../db/client.ts';
import { teamLimits } from '../db/schema/index.ts';

/** The limits of a team: the general ones first, then by tag. There are at most `limitSetsOfATeam`. */
export async function readLimitSets(db: Executor, teamId: number): Promise<LimitSet[]> {
  const rows = await db
    .select()
    .from(teamLimits)
    .where(eq(teamLimits.teamId, teamId))
    .orderBy(asc(teamLimits.tag));
  return rows.map(presentLimitSet);
}

type LimitRow = Pick<typeof teamLimits.$inferSelect, 'id' | 'tag' | 'limits' | 'version'>;

export const presentLimitSet = ({ id, tag, limits, version }: LimitRow): LimitSet => ({
  id,
  tag: tag === '' ? null : tag,
  limits,
  version,
});
