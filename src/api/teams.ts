import { queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import {
  invitationSchema,
  invitationsPageSchema,
  memberSchema,
  membersPageSchema,
  teamSchema,
  type changeTeamSchema,
  type Role,
} from '../../shared/contract/index.ts';
import { accountHasChanged } from './account-state.ts';
import { ask } from './client.ts';

const of = (team: string) => `/teams/${encodeURIComponent(team)}`;

export const teamQueries = {
  all: ['teams'] as const,
  detail: (team: string) =>
    queryOptions({
      queryKey: [...teamQueries.all, 'detail', team],
      queryFn: ({ signal }) => readTeam(team, signal),
    }),
  members: (team: string) =>
    queryOptions({
      queryKey: [...teamQueries.all, 'members', team],
      queryFn: async ({ signal }) =>
        (await ask(`${of(team)}/members`, { signal, schema: membersPageSchema })).data.items,
    }),
  invitations: (team: string) =>
    queryOptions({
      queryKey: [...teamQueries.all, 'invitations', team],
      queryFn: async ({ signal }) =>
        (await ask(`${of(team)}/invitations`, { signal, schema: invitationsPageSchema })).data.items,
    }),
};

/** The team, and the entity tag that a change of it wants. */
export async function readTeam(team: string, signal?: AbortSignal) {
  const { data, etag } = await ask(of(team), { schema: teamSchema, ...(signal && { signal }) });
  return { ...data, etag };
}

export async function makeTeam(name: string, key: string) {
  const { data } = await ask('/teams', { method: 'POST', body: { name }, key, schema: teamSchema });
  await accountHasChanged();
  return data;
}

/** @throws {ProblemError} with the team as it is now in `current`, where it has changed since `ifMatch` */
export async function changeTeam(team: string, body: z.input<typeof changeTeamSchema>, ifMatch: string) {
  const { data, etag } = await ask(of(team), { method: 'PATCH', body, ifMatch, schema: teamSchema });
  return { ...data, etag };
}

export const changeRole = async (team: string, userId: number, role: Role) =>
  (await ask(`${of(team)}/members/${userId}`, { method: 'PATCH', body: { role }, schema: memberSchema }))
    .data;

export const removeMember = (team: string, userId: number) =>
  ask(`${of(team)}/members/${userId}`, { method: 'DELETE' });

export const invite = (team: string, body: { email: string; role: Role }, key: string) =>
  ask(`${of(team)}/invitations`, { method: 'POST', body, key, schema: invitationSchema });

export const withdrawInvitation = (team: string, id: number) =>
  ask(`${of(team)}/invitations/${id}`, { method: 'DELETE' });
