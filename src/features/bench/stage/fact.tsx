import type { ReactNode } from 'react';
import { Explain, icons } from '../../../components/index.ts';

interface FactProps {
  name: string;
  is: ReactNode;
  /** What it means, how it is computed, what is good. */
  children: ReactNode;
}

/** A figure in a list of them, explained in place. */
export function Fact({ name, is, children }: FactProps) {
  return (
    <div>
      <dt>
        {name}
        <Explain title={name}>{children}</Explain>
      </dt>
      <dd>{is}</dd>
    </div>
  );
}

export function Facts({ label, children }: { label: string; children: ReactNode }) {
  return (
    <dl className="stage-figures" aria-label={label}>
      {children}
    </dl>
  );
}

/** Whether a limit is kept, by word and sign. */
export function Verdict({ isKept, children }: { isKept: boolean; children: ReactNode }) {
  const Sign = isKept ? icons.good : icons.fault;
  return (
    <span className={isKept ? 'stage-passed' : 'stage-failed'}>
      <Sign width="14" height="14" /> {isKept ? 'passed' : 'failed'}: {children}
    </span>
  );
}
