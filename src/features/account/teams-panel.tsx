import { Link } from 'react-router-dom';
import type { Account } from '../../../shared/contract/index.ts';
import { Panel } from '../../components/index.ts';
import { paths, teamPath } from '../../paths.ts';

export function TeamsPanel({ memberships }: Pick<Account, 'memberships'>) {
  return (
    <Panel
      title="Teams"
      actions={
        <Link to={paths.newTeam} className="button button-plain button-small">
          Make a team
        </Link>
      }
    >
      {memberships.length === 0 ? (
        <p className="quiet">
          You belong to no team yet. Tables are saved for a team; you can be its only member.
        </p>
      ) : (
        <ul className="team-lines">
          {memberships.map(({ teamSlug, teamName, role }) => (
            <li key={teamSlug}>
              <Link to={teamPath(teamSlug)}>{teamName}</Link>
              <span className="quiet">{role}</span>
            </li>
          ))}
        </ul>
      )}
    </Panel>
  );
}
