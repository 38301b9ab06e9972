import { useEffect, useMemo, useRef, useState } from 'react';
import type { EditorView, ViewUpdate } from '@codemirror/view';
import type { Definition } from '../../../../shared/contract/index.ts';
import { calmed } from '../../../live/index.ts';
import { sameValue } from '../state/same-value.ts';
import { changeDefinition, liveBench, theBench } from '../state/use-bench.ts';
import { keepText, readKeptText } from './kept-text.ts';
import { changeBetween, readText, type TextReading } from './read-text.ts';
import { writeDefinition } from './write-definition.ts';

/** Typing is read once it rests so long, and the bench followed at most so often, in milliseconds. */
const restMs = 150;

export interface TextSync {
  readonly firstText: string;
  readonly reading: TextReading;
  /** Whether the text could not be taken and the bench went on without it. */
  readonly isBehind: boolean;
  onView: (view: EditorView) => void;
  onUpdate: (update: ViewUpdate) => void;
  /** Writes what is on the bench over the text; the editor's own undo brings that back. */
  showBench: () => void;
  /** The view, once it is there. */
  readonly view: EditorView | null;
}

const onBench = (): Definition => theBench().getState().history.present.definition;

/**
 * Ties a text to the definition on the bench, both ways. A text that stands for a definition changes the bench; a
 * change of the bench changes the text, but never over one that the bench has not taken.
 */
export function useTextSync(): TextSync {
  const [firstText] = useState(() => readKeptText() ?? writeDefinition(onBench()));
  const [reading, setReading] = useState(() => readText(firstText));
  const [isBehind, setIsBehind] = useState(() => isApart(reading));
  const [view, setView] = useState<EditorView | null>(null);
  const isOurs = useRef(false);
  const typed = useRef(() => {});
  const timer = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  const live = useMemo(
    () =>
      calmed(
        liveBench(({ history }) => history.present.definition),
        restMs,
      ),
    [],
  );

  useEffect(() => {
    if (view === null) return;
    const take = () => {
      clearTimeout(timer.current);
      timer.current = undefined;
      const text = view.state.doc.toString();
      const read = readText(text);
      setReading(read);
      if (read.kind === 'definition') {
        keepText(null);
        setIsBehind(false);
        changeDefinition(() => read.definition, 'definition text');
      } else keepText(text);
    };
    typed.current = () => {
      clearTimeout(timer.current);
      timer.current = setTimeout(take, restMs);
    };
    const follow = () => {
      if (timer.current !== undefined) return;
      const read = readText(view.state.doc.toString());
      if (read.kind === 'definition') {
        if (!sameValue(read.definition, live.now())) writeOver(live.now());
      } else if (readKeptText() === null) writeOver(live.now());
      else setIsBehind(true);
    };
    const writeOver = (definition: Definition) => {
      overwrite(view, definition, isOurs);
      setReading(readText(view.state.doc.toString()));
    };
    const end = live.subscribe(follow);
    return () => {
      end();
      if (timer.current !== undefined) take();
    };
  }, [view, live]);

  return {
    firstText,
    reading,
    isBehind: isBehind && reading.kind !== 'definition',
    view,
    onView: setView,
    onUpdate(update) {
      if (update.docChanged && !isOurs.current) typed.current();
    },
    showBench() {
      if (view === null) return;
      keepText(null);
      overwrite(view, onBench(), isOurs);
      setReading(readText(view.state.doc.toString()));
      setIsBehind(false);
    },
  };
}

/** Whether a kept text stands for something else than the bench holds. */
function isApart(reading: TextReading): boolean {
  return reading.kind === 'definition' ? !sameValue(reading.definition, onBench()) : readKeptText() !== null;
}

function overwrite(view: EditorView, definition: Definition, isOurs: { current: boolean }): void {
  const changes = changeBetween(view.state.doc.toString(), writeDefinition(definition));
  if (changes === null) return;
  isOurs.current = true;
  try {
    view.dispatch({ changes });
  } finally {
    isOurs.current = false;
  }
}
