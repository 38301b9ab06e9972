import { useQuery } from '@tanstack/react-query';
import { reviewQueries } from '../api/reviews.ts';

/** How many reviews wait for the one who is signed in; nothing where none do, or it is not known. */
export function WaitingCount({ team }: { team: string }) {
  const { data: count = 0 } = useQuery(reviewQueries.waiting(team));
  if (count === 0) return null;
  return (
    <span className="place-count">
      <span aria-hidden="true">{count > 99 ? '99+' : count}</span>
      <span className="sr-only">{count} waiting for you</span>
    </span>
  );
}
