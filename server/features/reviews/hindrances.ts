import {
  includesRole,
  type Hindrance,
  type Review,
  type RevisionState,
  type Role,
} from '../../../shared/contract/index.ts';

/** What of a revision decides who may do what with it. */
export interface Standing {
  readonly state: RevisionState;
  readonly isArchived: boolean;
  readonly madeById: number | null;
  readonly submittedById: number | null;
}

export interface Asker {
  readonly userId: number;
  readonly role: Role;
  readonly twoPersonRule: boolean;
}

/** Why somebody may not do what; one place for what is shown and what is refused. */
export function hindrancesOf(
  revision: Standing,
  { userId, role, twoPersonRule }: Asker,
): Review['hindrances'] {
  const { state, madeById, submittedById } = revision;
  const isOwn = madeById === userId || submittedById === userId;
  const first = (isRightState: boolean, needed: Role, isBarred: boolean): Hindrance => {
    if (!isRightState) return 'state';
    if (!includesRole(role, needed)) return 'role';
    return isBarred ? 'own-revision' : null;
  };
  return {
    submit: first(state === 'draft' && !revision.isArchived, 'author', false),
    judge: first(state === 'in-review', 'reviewer', twoPersonRule && isOwn),
    withdraw: first(state === 'vetted', 'reviewer', twoPersonRule && isOwn),
  };
}
