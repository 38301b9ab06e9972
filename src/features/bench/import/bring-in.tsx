import { useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { Button } from '../../../components/index.ts';
import { later } from '../view/later.tsx';

const BringInDialog = later(
  'what is brought in',
  async () => (await import('./bring-in-dialog.tsx')).BringInDialog,
);

/** The way in for what exists already: recordings, columns of numbers, tables out of code. */
export function BringIn() {
  const [parameters, setParameters] = useSearchParams();
  const isAsked = parameters.has('bring-in');
  const [isOpen, setOpen] = useState(false);
  const close = () => {
    setOpen(false);
    if (!isAsked) return;
    setParameters(
      (before) => {
        before.delete('bring-in');
        return before;
      },
      { replace: true, preventScrollReset: true },
    );
  };
  return (
    <div>
      <Button size="small" onPress={() => setOpen(true)}>
        Bring in …
      </Button>
      {(isOpen || isAsked) && <BringInDialog onClose={close} />}
    </div>
  );
}
