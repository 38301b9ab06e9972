import type { ReactNode } from 'react';
import { IconButton } from '../../../components/index.ts';
import { turnIcons } from './turn-icons.tsx';

export const rowsOfPage = 8;

interface PagerProps {
  /** What the rows are, in many: `partials`. */
  what: string;
  count: number;
  page: number;
  onPage: (page: number) => void;
  children?: ReactNode;
}

/** Last page of a list, counted from 0. */
export function lastPage(count: number): number {
  return Math.max(0, Math.ceil(count / rowsOfPage) - 1);
}

/** Which rows of a long list are shown, and the way to the others. */
export function Pager({ what, count, page, onPage, children }: PagerProps) {
  const first = page * rowsOfPage + 1;
  const last = Math.min(count, first + rowsOfPage - 1);
  const isWhole = count <= rowsOfPage;
  return (
    <div className="list-foot">
      {children}
      {!isWhole && (
        <div className="list-pages" role="group" aria-label={`Pages of ${what}`}>
          <IconButton
            size="small"
            label={`Earlier ${what}`}
            icon={turnIcons.back}
            isDisabled={page === 0}
            disabledReason="These are the first."
            onPress={() => onPage(page - 1)}
          />
          <span aria-live="polite">
            {first}–{last} of {count}
          </span>
          <IconButton
            size="small"
            label={`Later ${what}`}
            icon={turnIcons.on}
            isDisabled={page === lastPage(count)}
            disabledReason="These are the last."
            onPress={() => onPage(page + 1)}
          />
        </div>
      )}
    </div>
  );
}
