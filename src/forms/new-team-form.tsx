import { useState } from 'react';
import { createTeamSchema, type Team } from '../../shared/contract/index.ts';
import { newKey } from '../api/new-key.ts';
import { makeTeam } from '../api/teams.ts';
import { TextField } from '../components/index.ts';
import { Form } from './form.tsx';
import { useSubmit } from './use-submit.ts';

/** A name, and the team is made. */
export function NewTeamForm({ onMade }: { onMade: (team: Team) => void }) {
  const [typed, setTyped] = useState(() => ({ name: '', key: newKey() }));
  const making = useSubmit(async ({ name }: { name: string }) => {
    onMade(await makeTeam(name, typed.key));
  }, createTeamSchema);
  return (
    <Form
      label="Make a team"
      action="Make the team"
      submitting={making}
      onSubmit={() => void making.submit({ name: typed.name })}
      fields={['name']}
    >
      <TextField
        label="Name of the team"
        autoComplete="organization"
        value={typed.name}
        onChange={(name) => setTyped({ name, key: newKey() })}
        problem={making.at('name')}
      />
    </Form>
  );
}
