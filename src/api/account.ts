import { queryOptions } from '@tanstack/react-query';
import {
  accountSchema,
  openInvitationSchema,
  provenAddressSchema,
  sessionsPageSchema,
} from '../../shared/contract/index.ts';
import { accountHasChanged, takeAccount } from './account-state.ts';
import { ask } from './client.ts';

const post = (path: string, body: object) => ask(path, { method: 'POST', body });

export const signUp = (typed: { name: string; email: string; password: string }) =>
  post('/account/sign-up', typed);
export const resendVerification = (email: string) => post('/account/resend-verification', { email });
export const forgotPassword = (email: string) => post('/account/forgot-password', { email });
export const changeAddress = (typed: { currentPassword: string; email: string }) =>
  post('/account/change-address', typed);
export const changePassword = (typed: { currentPassword: string; newPassword: string }) =>
  post('/account/change-password', typed);

const proveBy = async (path: string, body: object) =>
  (await ask(path, { method: 'POST', body, schema: provenAddressSchema })).data.email;

/** These answer the address that the mailed link has proved. */
export const verifyAddress = (token: string) => proveBy('/account/verify-address', { token });
export const resetPassword = (token: string, password: string) =>
  proveBy('/account/reset-password', { token, password });
export async function confirmAddress(token: string): Promise<string> {
  const email = await proveBy('/account/confirm-address', { token });
  await accountHasChanged();
  return email;
}

export async function changeName(name: string): Promise<void> {
  const { data } = await ask('/account', { method: 'PATCH', body: { name }, schema: accountSchema });
  takeAccount(data);
}

export async function deleteAccount(currentPassword: string): Promise<void> {
  await ask('/account', { method: 'DELETE', body: { currentPassword } });
  await accountHasChanged();
}

export const sessionQueries = {
  all: ['sessions'] as const,
  list: () =>
    queryOptions({
      queryKey: [...sessionQueries.all, 'list'],
      queryFn: async ({ signal }) =>
        (await ask('/account/sessions', { signal, schema: sessionsPageSchema })).data.items,
    }),
};
export const endSession = (id: string) =>
  ask(`/account/sessions/${encodeURIComponent(id)}`, { method: 'DELETE' });
export const endOtherSessions = () => ask('/account/sessions', { method: 'DELETE' });

const invitation = { method: 'POST', schema: openInvitationSchema } as const;
export const openInvitation = async (token: string) =>
  (await ask('/invitations/open', { ...invitation, body: { token } })).data;
export async function acceptInvitation(token: string, key: string) {
  const { data } = await ask('/invitations/accept', { ...invitation, body: { token }, key });
  await accountHasChanged();
  return data;
}
