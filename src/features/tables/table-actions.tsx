import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { newKey } from '../../api/new-key.ts';
import { duplicateTable, setArchived, tableQueries, type TaggedTable } from '../../api/tables.ts';
import { Button, icons, useToast } from '../../components/index.ts';
import { tablePath } from '../../paths.ts';
import { RenameDialog } from './rename-dialog.tsx';

interface TableActionsProps {
  team: string;
  table: TaggedTable;
  /** The revision in sight, which a duplicate begins with. */
  number: number;
}

/** What an author may do with the whole of a table. */
export function TableActions({ team, table, number }: TableActionsProps) {
  const [isRenaming, setIsRenaming] = useState(false);
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const toast = useToast();
  const onError = (fault: Error) => toast({ message: fault.message, tone: 'fault' });

  const take = async (changed: TaggedTable) => {
    queryClient.setQueryData(tableQueries.detail(team, changed.slug).queryKey, changed);
    await Promise.all([
      queryClient.invalidateQueries({ queryKey: tableQueries.lists(team) }),
      queryClient.invalidateQueries({ queryKey: tableQueries.tags(team).queryKey }),
    ]);
  };
  const archiving = useMutation({
    mutationFn: (isArchived: boolean) => setArchived(team, table.slug, isArchived, newKey()),
    onSuccess: async (changed) => {
      await take(changed);
      toast(
        changed.isArchived
          ? { message: 'Archived.', action: { label: 'Undo', onPress: () => archiving.mutate(false) } }
          : 'It is in the library again.',
      );
    },
    onError,
  });
  const duplicating = useMutation({
    mutationFn: () => duplicateTable(team, table.slug, { revision: number }, newKey()),
    onSuccess: async (made) => {
      await take(made);
      toast({ message: `${made.title} begins with revision ${number} of ${table.title}.`, tone: 'good' });
      await navigate(tablePath(team, made.slug));
    },
    onError,
  });
  const isBusy = archiving.isPending || duplicating.isPending;
  return (
    <>
      <Button icon={icons.edit} onPress={() => setIsRenaming(true)}>
        Rename and tag
      </Button>
      <Button icon={icons.copy} isDisabled={isBusy} onPress={() => duplicating.mutate()}>
        Duplicate
      </Button>
      <Button icon={icons.archive} isDisabled={isBusy} onPress={() => archiving.mutate(!table.isArchived)}>
        {table.isArchived ? 'Restore' : 'Archive'}
      </Button>
      <RenameDialog
        team={team}
        table={table}
        isOpen={isRenaming}
        onClose={() => setIsRenaming(false)}
        onChanged={take}
      />
    </>
  );
}
