import { useState } from 'react';
import { changeAccountSchema } from '../../../shared/contract/index.ts';
import { changeName } from '../../api/account.ts';
import { Panel, TextField, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';

export function NamePanel({ name: present }: { name: string }) {
  const [name, setName] = useState(present);
  const toast = useToast();
  const changing = useSubmit(async (wanted: { name: string }) => {
    await changeName(wanted.name);
    toast({ message: 'Your name was changed.', tone: 'good' });
  }, changeAccountSchema);
  return (
    <Panel title="Name">
      <Form
        label="Name"
        action="Change the name"
        variant="plain"
        submitting={changing}
        onSubmit={() => void changing.submit({ name })}
        fields={['name']}
      >
        <TextField
          label="Name"
          description="As your teams see it."
          autoComplete="name"
          value={name}
          onChange={setName}
          problem={changing.at('name')}
        />
      </Form>
    </Panel>
  );
}
