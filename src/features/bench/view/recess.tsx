import './recess.css';
import { useCallback, type ReactNode } from 'react';
import { useSearchParams } from 'react-router-dom';
import { icons } from '../../../components/index.ts';
import { useBench } from '../state/use-bench.ts';
import { readOpenRecesses, writeOpenRecesses, type RecessId } from './open-recesses.ts';

const parameter = 'more';

interface RecessProps {
  id: RecessId;
  title: string;
  /** What is set in it, in one line. */
  summary: ReactNode;
  /** Paths of the fields that stand in it, so that a link to one opens it. */
  holds?: readonly string[];
  /** Mounted while it is open. */
  children: ReactNode;
}

/** Fields that few waves need, behind one line that tells how they are set. Which are open is kept in the URL. */
export function Recess({ id, title, summary, holds = [], children }: RecessProps) {
  const [parameters, setParameters] = useSearchParams();
  const isOpen = readOpenRecesses(parameters.get(parameter)).includes(id);
  const setOpen = useCallback(
    (open: boolean) =>
      setParameters(
        (before) => {
          const others = readOpenRecesses(before.get(parameter)).filter((one) => one !== id);
          const next = writeOpenRecesses(open ? [...others, id] : others);
          if (next === null) before.delete(parameter);
          else before.set(parameter, next);
          return before;
        },
        { replace: true, preventScrollReset: true },
      ),
    [id, setParameters],
  );
  const isAtFault = useBench(({ problems }) =>
    problems.some(({ path }) => holds.some((held) => path === held || path.startsWith(`${held}[`))),
  );
  return (
    <details
      className="recess"
      open={isOpen}
      data-holds={holds.join(' ')}
      onToggle={({ currentTarget: { open } }) => {
        if (open !== isOpen) setOpen(open);
      }}
    >
      <summary>
        <span className="recess-words">
          <span className="recess-title">{title}</span>
          <span className="recess-summary">
            {isAtFault && (
              <icons.fault width="14" height="14" aria-label="At fault:" role="img" aria-hidden={false} />
            )}
            {summary}
          </span>
        </span>
        <icons.chevron />
      </summary>
      {isOpen && (
        <div className="recess-body" role="group" aria-label={title}>
          {children}
        </div>
      )}
    </details>
  );
}
