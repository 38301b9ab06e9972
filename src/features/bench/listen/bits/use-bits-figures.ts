import { useEffect, useRef, useState } from 'react';
import {
  masksOf,
  type BitMask,
  type BitsOffFigures,
  type CodedTable,
} from '../../../../../shared/listening/index.ts';
import { startFigures, type FiguresRun } from '../../../../workers/figures-client.ts';

type Figures = ReadonlyMap<BitMask, BitsOffFigures>;

export interface BitsFigures {
  /** Of the masks that are known by now. */
  readonly figures: Figures;
  readonly fault: string | null;
}

interface Known {
  readonly of: CodedTable;
  readonly figures: Figures;
}

const none: Figures = new Map();

/**
 * Figures of a table without some of its bits, found off the main thread: of the bits that are off now, of each bit
 * alone and of those from the bottom up.
 *
 * @param coded the same object as long as it is the same table
 */
export function useBitsFigures(coded: CodedTable, off: BitMask): BitsFigures {
  const [known, setKnown] = useState<Known | null>(null);
  const [fault, setFault] = useState<string | null>(null);
  const run = useRef<FiguresRun | null>(null);
  /** What is asked about now; answers about older tables are dropped. */
  const asked = useRef<Known & { readonly id: number }>({ id: 0, of: coded, figures: none });

  useEffect(() => {
    run.current = startFigures((message) => {
      if (message.kind === 'failed') setFault(message.message);
      if (message.kind !== 'bits' || message.id !== asked.current.id) return;
      const figures = new Map([...asked.current.figures, ...message.figures]);
      asked.current = { ...asked.current, figures };
      setFault(null);
      setKnown(asked.current);
    });
    return () => run.current?.stop();
  }, []);

  useEffect(() => {
    if (asked.current.of !== coded) asked.current = { id: asked.current.id + 1, of: coded, figures: none };
    const { id, figures } = asked.current;
    const masks = [...new Set([off, ...masksOf(coded.table.bits)])].filter((mask) => !figures.has(mask));
    if (masks.length > 0) run.current?.ask({ kind: 'bits', id, coded, masks });
  }, [coded, off]);

  return { figures: known?.of === coded ? known.figures : none, fault };
}
