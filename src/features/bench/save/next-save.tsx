import { useState, type ReactNode } from 'react';
import { createRevisionSchema } from '../../../../shared/contract/index.ts';
import { ProblemError } from '../../../api/problem-error.ts';
import { createRevision, readCurrentTable, type TaggedTable } from '../../../api/tables.ts';
import { Form } from '../../../forms/form.tsx';
import { Conflict } from './conflict.tsx';
import { NoteField } from './note-field.tsx';
import type { SaveFormProps } from './save-forms.tsx';
import type { SavedLink } from './saved-links.ts';
import { useSave } from './use-save.ts';

interface NextSaveProps extends SaveFormProps {
  link: SavedLink;
  aside: ReactNode;
}

/** Saves the wave as the next revision of its table. Where somebody else was faster, both sides are shown. */
export function NextSave({ link, aside, onClose, onFault }: NextSaveProps) {
  const [theirs, setTheirs] = useState<TaggedTable | null>(null);
  const { draft, type, saving, save } = useSave({ schema: createRevisionSchema, onClose, onFault });
  const { team, teamName, table } = link;
  const submit = () =>
    void save((wave, note) => ({ ...wave, note }), {
      place: `${team}/${table}`,
      send: async (body, key) => {
        try {
          return await createRevision(team, table, body, { ifMatch: (theirs ?? link).etag, key });
        } catch (error) {
          if (error instanceof ProblemError && error.status === 412)
            setTheirs(readCurrentTable(error.current));
          throw error;
        }
      },
      linkTo: { team, teamName },
    });
  const isLost = theirs !== null && saving.fault?.status === 412;
  return (
    <Form
      label="Save a revision"
      action={theirs === null ? 'Save revision' : `Save mine as revision ${theirs.latestRevision + 1}`}
      submitting={isLost ? { ...saving, fault: null } : saving}
      onSubmit={submit}
      fields={['note']}
      aside={theirs === null && aside}
    >
      <p>
        The next revision of <strong className="break-words">{link.title}</strong>, {teamName}. The ones
        before stay as they are.
      </p>
      {theirs !== null && <Conflict link={link} theirs={theirs} />}
      <NoteField value={draft.note} onChange={(note) => type({ note })} problem={saving.at('note')} />
    </Form>
  );
}
