import { z } from 'zod';

/** What a person may be told by mail. */
export const noticeKinds = ['review-asked', 'verdict', 'comment', 'withdrawal'] as const;
export type NoticeKind = (typeof noticeKinds)[number];

const choice = z.boolean({ error: 'true or false' });
/** Whether a person wants each kind; all of them, as long as nothing is chosen. */
export const noticeChoicesSchema = z.strictObject({
  'review-asked': choice,
  verdict: choice,
  comment: choice,
  withdrawal: choice,
});
export type NoticeChoices = z.infer<typeof noticeChoicesSchema>;
export const changeNoticeChoicesSchema = noticeChoicesSchema.partial();

/** What an unsubscribe link carries; works without being signed in, any number of times. */
export const unsubscribeSchema = z.strictObject({
  token: z
    .string({ error: 'the token of a mailed link' })
    .regex(/^[\w.-]{20,200}$/, { error: 'the token of a mailed link' }),
});
/** What is no longer sent. */
export const unsubscribedSchema = z.strictObject({ kind: z.enum(noticeKinds) });
