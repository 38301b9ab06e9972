import type { NoticeKind } from '../../shared/contract/index.ts';
import { plain, quoted, type Letter } from '../mail/letter.ts';
import type { Notice } from './notice.ts';

export interface NoticePlace {
  readonly origin: string;
  readonly teamSlug: string;
  readonly teamName: string;
  readonly actorName: string;
}

/** What each kind of notice is called, so that a person knows what the link at its end switches off. */
const kindWords: Readonly<Record<NoticeKind, string>> = {
  'review-asked': 'reviews that are asked for',
  verdict: 'verdicts on your revisions',
  comment: 'comments on revisions you took part in',
  withdrawal: 'withdrawn revisions',
};

/** The mail about a notice, the same for all its recipients but for the link that ends them. */
export function noticeLetter(notice: Notice, place: NoticePlace, unsubscribeUrl: string): Letter {
  const { table, number } = notice;
  const { origin, teamSlug, teamName } = place;
  const what = `revision ${number} of ${quoted(table.title)}`;
  const part = encodeURIComponent;
  return {
    subject: subjectOf(notice),
    paragraphs: [...paragraphsOf(notice, quoted(place.actorName), what), `Team: ${quoted(teamName)}.`],
    action: {
      label: 'See the review',
      url: `${origin}/teams/${part(teamSlug)}/tables/${part(table.slug)}/revisions/${number}/review`,
    },
    last: {
      words: `You get mail about ${kindWords[notice.kind]}. To get none of this kind any more:`,
      url: unsubscribeUrl,
    },
  };
}

/** The table's name comes last: mail programs cut what is long. */
function subjectOf(notice: Notice): string {
  const { table, number } = notice;
  const name = `revision ${number} of ${plain(table.title)}`;
  switch (notice.kind) {
    case 'review-asked':
      return `Review asked for: ${name}`;
    case 'verdict':
      return `${notice.verdict === 'vetted' ? 'Vetted' : 'Returned'}: ${name}`;
    case 'comment':
      return `Comment: ${name}`;
    case 'withdrawal':
      return `Withdrawn: ${name}`;
  }
}

function paragraphsOf(notice: Notice, actor: string, what: string): string[] {
  switch (notice.kind) {
    case 'review-asked':
      return [`${actor} asks for a review of ${what}.`, `What to look at: ${quoted(notice.message)}`];
    case 'verdict': {
      const done = notice.verdict === 'vetted' ? 'has vetted' : 'has returned';
      return [`${actor} ${done} ${what}.`, ...ifSaid('Note', notice.note)];
    }
    case 'comment': {
      const about = notice.path === null ? '' : `, on the setting ${quoted(notice.path)}`;
      return [`${actor} has commented on ${what}${about}.`, `Comment: ${quoted(notice.text)}`];
    }
    case 'withdrawal':
      return [
        `${actor} has withdrawn ${what}. It can still be fetched, with a warning; do not build new firmware with it.`,
        `Reason: ${quoted(notice.reason)}`,
      ];
  }
}

const ifSaid = (word: string, text: string) => (text.trim() === '' ? [] : [`${word}: ${quoted(text)}`]);
