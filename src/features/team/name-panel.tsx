import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { changeTeamSchema, type Team } from '../../../shared/contract/index.ts';
import { accountHasChanged } from '../../api/account-state.ts';
import { changeTeam, teamQueries } from '../../api/teams.ts';
import { Panel, TextField, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { teamOfLostRace } from './lost-race.ts';

export function NamePanel({ team }: { team: Team & { etag: string } }) {
  const [name, setName] = useState(team.name);
  const [theirs, setTheirs] = useState<(Team & { etag: string }) | null>(null);
  const queryClient = useQueryClient();
  const toast = useToast();
  const changing = useSubmit(async (wanted: { name: string }) => {
    try {
      const changed = await changeTeam(team.slug, wanted, (theirs ?? team).etag);
      queryClient.setQueryData(teamQueries.detail(team.slug).queryKey, changed);
    } catch (error) {
      setTheirs(teamOfLostRace(error));
      throw error;
    }
    setTheirs(null);
    toast({ message: 'The team’s name was changed. Its address stays.', tone: 'good' });
    await accountHasChanged();
  }, changeTeamSchema);
  return (
    <Panel title="Name of the team">
      <Form
        label="Name of the team"
        action={theirs === null ? 'Change the name' : 'Change it all the same'}
        variant="plain"
        submitting={changing}
        onSubmit={() => void changing.submit({ name })}
        fields={['name']}
      >
        <TextField
          label="Name"
          autoComplete="organization"
          value={name}
          onChange={setName}
          problem={changing.at('name')}
        />
        {theirs !== null && (
          <p className="quiet">
            Somebody has changed the team meanwhile. Its name is now <strong>{theirs.name}</strong>.
          </p>
        )}
      </Form>
    </Panel>
  );
}
