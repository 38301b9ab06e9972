import { teamSchema, type Team } from '../../../shared/contract/index.ts';
import { ProblemError } from '../../api/problem-error.ts';

/** The team as it is now, where a change of it came too late (412); null for any other error. */
export function teamOfLostRace(error: unknown): (Team & { etag: string }) | null {
  if (!(error instanceof ProblemError) || error.status !== 412) return null;
  const { data } = teamSchema.safeParse(error.current);
  // The server makes its entity tags of the version.
  return data === undefined ? null : { ...data, etag: `"${data.version}"` };
}
