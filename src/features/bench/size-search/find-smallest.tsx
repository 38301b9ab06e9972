import { useState } from 'react';
import { checkDefinition, type Definition } from '../../../../shared/contract/index.ts';
import { Button, icons, useToast } from '../../../components/index.ts';
import { theBench } from '../state/use-bench.ts';
import { later } from '../view/later.tsx';

const SizeSearchDialog = later(
  'the search',
  async () => (await import('./size-search-dialog.tsx')).SizeSearchDialog,
);

/** Opens the search for the smallest table, on the wave as it is now. */
export function FindSmallest() {
  const [searched, setSearched] = useState<Definition | null>(null);
  // Once there it stays, so that it can give the focus back.
  const [isWanted, setIsWanted] = useState(false);
  const toast = useToast();
  const open = () => {
    const checked = checkDefinition(theBench().getState().history.present.definition);
    if ('problems' in checked) toast({ message: 'Put the marked fields right first.', tone: 'fault' });
    else {
      setIsWanted(true);
      setSearched(checked.definition);
    }
  };
  return (
    <>
      <Button size="small" icon={icons.search} onPress={open}>
        Find the smallest table…
      </Button>
      {isWanted && <SizeSearchDialog definition={searched} onClose={() => setSearched(null)} />}
    </>
  );
}
