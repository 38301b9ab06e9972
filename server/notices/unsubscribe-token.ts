import { createHmac, createSecretKey, hkdfSync, timingSafeEqual, type KeyObject } from 'node:crypto';
import { noticeKinds, type NoticeKind } from '../../shared/contract/index.ts';

export type UnsubscribeKey = KeyObject;

/** The key of unsubscribe links, derived (HKDF, RFC 5869) from `AUTH_SECRET`: links of another secret work no longer. */
export const deriveUnsubscribeKey = (secret: string): UnsubscribeKey =>
  createSecretKey(Buffer.from(hkdfSync('sha256', secret, '', 'stepwell unsubscribe links', 32)));

/** Whose notices of what kind a link switches off. */
export interface Unsubscription {
  readonly userId: number;
  readonly kind: NoticeKind;
}

/**
 * The token of an unsubscribe link: `user.kind.mac`, the last an HMAC-SHA-256 over the first two. No row stands behind
 * it, so it works for as long as the key does, any number of times, and only for what it names.
 */
export const sealUnsubscription = (key: UnsubscribeKey, { userId, kind }: Unsubscription): string =>
  `${userId}.${kind}.${macOf(key, userId, kind).toString('base64url')}`;

/** What a token names; undefined where it was not made with our key. */
export function readUnsubscription(key: UnsubscribeKey, token: string): Unsubscription | undefined {
  const [, id, name, mac] = /^([1-9]\d{0,14})\.([a-z-]{1,40})\.([\w-]{43})$/.exec(token) ?? [];
  const kind = noticeKinds.find((one) => one === name);
  if (kind === undefined) return undefined;
  const isOurs = timingSafeEqual(Buffer.from(mac, 'base64url'), macOf(key, Number(id), kind));
  return isOurs ? { userId: Number(id), kind } : undefined;
}

const macOf = (key: UnsubscribeKey, userId: number, kind: NoticeKind): Buffer =>
  createHmac('sha256', key).update(`${userId}.${kind}`).digest();
