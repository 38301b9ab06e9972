import type { ReactNode } from 'react';
import { icons } from './icons.tsx';
import { joinClasses } from './join-classes.ts';

export interface FieldIds {
  input: string;
  description: string;
  problem: string;
}

export interface FieldFrameProps {
  ids: FieldIds;
  label: string;
  hideLabel?: boolean;
  description?: ReactNode;
  problem?: ReactNode;
  /** Stands right of the label, e.g. an Explain. */
  aside?: ReactNode;
  children: ReactNode;
}

/** Label above, control, then what helps or what is wrong. The problem is announced politely as it appears. */
export function FieldFrame({
  ids,
  label,
  hideLabel,
  description,
  problem,
  aside,
  children,
}: FieldFrameProps) {
  return (
    <div className="field">
      <div className={joinClasses('field-head', hideLabel && 'sr-only')}>
        <label htmlFor={ids.input}>{label}</label>
        {aside}
      </div>
      {children}
      {description && (
        <p id={ids.description} className="field-description">
          {description}
        </p>
      )}
      <div aria-live="polite">{problem && <FieldProblem id={ids.problem}>{problem}</FieldProblem>}</div>
    </div>
  );
}

/** What is wrong and what is allowed, with a sign so that colour is not the only tell. */
export function FieldProblem({ id, children }: { id: string; children: ReactNode }) {
  return (
    <div id={id} className="field-problem">
      <icons.fault width="16" height="16" />
      <div>{children}</div>
    </div>
  );
}

export function fieldIds(id: string): FieldIds {
  return { input: `${id}-input`, description: `${id}-description`, problem: `${id}-problem` };
}

/** `aria-describedby` for what is shown; undefined where nothing is. */
export function describedBy(ids: FieldIds, description: unknown, problem: unknown): string | undefined {
  return joinClasses(Boolean(description) && ids.description, Boolean(problem) && ids.problem) || undefined;
}
