import type { RevisionState } from '../../shared/contract/index.ts';
import { icons, type Icon } from './icons.tsx';

interface StateLook {
  readonly words: string;
  readonly Sign: Icon;
  readonly tone: 'plain' | 'attention' | 'good' | 'fault';
}

export const stateLooks: Readonly<Record<RevisionState, StateLook>> = {
  draft: { words: 'Draft', Sign: icons.edit, tone: 'plain' },
  'in-review': { words: 'In review', Sign: icons.hourglass, tone: 'attention' },
  vetted: { words: 'Vetted', Sign: icons.good, tone: 'good' },
  returned: { words: 'Returned', Sign: icons.undo, tone: 'attention' },
  withdrawn: { words: 'Withdrawn', Sign: icons.fault, tone: 'fault' },
};

/** State of a revision: a sign and a word, and a colour beside them. */
export function StateWord({ state }: { state: RevisionState }) {
  const { words, Sign, tone } = stateLooks[state];
  return (
    <span className="state-word" data-tone={tone}>
      <Sign width="16" height="16" />
      {words}
    </span>
  );
}
