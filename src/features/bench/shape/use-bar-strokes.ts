import { useRef, type PointerEvent } from 'react';
import type { HarmonicsSource } from '../../../../shared/contract/index.ts';
import { onEarlyMoves } from '../../../components/index.ts';
import { drawBars, type BarPlace } from './bars.ts';
import type { OnChange } from './change.ts';
import { useLatest } from './use-latest.ts';

interface Stroke {
  readonly pointerId: number;
  /** Names the stroke in the history: the whole of it is one step. */
  readonly key: string;
  readonly before: HarmonicsSource;
  now: HarmonicsSource;
  last: BarPlace;
}

/** Where a pointer is, and over which element. */
export interface PointerPlace {
  readonly clientX: number;
  readonly clientY: number;
  readonly currentTarget: HTMLElement;
}

let strokesBegun = 0;

export interface BarStrokes {
  onPointerDown: (event: PointerEvent<HTMLElement>) => void;
  onPointerMove: (event: PointerEvent<HTMLElement>) => void;
  onPointerUp: (event: PointerEvent<HTMLElement>) => void;
  onPointerCancel: (event: PointerEvent<HTMLElement>) => void;
  /** Takes a stroke that is under way back. @returns whether there was one */
  drop: () => boolean;
}

/**
 * Drawing over the bars with a held pointer. A stroke goes on from what it has drawn itself, so that it does not wait
 * for the bench to hand each change back.
 */
export function useBarStrokes(
  source: HarmonicsSource,
  onChange: OnChange<HarmonicsSource>,
  placeOf: (pointer: PointerPlace) => BarPlace,
  onReach: (harmonic: number) => void,
): BarStrokes {
  const stroke = useRef<Stroke | null>(null);
  const latest = useLatest({ onChange, placeOf, onReach });

  const drawTo = (pointer: PointerPlace) => {
    const under = stroke.current;
    if (under === null) return;
    const place = latest.current.placeOf(pointer);
    if (place.harmonic !== under.last.harmonic) latest.current.onReach(place.harmonic);
    const next = drawBars(under.now, under.last, place);
    under.last = place;
    if (next === under.now) return;
    under.now = next;
    latest.current.onChange(next, { coalesce: under.key });
  };

  const end = (event: PointerEvent<HTMLElement>) => {
    if (stroke.current?.pointerId === event.pointerId) stroke.current = null;
  };

  return {
    onPointerDown(event) {
      if (event.button !== 0 || stroke.current !== null) return;
      const { currentTarget, pointerId } = event;
      const place = placeOf(event);
      event.preventDefault();
      onReach(place.harmonic);
      currentTarget.setPointerCapture(pointerId);
      strokesBegun += 1;
      const key = `draw:bars:${strokesBegun}`;
      stroke.current = { pointerId, key, before: source, now: source, last: place };
      drawTo(event);
      onEarlyMoves(currentTarget, pointerId, ({ clientX, clientY }) => {
        if (stroke.current?.key === key) drawTo({ clientX, clientY, currentTarget });
      });
    },
    onPointerMove(event) {
      if (stroke.current?.pointerId === event.pointerId) drawTo(event);
    },
    onPointerUp: end,
    onPointerCancel: end,
    drop() {
      const under = stroke.current;
      if (under === null) return false;
      stroke.current = null;
      onChange(under.before, { coalesce: under.key });
      return true;
    },
  };
}
