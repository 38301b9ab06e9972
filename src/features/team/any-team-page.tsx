import { Link, Navigate } from 'react-router-dom';
import { useCurrentTeam } from '../../api/current-team.ts';
import { EmptyState } from '../../components/index.ts';
import { WithAccount } from '../../forms/with-account.tsx';
import { boardsPath, paths, reviewsPath, tablesPath, teamPath } from '../../paths.ts';

const places = {
  tables: {
    why: 'The library holds a team’s tables with all their revisions: found again, listened to, exported, shared.',
    lead: 'Tables are saved for a team.',
    pathOf: (team: string) => tablesPath(team),
  },
  boards: {
    why: 'Boards are what a team’s tables play on. The bench shows an example board without signing in.',
    lead: 'Boards are kept for a team.',
    pathOf: boardsPath,
  },
  reviews: {
    why: 'In a team one makes a table and another vets it. What waits for you is here once you are signed in.',
    lead: 'A table is vetted by somebody of its team.',
    pathOf: reviewsPath,
  },
  team: {
    why: 'A team shares a library of tables. Its members are here once you are signed in.',
    lead: 'Tables are saved for a team.',
    pathOf: teamPath,
  },
} as const;

type Place = keyof typeof places;

/** Goes on to the team in use, or says what to do first. */
export function AnyTeamPage({ place }: { place: Place }) {
  return <WithAccount why={places[place].why}>{() => <InUse place={place} />}</WithAccount>;
}

function InUse({ place }: { place: Place }) {
  const team = useCurrentTeam();
  const { lead, pathOf } = places[place];
  if (team !== undefined) return <Navigate to={pathOf(team.teamSlug)} replace />;
  return (
    <EmptyState
      isPlace
      title="You belong to no team yet"
      actions={
        <Link to={paths.newTeam} className="button button-primary">
          Make a team
        </Link>
      }
    >
      <p>{lead} Make one, for yourself or with others, or open the invitation in your mail.</p>
    </EmptyState>
  );
}
