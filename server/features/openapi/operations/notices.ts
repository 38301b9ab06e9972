import {
  changeNoticeChoicesSchema,
  noticeChoicesSchema,
  unsubscribedSchema,
  unsubscribeSchema,
} from '../../../../shared/contract/index.ts';
import type { Section } from '../operation.ts';

export const notices: Section = {
  name: 'Notices',
  description: 'What you are told by mail.',
  operations: [
    {
      id: 'readNoticeChoices',
      method: 'get',
      path: '/account/notices',
      summary: 'Read which notices you get',
      access: 'signed-in',
      answer: { status: 200, description: 'Whether you get each kind', schema: noticeChoicesSchema },
    },
    {
      id: 'changeNoticeChoices',
      method: 'patch',
      path: '/account/notices',
      summary: 'Choose which notices you get',
      access: 'signed-in',
      body: changeNoticeChoicesSchema,
      answer: { status: 200, description: 'Whether you get each kind now', schema: noticeChoicesSchema },
    },
    {
      id: 'unsubscribe',
      method: 'post',
      path: '/notices/unsubscribe',
      summary: 'End one kind of notices by the link in a mail',
      description:
        'Works any number of times. Mail programs send `List-Unsubscribe=One-Click` as a form, with the token in the ' +
        'query (RFC 8058).',
      access: 'anyone',
      query: unsubscribeSchema.partial(),
      body: unsubscribeSchema,
      bodyOptional: true,
      answer: { status: 200, description: 'What is no longer sent', schema: unsubscribedSchema },
      refusals: [404],
    },
    {
      id: 'openUnsubscribePage',
      method: 'get',
      path: '/notices/unsubscribe',
      summary: 'Go to the page where the link in a mail can be used; changes nothing',
      access: 'anyone',
      query: unsubscribeSchema,
      answer: { status: 303, description: 'The page' },
    },
  ],
};
