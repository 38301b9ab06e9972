import { Link, Navigate } from 'react-router-dom';
import { useCurrentTeam } from '../../api/current-team.ts';
import { EmptyState } from '../../components/index.ts';
import { WithAccount } from '../../forms/with-account.tsx';
import { paths, tablesPath, teamPath } from '../../paths.ts';

/** Goes on to the team in use, or says what to do first. */
export function AnyTeamPage({ place }: { place: 'tables' | 'team' }) {
  return (
    <WithAccount
      why={
        place === 'tables'
          ? 'The library holds a team’s tables with all their revisions: found again, listened to, exported, shared.'
          : 'A team shares a library of tables. Its members are here once you are signed in.'
      }
    >
      {() => <InUse place={place} />}
    </WithAccount>
  );
}

function InUse({ place }: { place: 'tables' | 'team' }) {
  const team = useCurrentTeam();
  if (team !== undefined) {
    return <Navigate to={place === 'tables' ? tablesPath(team.teamSlug) : teamPath(team.teamSlug)} replace />;
  }
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
      <p>
        Tables are saved for a team. Make one, for yourself or with others, or open the invitation in your
        mail.
      </p>
    </EmptyState>
  );
}
