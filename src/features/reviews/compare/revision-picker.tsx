import { useId } from 'react';
import { RevisionFields } from '../../../forms/revision-fields.tsx';
import type { Picked } from './picked.ts';

interface RevisionPickerProps {
  /** Which of the two it is. */
  title: string;
  team: string;
  picked: Picked | null;
  onPick: (next: Picked) => void;
}

/** Chooses a table of the library and one of its revisions. */
export function RevisionPicker({ title, ...fields }: RevisionPickerProps) {
  const id = useId();
  return (
    <section className="panel" aria-labelledby={id}>
      <h2 id={id}>{title}</h2>
      <RevisionFields {...fields} />
    </section>
  );
}
