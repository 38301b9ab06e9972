import type { NoticeKind } from '../../../shared/contract/index.ts';

/** Each kind of notice: what it is called, and when it comes. */
export const noticeWords: Readonly<Record<NoticeKind, { readonly label: string; readonly when: string }>> = {
  'review-asked': {
    label: 'Reviews asked for',
    when: 'When a revision is submitted that you may judge.',
  },
  verdict: {
    label: 'Verdicts',
    when: 'When a revision that you made or submitted is vetted or returned.',
  },
  comment: {
    label: 'Comments',
    when: 'When somebody comments on a revision that you made, submitted, judged or commented on.',
  },
  withdrawal: {
    label: 'Withdrawals',
    when: 'When a vetted revision of one of your teams is withdrawn.',
  },
};
