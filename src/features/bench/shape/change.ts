import type { Source } from '../../../../shared/contract/index.ts';

/** How a change joins the history: changes of the same key that follow each other become one step of undo. */
export interface ChangeManner {
  coalesce?: string;
}

export type OnChange<Kind extends Source = Source> = (next: Kind, how?: ChangeManner) => void;
