import { and, eq, like, sql } from 'drizzle-orm';
import type { Executor } from '../../db/client.ts';
import { waveTables } from '../../db/schema/index.ts';
import { slugOfTitle } from '../../text/slugs.ts';

/** A title as part of an address; `table` where nothing of it is left. */
export const slugFrom = (title: string): string => slugOfTitle(title, 'table');

/** The smallest number n from 2 for which `base-n` and all after it are free in the team; 1 where `base` itself is. */
export async function firstFreeNumber(db: Executor, teamId: number, base: string): Promise<number> {
  const behind = sql`substring(${waveTables.slug}, ${base.length + 2})`;
  const [taken] = await db
    .select({ slug: waveTables.slug })
    .from(waveTables)
    .where(and(eq(waveTables.teamId, teamId), eq(waveTables.slug, base)));
  if (!taken) return 1;
  const [row] = await db
    .select({ last: sql<number | null>`max(cast(${behind} as unsigned))` })
    .from(waveTables)
    .where(
      and(
        eq(waveTables.teamId, teamId),
        like(waveTables.slug, `${base}-%`),
        sql`${behind} regexp '^[0-9]{1,9}$'`,
      ),
    );
  return Math.max(1, Number(row.last ?? 1)) + 1;
}
