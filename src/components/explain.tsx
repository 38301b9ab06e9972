import { useId, type ReactNode } from 'react';
import { usePlacedPopover } from './popover.ts';

export interface ExplainProps {
  title: string;
  children: ReactNode;
}

/** A small round button that explains what stands beside it, in place. */
export function Explain({ title, children }: ExplainProps) {
  const id = useId();
  const { opener, popover, isOpen } = usePlacedPopover();
  return (
    <>
      <button
        ref={opener}
        type="button"
        className="explain-button"
        popoverTarget={id}
        aria-label={`Explain ${title}`}
        aria-expanded={isOpen}
      >
        <span aria-hidden="true">?</span>
      </button>
      <div
        ref={popover}
        id={id}
        popover="auto"
        role="dialog"
        aria-label={isOpen ? title : undefined}
        tabIndex={-1}
        className="explain-sheet"
      >
        {isOpen && (
          <>
            <h3>{title}</h3>
            <div className="explain-words">{children}</div>
          </>
        )}
      </div>
    </>
  );
}
