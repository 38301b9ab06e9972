import type { Role } from '../../shared/contract/index.ts';

const words: Readonly<Record<Role, string>> = {
  viewer: 'A viewer reads, listens and exports.',
  author: 'An author also saves and edits tables.',
  reviewer: 'A reviewer also vets or returns what others submit.',
  admin: 'An admin also looks after members, invitations and defaults.',
};

/** What a role may do; each includes those before it. */
export const sayRole = (role: Role): string => words[role];
