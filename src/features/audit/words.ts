import type { AuditAction, AuditEvent } from '../../../shared/contract/index.ts';

/** What an event says after the name of who did it: words, what it was done to, and words again. */
export interface Sentence {
  readonly words: string;
  /** Called by its name; where it has a page, that is linked. */
  readonly thing?: string;
  readonly after?: string;
}

interface Facts {
  /** A detail as text; '' where the event has none of that name. */
  readonly text: (name: string) => string;
  readonly details: Readonly<Record<string, unknown>>;
  /** What the subject is called: `fog-signal` of `table:fog-signal`. */
  readonly name: string;
}

type Say = (facts: Facts) => Sentence;

const revision =
  (verb: string): Say =>
  ({ text, name }) => ({ words: `${verb} revision ${text('number')} of`, thing: text('title') || name });

const original =
  (verb: string): Say =>
  ({ text, name }) => ({
    words: `${verb} the original ${text('name')} of revision ${text('number')} of`,
    thing: name,
  });

const table =
  (verb: string): Say =>
  ({ text, name }) => ({ words: verb, thing: text('title') || name });

const board =
  (verb: string): Say =>
  ({ text, name }) => ({ words: verb, thing: text('name') || name });

const limits =
  (verb: string): Say =>
  ({ name }) => ({
    words:
      name === 'general'
        ? `${verb} the limits for all tables`
        : `${verb} the limits for tables tagged ${name}`,
  });

/** One for each action there is; the type holds that. */
const sentences: Readonly<Record<AuditAction, Say>> = {
  'team.created': ({ text }) => ({ words: `made the team ${text('name')}` }),
  'team.changed': ({ details }) => ({ words: `changed the team: ${sayChanges(details)}` }),
  'member.invited': ({ text }) => ({ words: `invited ${text('email')} as ${text('role')}` }),
  'member.joined': ({ text }) => ({ words: `joined the team as ${text('role')}` }),
  'member.role-changed': ({ text }) => ({
    words: `made ${text('name')} ${text('to')}, who was ${text('from')}`,
  }),
  'member.left': ({ details }) => ({
    words: details.accountDeleted === true ? 'deleted their account, and so left the team' : 'left the team',
  }),
  'member.removed': ({ text }) => ({ words: `removed ${text('name')}, who was ${text('role')}` }),
  'invitation.withdrawn': ({ text }) => ({
    words: text('email') === '' ? 'withdrew an invitation' : `withdrew the invitation of ${text('email')}`,
  }),
  'table.created': table('saved the new table'),
  'table.changed': ({ details, name }) => sayRenamed(details, name),
  'table.duplicated': ({ text, details, name }) => ({
    words: 'made the table',
    thing: text('title') || name,
    after: `out of ${sayOrigin(details.from)}`,
  }),
  'table.archived': table('archived the table'),
  'table.restored': table('restored the table'),
  'revision.saved': revision('saved'),
  'revision.submitted': revision('submitted'),
  'revision.vetted': revision('vetted'),
  'revision.returned': revision('returned'),
  'revision.withdrawn': revision('withdrew'),
  'comment.added': revision('commented on'),
  'original.kept': original('kept'),
  'original.removed': original('removed'),
  'limits.created': limits('set'),
  'limits.changed': limits('changed'),
  'limits.deleted': limits('took away'),
  'board.created': board('saved the new board'),
  'board.revised': ({ text, name }) => ({
    words: `saved revision ${text('number')} of the board`,
    thing: text('name') || name,
  }),
  'board.copied': ({ text, details, name }) => ({
    words: 'made the board',
    thing: text('name') || name,
    after: `out of ${sayOrigin(details.from)}`,
  }),
  'board.retired': board('retired the board'),
  'board.restored': board('restored the board'),
};

/** An event of another version of the program is told by its bare action. */
export function sayEvent({ action, subject, details }: AuditEvent): Sentence {
  const say = (sentences as Readonly<Record<string, Say | undefined>>)[action];
  const name = subject.slice(subject.indexOf(':') + 1);
  if (!say) return { words: `${action}:`, thing: name };
  const text = (key: string) => {
    const value = details[key];
    return typeof value === 'string' || typeof value === 'number' ? String(value) : '';
  };
  return say({ text, details, name });
}

const changeWords: Readonly<Record<string, string>> = {
  name: 'its name',
  defaults: 'what new tables begin with',
  twoPersonRule: 'its two-person rule',
};

const sayChanges = (details: Readonly<Record<string, unknown>>) =>
  Object.keys(details)
    .map((key) => changeWords[key] ?? key)
    .join(', ');

/** A field of a detail that is an object, as text; '' where there is none. */
function textOf(value: unknown, name: string): string {
  const found = typeof value === 'object' && value !== null ? (value as Record<string, unknown>)[name] : '';
  return typeof found === 'string' || typeof found === 'number' ? String(found) : '';
}

function sayRenamed({ before, after }: Readonly<Record<string, unknown>>, name: string): Sentence {
  const [old, now] = [textOf(before, 'title'), textOf(after, 'title')];
  if (old !== now) return { words: `renamed the table ${old} to`, thing: now };
  return { words: 'changed the tags of the table', thing: now || name };
}

const sayOrigin = (from: unknown) => `revision ${textOf(from, 'number')} of ${textOf(from, 'slug')}`;
