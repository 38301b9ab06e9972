import { checkDefinition, type Definition, type Problem } from '../../../../shared/contract/index.ts';
import { createEngine, startEngineWorker, type EnginePort } from '../../../workers/engine-client.ts';
import type { EngineReply, TableAnswer } from '../../../workers/engine-messages.ts';
import { examples } from './examples.ts';
import { beginHistory, redo, sealStep, takeChange, undo, type History } from './history.ts';
import { sameValue } from './same-value.ts';
import type { Keep } from './storage.ts';
import type { Work } from './wave.ts';

export interface BenchState {
  readonly history: History<Work>;
  /** What is wrong with the draft on the bench; none where it builds. */
  readonly problems: readonly Problem[];
  /** The newest table that was built; older than the draft where that has problems or is still being built. */
  readonly table: TableAnswer | null;
  readonly isBuilding: boolean;
  /** Why the engine itself broke down, if it did. */
  readonly failure: string | null;
  /** Whether the browser keeps the work; `false` where its storage is full or closed. */
  readonly isKept: boolean;
  /** Text found in the storage that could not be read. */
  readonly setAside: string | null;
  /** Whether nothing had been kept when the bench was opened, and nothing has been changed since. */
  readonly isUntouched: boolean;
  /** Whether a pointer is held down, so that a drag may be going on. */
  readonly isHeld: boolean;
  /** Whether the work on the bench came from another tab. */
  readonly isFromOtherTab: boolean;
}

export interface Bench {
  getState(): BenchState;
  /** Calls back after each change of state; answers how to stop. */
  subscribe(listener: () => void): () => void;
  /** Changes the work as one step of undo, or within the open step of the same name. */
  change(update: (work: Work) => Work, how?: { coalesce?: string | undefined }): void;
  undo(): void;
  redo(): void;
  /** Ends the open step, as leaving a field does; a drag may move the focus and goes on all the same. */
  seal(): void;
  /** Between these the open step lasts: a pointer is held down. */
  hold(): void;
  release(): void;
  /** Builds the present draft again after the engine broke down. */
  tryAgain(): void;
  letSetAsideGo(): void;
  /** Keeps the work at once, as before the page goes away. */
  keepNow(): void;
}

export interface BenchParts {
  keep: Keep;
  startEngine?: () => EnginePort;
  now?: () => number;
}

const noProblems: readonly Problem[] = [];

/** Writing waits this long for the next change, in milliseconds, and for the pointer to be let go. */
const keepAfterMs = 250;

/** The bench: what is on it, its history, its table and its place in the browser's storage. */
export function createBench({
  keep,
  startEngine = startEngineWorker,
  now = () => performance.now(),
}: BenchParts): Bench {
  const listeners = new Set<() => void>();
  const engine = createEngine(takeReply, startEngine);
  let submitted: Definition | null = null;
  let keepTimer: ReturnType<typeof setTimeout> | undefined;

  const kept = keep.read();
  let state: BenchState = {
    history: beginHistory(kept.kind === 'work' ? kept.work : examples[0].work),
    problems: noProblems,
    table: null,
    isBuilding: false,
    failure: null,
    isKept: true,
    setAside: keep.setAside(),
    isUntouched: kept.kind === 'nothing',
    isFromOtherTab: false,
    isHeld: false,
  };
  build();
  keep.watch((work) => {
    if (sameValue(work, state.history.present)) return;
    // One step, however much the other tab changes: taking it back brings this tab's own work.
    const history = takeChange(state.history, work, { coalesce: 'other tab', at: now(), isHeld: true });
    take({ history, isUntouched: false, isFromOtherTab: true });
  });

  function set(part: Partial<BenchState>): void {
    state = { ...state, ...part };
    for (const listener of listeners) listener();
  }

  function take(part: Partial<BenchState> & { history: History<Work> }): void {
    const before = state.history.present.definition;
    state = { ...state, ...part };
    if (!Object.is(before, part.history.present.definition)) build();
    set({});
  }

  /** Takes a history whose present is this tab's own doing, and keeps it. */
  function takeOwn(history: History<Work>): void {
    if (Object.is(history.present, state.history.present)) return set({ history });
    keepSoon();
    take({ history, isUntouched: false, isFromOtherTab: false });
  }

  function keepSoon(): void {
    clearTimeout(keepTimer);
    keepTimer = setTimeout(() => (state.isHeld ? keepSoon() : keepNow()), keepAfterMs);
  }

  function keepNow(): void {
    if (keepTimer === undefined) return;
    clearTimeout(keepTimer);
    keepTimer = undefined;
    const isKept = keep.write(state.history.present);
    if (isKept !== state.isKept) set({ isKept });
  }

  function seal(): void {
    if (state.isHeld) return;
    const history = sealStep(state.history);
    if (history !== state.history) set({ history });
  }

  /** Sends the draft to the engine before anything is rendered; what cannot be parsed is told at once. */
  function build(): void {
    const checked = checkDefinition(state.history.present.definition);
    if ('problems' in checked) {
      submitted = null;
      state = { ...state, problems: checked.problems, isBuilding: false, failure: null };
      return;
    }
    submitted = checked.definition;
    state = { ...state, isBuilding: true };
    engine.submit(checked.definition);
  }

  function takeReply(reply: EngineReply, definition: Definition): void {
    const isNewest = definition === submitted;
    switch (reply.kind) {
      case 'built':
        return set(
          isNewest
            ? { table: reply.table, problems: noProblems, isBuilding: false, failure: null }
            : { table: reply.table },
        );
      case 'refused':
        if (isNewest) set({ problems: reply.problems, isBuilding: false, failure: null });
        return;
      case 'failed':
        if (isNewest) set({ failure: reply.message, isBuilding: false });
    }
  }

  return {
    getState: () => state,
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    change(update, { coalesce } = {}) {
      const next = update(state.history.present);
      if (sameValue(next, state.history.present)) return;
      takeOwn(takeChange(state.history, next, { coalesce, at: now(), isHeld: state.isHeld }));
    },
    undo: () => takeOwn(undo(state.history)),
    redo: () => takeOwn(redo(state.history)),
    seal,
    hold() {
      set({ history: sealStep(state.history), isHeld: true });
    },
    release() {
      set({ history: sealStep(state.history), isHeld: false });
    },
    tryAgain() {
      build();
      set({});
    },
    letSetAsideGo() {
      keep.letGo();
      set({ setAside: null });
    },
    keepNow,
  };
}
