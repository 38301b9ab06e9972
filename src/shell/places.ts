import { useMatch } from 'react-router-dom';
import { useCurrentTeam } from '../api/current-team.ts';
import { boardsPath, paths, reviewsPath, tablesPath, teamPath } from '../paths.ts';

/** One entry of the header's navigation. */
export interface Place {
  label: string;
  to: string;
  /** Whether places below it count as others. */
  isExact: boolean;
  /** Whether it is the place in sight, where its own address does not tell. */
  isHere?: boolean | undefined;
  /** The team whose waiting reviews are counted beside the label. */
  countsFor?: string | undefined;
}

/** Places in the header, in order. Those of a team lead to the one in use, or to where it is said what to do first. */
export function usePlaces(): readonly Place[] {
  const team = useCurrentTeam()?.teamSlug;
  // A review has the address of its table.
  const isReview = useMatch(paths.review) !== null;
  const isCompare = useMatch(paths.compare) !== null;
  return [
    { label: 'Bench', to: paths.bench, isExact: true },
    {
      label: 'Tables',
      to: team === undefined ? paths.anyTables : tablesPath(team),
      isExact: false,
      isHere: isReview ? false : isCompare || undefined,
    },
    {
      label: 'Boards',
      to: team === undefined ? paths.anyBoards : boardsPath(team),
      isExact: false,
    },
    {
      label: 'Reviews',
      to: team === undefined ? paths.anyReviews : reviewsPath(team),
      isExact: false,
      isHere: isReview ? true : undefined,
      countsFor: team,
    },
    { label: 'Team', to: team === undefined ? paths.anyTeam : teamPath(team), isExact: true },
  ];
}
