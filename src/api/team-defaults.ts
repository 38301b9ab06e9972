import { useEffect, useState } from 'react';
import type { TeamDefaults } from '../../shared/contract/index.ts';
import { useCurrentTeam } from './current-team.ts';

const known = new Map<string, Promise<TeamDefaults | null>>();

/** Called when a team's defaults were changed from this page. */
export const forgetTeamDefaults = (team: string): void => void known.delete(team);

function readDefaults(team: string): Promise<TeamDefaults | null> {
  const reading =
    known.get(team) ??
    import('./teams.ts')
      .then(({ readTeam }) => readTeam(team))
      .then(({ defaults }) => defaults)
      .catch(() => {
        known.delete(team);
        return null;
      });
  known.set(team, reading);
  return reading;
}

export interface TeamStart {
  readonly teamName: string;
  readonly defaults: TeamDefaults;
}

/** What a new table of the team in use begins with; null while that is not known, and where there is no team. */
export function useTeamStart(): TeamStart | null {
  const team = useCurrentTeam();
  const [read, setRead] = useState<{ slug: string; defaults: TeamDefaults | null } | null>(null);
  const slug = team?.teamSlug;
  useEffect(() => {
    if (slug === undefined) return;
    let isWanted = true;
    void readDefaults(slug).then((defaults) => {
      if (isWanted) setRead({ slug, defaults });
    });
    return () => {
      isWanted = false;
    };
  }, [slug]);
  if (team === undefined || read?.slug !== team.teamSlug || read.defaults === null) return null;
  return { teamName: team.teamName, defaults: read.defaults };
}
