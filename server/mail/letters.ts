import type { Role } from '../../shared/contract/index.ts';
import { plain, quoted, type Letter } from './letter.ts';

/** Tokens stand in the fragment: it is sent neither to a server nor in a Referer. */
const linkTo = (origin: string, path: string, token: string) => `${origin}${path}#${token}`;

const notYou = 'If it was not you who asked for this, leave this mail alone: nothing happens then.';
const changedByOther = (origin: string) =>
  `If it was not you, set a new password at once: open ${origin}/forgot-password. That ends every session.`;

export const verifyAddressLetter = (origin: string, token: string): Letter => ({
  subject: 'Verify your address',
  paragraphs: ['Somebody, you we hope, has signed up at Stepwell with this address.'],
  action: { label: 'Verify this address', url: linkTo(origin, '/verify', token) },
  afterwards: ['The link works once, for 24 hours.', notYou],
});

export const accountExistsLetter = (origin: string): Letter => ({
  subject: 'You have an account already',
  paragraphs: [
    'Somebody, you we hope, wanted to use this address for an account at Stepwell. It has one already.',
    `Sign in at ${origin}/sign-in, or set a new password at ${origin}/forgot-password.`,
    notYou,
  ],
});

export const resetPasswordLetter = (origin: string, token: string): Letter => ({
  subject: 'Set a new password',
  paragraphs: ['Somebody, you we hope, has asked for a new password for the account of this address.'],
  action: { label: 'Set a new password', url: linkTo(origin, '/reset-password', token) },
  afterwards: ['The link works once, for 30 minutes. It ends every session of the account.', notYou],
});

export const passwordChangedLetter = (origin: string): Letter => ({
  subject: 'Your password was changed',
  paragraphs: ['The password of your account at Stepwell has just been changed.', changedByOther(origin)],
});

export const confirmAddressLetter = (origin: string, token: string): Letter => ({
  subject: 'Confirm your new address',
  paragraphs: ['Somebody, you we hope, wants to use this address for an account at Stepwell from now on.'],
  action: { label: 'Use this address', url: linkTo(origin, '/confirm-address', token) },
  afterwards: ['The link works once, for 24 hours.', notYou],
});

export const addressChangedLetter = (newAddress: string): Letter => ({
  subject: 'Your address was changed',
  paragraphs: [
    `Your account at Stepwell uses the address ${quoted(newAddress)} from now on; this one no longer.`,
    'If it was not you, tell an admin of your team.',
  ],
});

export const accountDeletedLetter = (): Letter => ({
  subject: 'Your account was deleted',
  paragraphs: ['Your account at Stepwell has just been deleted, with your current password.'],
});

export const invitationLetter = (
  origin: string,
  token: string,
  {
    teamName,
    invitedBy,
    role,
  }: { readonly teamName: string; readonly invitedBy: string; readonly role: Role },
): Letter => ({
  subject: `Invitation to the team ${plain(teamName)}`,
  paragraphs: [
    `${quoted(invitedBy)} invites you to the team ${quoted(teamName)} at Stepwell, with the role ${role}.`,
  ],
  action: { label: 'See the invitation', url: linkTo(origin, '/invitation', token) },
  afterwards: [
    'The link works once, for 7 days, and only for this address.',
    'If you do not know them, leave this mail alone: nothing happens then.',
  ],
});
