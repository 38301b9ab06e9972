import './team.css';
import { useSuspenseQuery, type QueryClient } from '@tanstack/react-query';
import { Link, useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { includesRole } from '../../../shared/contract/index.ts';
import { useAccount } from '../../api/account-state.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { teamQueries } from '../../api/teams.ts';
import { Page } from '../../components/index.ts';
import { load } from '../../forms/load.ts';
import { sayRole } from '../../forms/say-role.ts';
import { auditPath, tablesPath } from '../../paths.ts';
import { DefaultsPanel } from './defaults-panel.tsx';
import { InvitationsPanel } from './invitations-panel.tsx';
import { LimitsPanel } from './limits-panel.tsx';
import { MembersPanel } from './members-panel.tsx';
import { NamePanel } from './name-panel.tsx';
import { TwoPersonPanel } from './two-person-panel.tsx';

export const teamLoader = (queryClient: QueryClient) => async (args: LoaderFunctionArgs) => {
  const team = args.params.team ?? '';
  await load(args, queryClient.query(teamQueries.detail(team)));
  // The rest comes while the page is drawn.
  void queryClient.query(teamQueries.members(team)).catch(() => undefined);
  chooseTeam(team);
  return null;
};

/** A team: who belongs to it, who is invited, and what new tables begin with. */
export function TeamPage() {
  const { team = '' } = useParams();
  return <TeamParts key={team} slug={team} />;
}

function TeamParts({ slug }: { slug: string }) {
  const { data: team } = useSuspenseQuery(teamQueries.detail(slug));
  const account = useAccount();
  const isAdmin = includesRole(team.myRole, 'admin');
  const { tables, tablesAtMost } = team.usage;
  return (
    <Page
      title={team.name}
      lead={
        <p>
          You are {/^[aeiou]/.test(team.myRole) ? 'an' : 'a'} {team.myRole} here. {sayRole(team.myRole)} Room
          for tables: {tables.toLocaleString('en')} of {tablesAtMost.toLocaleString('en')} taken.
        </p>
      }
      actions={
        <>
          {includesRole(team.myRole, 'reviewer') && (
            <Link to={auditPath(slug)} className="button button-plain">
              Audit trail
            </Link>
          )}
          <Link to={tablesPath(slug)} className="button button-plain">
            Tables
          </Link>
        </>
      }
    >
      <MembersPanel team={slug} isAdmin={isAdmin} ownId={account?.id} />
      {isAdmin && <InvitationsPanel team={slug} />}
      <DefaultsPanel team={team} isAdmin={isAdmin} />
      <LimitsPanel team={slug} isAdmin={isAdmin} />
      <TwoPersonPanel team={team} isAdmin={isAdmin} />
      {isAdmin && <NamePanel team={team} />}
    </Page>
  );
}
