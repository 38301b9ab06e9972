/** Steps that can be taken back; older ones fall off. */
export const longestHistory = 200;

/** A pause after which typing or key presses on the same field begin a new step, in milliseconds. */
export const pauseMs = 1_500;

/** What was, what is and what was taken back. Immutable; every function below returns a new one. */
export interface History<Work> {
  readonly past: readonly Work[];
  readonly present: Work;
  readonly future: readonly Work[];
  /** The step that the next change of the same name may still join. */
  readonly open: { readonly name: string; readonly at: number } | null;
}

export interface ChangeManner {
  /** Changes of the same name that follow each other become one step: a drag, the typing of a number. */
  coalesce?: string | undefined;
  /** Time of the change in milliseconds, on any clock that does not run backwards. */
  at: number;
  /** Whether a pointer is held down: a drag stays one step however long it rests. */
  isHeld?: boolean;
}

export function beginHistory<Work>(present: Work): History<Work> {
  return { past: [], present, future: [], open: null };
}

/** Takes a change up as a step of its own, or into the open step of the same name. */
export function takeChange<Work>(
  history: History<Work>,
  next: Work,
  { coalesce, at, isHeld = false }: ChangeManner,
): History<Work> {
  if (Object.is(next, history.present)) return history;
  const { open } = history;
  const joins =
    coalesce !== undefined && open !== null && open.name === coalesce && (isHeld || at - open.at <= pauseMs);
  return {
    past: joins ? history.past : [...history.past, history.present].slice(-longestHistory),
    present: next,
    future: [],
    open: coalesce === undefined ? null : { name: coalesce, at },
  };
}

/** Ends the open step, as a released pointer or a left field does. */
export function sealStep<Work>(history: History<Work>): History<Work> {
  return history.open === null ? history : { ...history, open: null };
}

export function undo<Work>(history: History<Work>): History<Work> {
  const before = history.past.at(-1);
  if (before === undefined) return history;
  return {
    past: history.past.slice(0, -1),
    present: before,
    future: [history.present, ...history.future],
    open: null,
  };
}

export function redo<Work>(history: History<Work>): History<Work> {
  const [after, ...future] = history.future;
  if (after === undefined) return history;
  return { past: [...history.past, history.present], present: after, future, open: null };
}
