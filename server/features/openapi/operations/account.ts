import {
  accountSchema,
  changeAccountSchema,
  changeAddressSchema,
  changePasswordSchema,
  deleteAccountSchema,
  emailOnlySchema,
  provenAddressSchema,
  resetPasswordSchema,
  sessionsPageSchema,
  signUpSchema,
  tokenOnlySchema,
} from '../../../../shared/contract/index.ts';
import type { Operation, Section } from '../operation.ts';

const post = (
  id: string,
  path: string,
  summary: string,
  rest: Pick<Operation, 'body' | 'answer'> & Partial<Operation>,
): Operation => ({ id, method: 'post', path, summary, access: 'anyone', ...rest });

const onItsWay = {
  status: 202,
  description: 'If the address is one for it, a mail is on its way; the answer is alike for all',
} as const;
const done = { status: 204, description: 'Done' } as const;
const proven = {
  status: 200,
  description: 'The address that the link has proved',
  schema: provenAddressSchema,
} as const;

export const account: Section = {
  name: 'Account',
  description: 'Your own account. Signing in and out is with Auth.js below /auth, outside this API.',
  operations: [
    post('signUp', '/account/sign-up', 'Make an account', { body: signUpSchema, answer: onItsWay }),
    post('resendVerification', '/account/resend-verification', 'Send the verification mail again', {
      body: emailOnlySchema,
      answer: onItsWay,
    }),
    post('verifyAddress', '/account/verify-address', 'Prove an address by the link that was mailed to it', {
      body: tokenOnlySchema,
      answer: proven,
      refusals: [404, 410],
    }),
    post('forgotPassword', '/account/forgot-password', 'Ask for a link to set a new password', {
      body: emailOnlySchema,
      answer: onItsWay,
    }),
    post(
      'resetPassword',
      '/account/reset-password',
      'Set a new password by a mailed link; ends all sessions',
      {
        body: resetPasswordSchema,
        answer: proven,
        refusals: [404, 410],
      },
    ),
    {
      id: 'readAccount',
      method: 'get',
      path: '/account',
      summary: 'Read your account and teams',
      access: 'signed-in',
      answer: { status: 200, description: 'Your account', schema: accountSchema },
    },
    {
      id: 'changeAccount',
      method: 'patch',
      path: '/account',
      summary: 'Change your name',
      access: 'signed-in',
      body: changeAccountSchema,
      answer: { status: 200, description: 'Your account as it is now', schema: accountSchema },
    },
    {
      id: 'deleteAccount',
      method: 'delete',
      path: '/account',
      summary: 'Delete your account',
      access: 'signed-in',
      body: deleteAccountSchema,
      answer: done,
      refusals: [403, 409],
    },
    post('changePassword', '/account/change-password', 'Change your password; ends all other sessions', {
      access: 'signed-in',
      body: changePasswordSchema,
      answer: done,
      refusals: [403],
    }),
    post(
      'changeAddress',
      '/account/change-address',
      'Ask for another address; a mail to it confirms the change',
      {
        access: 'signed-in',
        body: changeAddressSchema,
        answer: onItsWay,
        refusals: [403],
      },
    ),
    post(
      'confirmAddress',
      '/account/confirm-address',
      'Take another address into use by the link mailed to it',
      {
        body: tokenOnlySchema,
        answer: proven,
        refusals: [404, 409, 410],
      },
    ),
    {
      id: 'listSessions',
      method: 'get',
      path: '/account/sessions',
      summary: 'List where you are signed in',
      access: 'signed-in',
      answer: { status: 200, description: 'Your sessions', schema: sessionsPageSchema },
    },
    {
      id: 'endOtherSessions',
      method: 'delete',
      path: '/account/sessions',
      summary: 'End all your sessions but this one',
      access: 'signed-in',
      answer: done,
    },
    {
      id: 'endSession',
      method: 'delete',
      path: '/account/sessions/:id',
      summary: 'End one of your sessions',
      access: 'signed-in',
      answer: done,
      refusals: [404],
    },
  ],
};
