import { useMatch, useNavigate } from 'react-router-dom';
import { useAccount } from '../api/account-state.ts';
import { chooseTeam, useCurrentTeam } from '../api/current-team.ts';
import { Menu, icons, useToast, type MenuItem } from '../components/index.ts';
import { paths, reviewsPath, tablesPath, teamPath } from '../paths.ts';

/** The team in use, and the others. On a place of a team it leads to the same place of the other one. */
export function TeamSwitcher() {
  const account = useAccount();
  const current = useCurrentTeam();
  const navigate = useNavigate();
  const toast = useToast();
  const isAtTables = useMatch(`${paths.tables}/*`) !== null;
  const isAtReviews = useMatch(paths.reviews) !== null;
  const isAtTeam = useMatch(paths.team) !== null;
  if (account === undefined || current === undefined) return null;

  const choose = (slug: string, name: string) => {
    chooseTeam(slug);
    if (isAtTables) void navigate(tablesPath(slug));
    else if (isAtReviews) void navigate(reviewsPath(slug));
    else if (isAtTeam) void navigate(teamPath(slug));
    else toast(`Tables are now saved for ${name}.`);
  };
  const items: MenuItem[] = account.memberships.map(({ teamSlug, teamName, role }) => ({
    id: teamSlug,
    label: `${teamName}, ${role}${teamSlug === current.teamSlug ? ', in use' : ''}`,
    icon: teamSlug === current.teamSlug ? icons.good : icons.team,
    onSelect: () => choose(teamSlug, teamName),
  }));
  return (
    <Menu
      label={`Team in use: ${current.teamName}`}
      icon={icons.team}
      items={[
        ...items,
        { id: ' new', label: 'Make a team', icon: icons.add, onSelect: () => void navigate(paths.newTeam) },
      ]}
    >
      <span className="menu-words">{current.teamName}</span>
    </Menu>
  );
}
