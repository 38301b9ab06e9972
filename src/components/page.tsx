import { useEffect, useId, useRef, type ReactNode } from 'react';
import { useNavigationType } from 'react-router-dom';
import { joinClasses } from './join-classes.ts';
import { useTitle } from './use-title.ts';

export interface PageProps {
  /** The page's heading, and what the browser's tab says. */
  title: string;
  /** Stands above the heading: where this page belongs, with links. */
  trail?: ReactNode;
  /** Under the heading: what there is to know at once. */
  lead?: ReactNode;
  /** Buttons right of the heading. */
  actions?: ReactNode;
  /** `narrow` for forms, `wide` for tables and drawings. */
  size?: 'narrow' | 'medium' | 'wide';
  children?: ReactNode;
}

/** A place other than the bench: heading, actions, content. The heading takes the focus when the place is gone to. */
export function Page({ title, trail, lead, actions, size = 'medium', children }: PageProps) {
  const heading = useRef<HTMLHeadingElement>(null);
  const arrival = useNavigationType();
  useTitle(title);

  useEffect(() => {
    const isElsewhere = document.activeElement === document.body || document.activeElement?.closest('header');
    if (arrival !== 'POP' && isElsewhere) heading.current?.focus({ preventScroll: true });
    // Only on arrival: what is done on the page moves the focus itself.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, []);

  return (
    <div className={joinClasses('page', `page-${size}`)}>
      <header className="page-head">
        <div className="page-words">
          {trail && <div className="page-trail">{trail}</div>}
          <h1 ref={heading} tabIndex={-1}>
            {title}
          </h1>
          {lead && <div className="page-lead">{lead}</div>}
        </div>
        {actions && <div className="page-actions">{actions}</div>}
      </header>
      {children}
    </div>
  );
}

/** A part of a page with a heading of its own. */
export function Panel({
  title,
  actions,
  children,
}: {
  title: string;
  actions?: ReactNode;
  children: ReactNode;
}) {
  const id = useId();
  return (
    <section className="panel" aria-labelledby={id}>
      <div className="panel-head">
        <h2 id={id}>{title}</h2>
        {actions}
      </div>
      {children}
    </section>
  );
}

/** Says what is being waited for. */
export function Waiting({ children }: { children: ReactNode }) {
  return (
    <p className="waiting" role="status">
      {children}
    </p>
  );
}
