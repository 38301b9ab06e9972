import { useState } from 'react';
import { changeTableSchema } from '../../../shared/contract/index.ts';
import { ProblemError } from '../../api/problem-error.ts';
import { changeTable, readCurrentTable, type TaggedTable } from '../../api/tables.ts';
import { Button, Dialog, TextField, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { readTags, sayTags } from '../../forms/tags-text.ts';
import { useSubmit } from '../../forms/use-submit.ts';

interface RenameDialogProps {
  team: string;
  table: TaggedTable;
  isOpen: boolean;
  onClose: () => void;
  onChanged: (table: TaggedTable) => Promise<void>;
}

/** Title and tags. The table's address stays. */
export function RenameDialog({ isOpen, onClose, ...props }: RenameDialogProps) {
  return (
    <Dialog title="Rename and tag" isOpen={isOpen} onClose={onClose}>
      <RenameForm {...props} onClose={onClose} />
    </Dialog>
  );
}

function RenameForm({ team, table, onClose, onChanged }: Omit<RenameDialogProps, 'isOpen'>) {
  const [base] = useState(table);
  const [title, setTitle] = useState(table.title);
  const [tags, setTags] = useState(sayTags(table.tags));
  const [theirs, setTheirs] = useState<TaggedTable | null>(null);
  const toast = useToast();
  const changing = useSubmit(async (wanted: { title: string; tags: string[] }) => {
    try {
      await onChanged(await changeTable(team, table.slug, wanted, (theirs ?? base).etag));
    } catch (error) {
      if (error instanceof ProblemError && error.status === 412) setTheirs(readCurrentTable(error.current));
      throw error;
    }
    onClose();
    toast({ message: 'Changed.', tone: 'good' });
  }, changeTableSchema);
  return (
    <Form
      label="Rename and tag"
      action={theirs === null ? 'Change' : 'Change it to mine'}
      submitting={changing}
      onSubmit={() => void changing.submit({ title, tags: readTags(tags) })}
      fields={['title', 'tags']}
      aside={
        theirs !== null && (
          <Button
            onPress={() => {
              void onChanged(theirs);
              onClose();
            }}
          >
            Leave theirs
          </Button>
        )
      }
    >
      <TextField label="Title" value={title} onChange={setTitle} problem={changing.at('title')} />
      <TextField
        label="Tags"
        description="Separated by commas; at most 12. Lower case: Fog becomes fog."
        autoComplete="off"
        value={tags}
        onChange={setTags}
        problem={changing.at('tags')}
      />
      {theirs !== null && (
        <section className="slab slab-saffron" aria-label="Both sides">
          <div className="min-w-0 grow">
            <p role="alert">
              <strong>The table has changed meanwhile.</strong> Nothing you typed is lost.
            </p>
            <table className="ledger">
              <thead>
                <tr>
                  <td />
                  <th scope="col">Mine</th>
                  <th scope="col">Theirs, {theirs.changedBy.name}</th>
                </tr>
              </thead>
              <tbody>
                <tr>
                  <th scope="row">Title</th>
                  <td>{title}</td>
                  <td>{theirs.title}</td>
                </tr>
                <tr>
                  <th scope="row">Tags</th>
                  <td>{tags || 'none'}</td>
                  <td>{sayTags(theirs.tags) || 'none'}</td>
                </tr>
                <tr>
                  <th scope="row">Newest revision</th>
                  <td>{base.latestRevision}</td>
                  <td>{theirs.latestRevision}</td>
                </tr>
              </tbody>
            </table>
          </div>
        </section>
      )}
    </Form>
  );
}
