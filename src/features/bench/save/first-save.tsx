import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { createTableSchema, includesRole, type Account } from '../../../../shared/contract/index.ts';
import { chooseTeam, useCurrentTeam } from '../../../api/current-team.ts';
import { createTable } from '../../../api/tables.ts';
import { teamQueries } from '../../../api/teams.ts';
import { Notice, SelectField, TextField } from '../../../components/index.ts';
import { Form } from '../../../forms/form.tsx';
import { readTags } from '../../../forms/tags-text.ts';
import { paths } from '../../../paths.ts';
import { useDefinition } from '../state/use-bench.ts';
import { NoteField } from './note-field.tsx';
import type { SaveFormProps } from './save-forms.tsx';
import { useSave } from './use-save.ts';

/** From this share of what a team may have, the room left is told. */
const nearlyFull = 0.9;

/** Saves the wave as revision 1 of a new table. */
export function FirstSave({ account, onClose, onFault }: SaveFormProps) {
  const name = useDefinition((definition) => definition.name);
  const inUse = useCurrentTeam();
  const { draft, type, saving, save } = useSave({ schema: createTableSchema, onClose, onFault });
  const open = account.memberships.filter(({ role }) => includesRole(role, 'author'));
  const closed = account.memberships.filter((membership) => !open.includes(membership));
  const team =
    open.find(({ teamSlug }) => teamSlug === draft.team) ??
    open.find(({ teamSlug }) => teamSlug === inUse?.teamSlug) ??
    open.at(0);
  if (team === undefined) return <NowhereToSave memberships={account.memberships} />;

  const { teamSlug, teamName } = team;
  const submit = () =>
    void save(
      (wave, note) => ({
        title: draft.title ?? name,
        tags: readTags(draft.tags),
        note,
        ...wave,
      }),
      {
        place: teamSlug,
        send: (body, key) => createTable(teamSlug, body, key),
        linkTo: { team: teamSlug, teamName },
      },
    );
  return (
    <Form
      label="Save to a library"
      action="Save"
      submitting={saving}
      onSubmit={submit}
      fields={['title', 'tags', 'note']}
    >
      <SelectField
        label="Team"
        value={teamSlug}
        options={open.map((one) => ({ value: one.teamSlug, label: one.teamName }))}
        onChange={(next) => {
          type({ team: next });
          chooseTeam(next);
        }}
        description={
          closed.length > 0 &&
          `Not offered, as you are a viewer there: ${closed.map((one) => one.teamName).join(', ')}.`
        }
      />
      <Room team={teamSlug} />
      <TextField
        label="Title"
        autoComplete="off"
        value={draft.title ?? name}
        onChange={(title) => type({ title })}
        problem={saving.at('title')}
      />
      <TextField
        label="Tags"
        description="Separated by commas; at most 12."
        autoComplete="off"
        value={draft.tags}
        onChange={(tags) => type({ tags })}
        problem={saving.at('tags')}
      />
      <NoteField value={draft.note} onChange={(note) => type({ note })} problem={saving.at('note')} />
    </Form>
  );
}

function NowhereToSave({ memberships }: Pick<Account, 'memberships'>) {
  return (
    <Notice title="There is no team that you may save for.">
      You are a viewer in {memberships.map(({ teamName }) => teamName).join(', ')}; saving takes the role
      author. Ask an admin there, or <Link to={paths.newTeam}>make a team</Link> of your own. The wave stays
      on the bench.
    </Notice>
  );
}

function Room({ team }: { team: string }) {
  const { data } = useQuery(teamQueries.detail(team));
  if (data === undefined || data.usage.tables < nearlyFull * data.usage.tablesAtMost) return null;
  const { tables, tablesAtMost } = data.usage;
  return (
    <p className="quiet">
      {tables.toLocaleString('en')} of {tablesAtMost.toLocaleString('en')} tables are taken.
    </p>
  );
}
