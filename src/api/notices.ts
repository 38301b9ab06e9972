import { queryOptions } from '@tanstack/react-query';
import {
  noticeChoicesSchema,
  unsubscribedSchema,
  type NoticeChoices,
  type NoticeKind,
} from '../../shared/contract/index.ts';
import { ask } from './client.ts';

export const noticeQueries = {
  choices: () =>
    queryOptions({
      queryKey: ['notices'],
      queryFn: async ({ signal }) =>
        (await ask('/account/notices', { signal, schema: noticeChoicesSchema })).data,
    }),
};

/** Answers all the choices as they are now. */
export const changeNotices = async (changes: Partial<NoticeChoices>) =>
  (await ask('/account/notices', { method: 'PATCH', body: changes, schema: noticeChoicesSchema })).data;

/** Ends the kind of notices that a mailed link names; nobody need be signed in. */
export const unsubscribe = async (token: string): Promise<NoticeKind> =>
  (await ask('/notices/unsubscribe', { method: 'POST', body: { token }, schema: unsubscribedSchema })).data
    .kind;
