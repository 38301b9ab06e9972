import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { AuditEvent } from '../../../shared/contract/index.ts';
import type { AuditAsk } from '../../api/audit.ts';
import { auditPath, reviewPath, tablePath } from '../../paths.ts';
import { changedQuery } from './audit-query.ts';
import { sayEvent } from './words.ts';

interface AuditListProps {
  team: string;
  query: AuditAsk;
  events: readonly AuditEvent[];
}

const utc = { timeZone: 'UTC' } as const;
const days = new Intl.DateTimeFormat('en-GB', { ...utc, day: 'numeric', month: 'short', year: 'numeric' });
const times = new Intl.DateTimeFormat('en-GB', {
  ...utc,
  hour: '2-digit',
  minute: '2-digit',
  second: '2-digit',
});

/** The events of one page, day by day, each with its details in place. */
export function AuditList({ team, query, events }: AuditListProps) {
  const dayOf = ({ at }: AuditEvent) => days.format(new Date(at));
  const groups = [...new Set(events.map(dayOf))];
  return groups.map((day) => (
    <section key={day} aria-label={day}>
      <h2 className="audit-day">{day}</h2>
      <ol className="audit-events" reversed>
        {events
          .filter((event) => dayOf(event) === day)
          .map((event) => (
            <li key={event.sequence}>
              <Event {...{ team, query, event }} />
            </li>
          ))}
      </ol>
    </section>
  ));
}

function Event({ team, query, event }: { team: string; query: AuditAsk; event: AuditEvent }) {
  const { words, thing, after } = sayEvent(event);
  const page = pageOf(team, event);
  return (
    <>
      <time dateTime={event.at}>{times.format(new Date(event.at))}</time>
      <p className="audit-words">
        <strong>{event.actor.name}</strong> {words}{' '}
        {thing !== undefined && (page === undefined ? thing : <Link to={page}>{thing}</Link>)} {after}
      </p>
      <details className="audit-more">
        <summary>
          Details<span className="sr-only"> of event {event.sequence}</span>
        </summary>
        <Facts {...{ team, query, event }} />
      </details>
    </>
  );
}

function Facts({ team, query, event }: { team: string; query: AuditAsk; event: AuditEvent }) {
  const { sequence, action, subject, actor, details } = event;
  const only = (part: AuditAsk, words: ReactNode) => (
    <li>
      <Link to={`${auditPath(team)}?${new URLSearchParams(changedQuery(query, part))}`}>{words}</Link>
    </li>
  );
  const facts: [string, string][] = [
    ['event', String(sequence)],
    ['action', action],
    ['subject', subject],
    ...Object.entries(details).map(([name, value]): [string, string] => [sayName(name), sayValue(value)]),
  ];
  return (
    <>
      <dl className="audit-facts">
        {facts.map(([name, value], index) => (
          <div key={index}>
            <dt>{name}</dt>
            <dd>{value}</dd>
          </div>
        ))}
      </dl>
      <ul className="audit-only" aria-label="Show only">
        {only({ actor: String(actor.id) }, `Only what ${actor.name} did`)}
        {only({ subject }, `Only what was done to ${subject}`)}
        {only({ action }, `Only ${action}`)}
      </ul>
    </>
  );
}

/** `failedLimits` is called failed limits. */
const sayName = (name: string) => name.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);

const sayValue = (value: unknown): string =>
  typeof value === 'string' ? value : JSON.stringify(value, null, 1).replace(/\s+/g, ' ');

/** Where what an event was done to can be seen, if it is a table or a revision of one. */
function pageOf(team: string, { action, subject, details }: AuditEvent): string | undefined {
  const [, slug] = /^table:(.+)$/.exec(subject) ?? [];
  if (slug === undefined) return undefined;
  const number = typeof details.number === 'number' ? details.number : undefined;
  const isOfReview = number !== undefined && action !== 'revision.saved';
  return isOfReview ? reviewPath(team, slug, number) : tablePath(team, slug, number);
}
