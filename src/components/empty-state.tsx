import type { ReactNode } from 'react';

export interface EmptyStateProps {
  title: string;
  /** Whether it stands for the whole place, so that its title is the page's heading. */
  isPlace?: boolean;
  /** What to do first, in a sentence or two. */
  children: ReactNode;
  /** Buttons: the first step, and one working example. */
  actions?: ReactNode;
}

/** A place with nothing in it yet: a dry well, and what to do first. */
export function EmptyState({ title, isPlace = false, children, actions }: EmptyStateProps) {
  const Heading = isPlace ? 'h1' : 'h2';
  return (
    <section className="empty-state">
      <svg viewBox="0 0 120 60" width="120" height="60" aria-hidden="true" focusable="false">
        <path
          d="M4 8h16v12h12v12h12v12h32V32h12V20h12V8h16"
          fill="none"
          stroke="var(--line)"
          strokeWidth="2"
        />
        <path d="M46 52h28" stroke="var(--water)" strokeWidth="2" strokeDasharray="4 4" />
      </svg>
      <Heading>{title}</Heading>
      <div>{children}</div>
      {actions && <div className="flex flex-wrap justify-center gap-2">{actions}</div>}
    </section>
  );
}
