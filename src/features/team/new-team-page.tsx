import { useNavigate } from 'react-router-dom';
import { teamLimits, type Account } from '../../../shared/contract/index.ts';
import { chooseTeam } from '../../api/current-team.ts';
import { Page, useToast } from '../../components/index.ts';
import { NewTeamForm } from '../../forms/new-team-form.tsx';
import { WithAccount } from '../../forms/with-account.tsx';
import { teamPath } from '../../paths.ts';

/** Makes a team; whoever makes it is its admin. */
export function NewTeamPage() {
  return (
    <WithAccount why="A team is made by somebody with an account, who becomes its admin.">
      {(account) => <NewTeam account={account} />}
    </WithAccount>
  );
}

function NewTeam({ account: { memberships } }: { account: Account }) {
  const navigate = useNavigate();
  const toast = useToast();
  return (
    <Page
      title="Make a team"
      size="narrow"
      lead={
        <p>
          A team has a library of tables and members with roles. You will be its admin. You belong to{' '}
          {memberships.length} of at most {teamLimits.teamsOfAPerson} teams.
        </p>
      }
    >
      <NewTeamForm
        onMade={({ slug, name }) => {
          chooseTeam(slug);
          toast({ message: `${name} is there.`, tone: 'good' });
          void navigate(teamPath(slug));
        }}
      />
    </Page>
  );
}
