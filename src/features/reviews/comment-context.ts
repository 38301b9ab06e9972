import { createContext, useContext } from 'react';
import type { Comment } from '../../../shared/contract/index.ts';
import type { RevisionAt } from '../../api/reviews.ts';

/** Comments on the revision in sight, for whatever shows a setting of it. */
export interface Commenting {
  readonly at: RevisionAt;
  readonly comments: readonly Comment[];
  /** Whether the one who looks may write. */
  readonly mayWrite: boolean;
}

const CommentContext = createContext<Commenting | null>(null);

export const CommentProvider = CommentContext.Provider;

/** None where two revisions are only compared. */
export const useCommenting = (): Commenting | null => useContext(CommentContext);
