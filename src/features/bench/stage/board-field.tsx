import { useInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { boardQueries } from '../../../api/boards.ts';
import { useCurrentTeam } from '../../../api/current-team.ts';
import { SelectField, type SelectOption } from '../../../components/index.ts';
import { boardsPath, paths } from '../../../paths.ts';
import { useBoardAt } from './chosen-board.ts';

const example: SelectOption = {
  value: '',
  label: 'Example board',
  hint: 'An R-2R ladder of 10 kΩ with as many bits as the table, op-amp and filter. Its figures are made up.',
};

/** The boards of the team in use, and the example. */
export function BoardField() {
  const team = useCurrentTeam()?.teamSlug;
  const { at, choose } = useBoardAt();
  const { data } = useInfiniteQuery({ ...boardQueries.list(team ?? '', 'no'), enabled: team !== undefined });
  const boards = data?.pages.flatMap(({ items }) => items) ?? [];
  const options: SelectOption[] = [
    example,
    ...boards.map(({ slug, name }) => ({ value: `${team}/${slug}`, label: name })),
  ];
  const value = at === null ? '' : `${at.team}/${at.board}`;
  if (!options.some((option) => option.value === value)) options.push({ value, label: value });
  return (
    <div className="space-y-1">
      <SelectField
        label="Board"
        value={value}
        options={options}
        onChange={(next) => {
          const [chosenTeam, board] = next.split('/');
          choose(next === '' ? null : { team: chosenTeam, board });
        }}
      />
      <Link to={team === undefined ? paths.anyBoards : boardsPath(team)} className="link quiet">
        {team === undefined ? 'Keep boards of your own' : 'Boards of the team'}
      </Link>
    </div>
  );
}
