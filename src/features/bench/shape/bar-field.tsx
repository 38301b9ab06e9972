import { useId, useRef, useState, type KeyboardEvent } from 'react';
import type { HarmonicsSource } from '../../../../shared/contract/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { IconButton } from '../../../components/index.ts';
import { Bar } from './bar.tsx';
import { BarEntry } from './bar-entry.tsx';
import { actOfKey } from './bar-keys.ts';
import { barsOf, setBar } from './bars.ts';
import { barShare, ceilingFor, labelEvery, relativeDb, snapToGrid, type Reach } from './bar-scale.ts';
import type { OnChange } from './change.ts';
import { turnIcons } from './turn-icons.tsx';
import { useBarStrokes, type PointerPlace } from './use-bar-strokes.ts';
import { useShownCells } from './use-shown-cells.ts';

export interface BarFieldProps {
  source: HarmonicsSource;
  onChange: OnChange<HarmonicsSource>;
  /** Harmonics shown: 1 … this. */
  shown: number;
  /** Highest harmonic that the table holds; bars above it are marked as left out. */
  highestFitting: number;
  reach: Reach;
}

/**
 * Harmonics as bars to draw on: a drag across sets many in one stroke, arrow keys walk and set, digits open an exact
 * field. Only the bars in sight are in the page, so that thousands of harmonics cost no more than a few dozen.
 */
export function BarField({ source, onChange, shown, highestFitting, reach }: BarFieldProps) {
  const hintId = useId();
  const plane = useRef<HTMLDivElement>(null);
  const [active, setActive] = useState(1);
  const [hovered, setHovered] = useState<number | null>(null);
  const [entry, setEntry] = useState<{ harmonic: number; start: string | number } | null>(null);
  const { frame, onScroll, pitch, first, last, hasEarlier, hasLater, turn, bringIntoSight, middleInSight } =
    useShownCells(shown);

  const { partials } = source;
  const bars = barsOf(partials);
  const amplitudeOf = (harmonic: number) => {
    const bar = bars.get(harmonic);
    return bar === undefined ? 0 : partials[bar.index].amplitude;
  };
  const strongest = partials.reduce((most, { amplitude }) => Math.max(most, Math.abs(amplitude)), 0);
  const fitted = ceilingFor(strongest, reach);
  // While a stroke is under way the scale stands still under the pointer.
  const [heldCeiling, setHeldCeiling] = useState<number | null>(null);
  const ceiling = heldCeiling ?? fitted;
  const stop = Math.min(active, shown);

  const focusNow = (harmonic: number) =>
    plane.current
      ?.querySelector<HTMLElement>(`[data-harmonic="${harmonic}"]`)
      ?.focus({ preventScroll: true });
  const focusSoon = (harmonic: number) => {
    setActive(harmonic);
    // The bar may come into the page only with the next paint.
    requestAnimationFrame(() => focusNow(harmonic));
  };
  const focusBar = (harmonic: number) => {
    bringIntoSight(harmonic);
    focusSoon(harmonic);
  };

  // A stroke is measured from where the field stood when it began, should the page move under it.
  const heldBox = useRef<DOMRect | null>(null);
  const placeOf = (event: PointerPlace) => {
    const box = heldBox.current ?? boxOf(frame.current, event.currentTarget);
    const scrolled = frame.current?.scrollLeft ?? 0;
    const harmonic = 1 + Math.floor((event.clientX - box.left + scrolled) / pitch);
    const height = (0.5 - (event.clientY - box.top) / box.height) / barShare;
    return {
      harmonic: Math.min(shown, Math.max(1, harmonic)),
      amplitude: snapToGrid(height * ceiling, ceiling),
    };
  };
  const strokes = useBarStrokes(source, onChange, placeOf, focusSoon);
  const endStroke = () => {
    heldBox.current = null;
    setHeldCeiling(null);
  };

  const onKeyDown = (event: KeyboardEvent<HTMLElement>) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.key === 'Escape' && strokes.drop()) return endStroke();
    const harmonic = Number((event.target as HTMLElement).dataset.harmonic);
    if (!(harmonic >= 1)) return;
    const act = actOfKey(event, { source, harmonic, amplitude: amplitudeOf(harmonic), shown });
    if (act === null) return;
    event.preventDefault();
    if (act.kind === 'go') focusBar(act.harmonic);
    else if (act.kind === 'type') setEntry({ harmonic, start: act.start });
    else if (act.next !== source) onChange(act.next, { coalesce: `keys:bar:${harmonic}` });
  };

  const closeEntry = (harmonic: number) => {
    setEntry(null);
    focusBar(harmonic);
  };

  const every = labelEvery(pitch);
  const told = hovered ?? stop;
  const cellsInSight: number[] = [];
  for (let harmonic = first; harmonic <= last; harmonic += 1) cellsInSight.push(harmonic);
  if (stop < first || stop > last) cellsInSight.push(stop);

  return (
    <div className="bar-field" role="group" aria-label="Harmonics as bars" aria-describedby={hintId}>
      <div className="bar-told">
        <span aria-hidden="true">Harmonic {told}</span>
        <span aria-hidden="true" className="bar-told-figure">
          {tellBar(amplitudeOf(told), strongest)}
        </span>
        {(hasEarlier || hasLater) && (
          <span className="bar-turns">
            <TurnButton label="Lower harmonics" direction={-1} isThere={hasEarlier} onTurn={turn} />
            <TurnButton label="Higher harmonics" direction={1} isThere={hasLater} onTurn={turn} />
          </span>
        )}
      </div>
      <div className="bar-frame">
        <div className="bar-scale" aria-hidden="true">
          <span>{formatQuantity(ceiling)}</span>
          <span>0</span>
          <span>{formatQuantity(-ceiling)}</span>
        </div>
        <div ref={frame} className="bar-scroll" tabIndex={-1} onScroll={onScroll}>
          <div
            ref={plane}
            className="bar-plane"
            style={{ width: shown * pitch }}
            onKeyDown={onKeyDown}
            onFocus={(event) => {
              const harmonic = Number(event.target.dataset.harmonic);
              if (harmonic >= 1) setActive(harmonic);
            }}
            onPointerDown={(event) => {
              heldBox.current = boxOf(frame.current, event.currentTarget);
              setHeldCeiling(fitted);
              strokes.onPointerDown(event);
            }}
            onPointerMove={(event) => {
              setHovered(placeOf(event).harmonic);
              strokes.onPointerMove(event);
            }}
            onPointerUp={(event) => {
              endStroke();
              strokes.onPointerUp(event);
            }}
            onPointerCancel={(event) => {
              endStroke();
              strokes.onPointerCancel(event);
            }}
            onPointerLeave={() => setHovered(null)}
          >
            {highestFitting < shown && (
              <div className="bar-beyond" style={{ left: highestFitting * pitch }}>
                <span>{(shown - highestFitting) * pitch > 64 && 'left out'}</span>
              </div>
            )}
            <div className="bar-zero" />
            {cellsInSight.map((harmonic) => (
              <Bar
                key={harmonic}
                harmonic={harmonic}
                amplitude={amplitudeOf(harmonic)}
                ceiling={ceiling}
                left={(harmonic - 1) * pitch}
                width={pitch}
                isLeftOut={harmonic > highestFitting}
                isStop={harmonic === stop}
                count={bars.get(harmonic)?.count ?? 0}
              />
            ))}
          </div>
          <div className="bar-numbers" style={{ width: shown * pitch }} aria-hidden="true">
            {cellsInSight
              .filter((harmonic) => harmonic === 1 || harmonic % every === 0)
              .map((harmonic) => (
                <span key={harmonic} style={{ left: (harmonic - 0.5) * pitch }}>
                  {harmonic}
                </span>
              ))}
          </div>
        </div>
        {entry !== null && (
          <BarEntry
            key={entry.harmonic}
            harmonic={entry.harmonic}
            start={entry.start}
            at={middleInSight(entry.harmonic)}
            onDone={(amplitude) => {
              onChange(setBar(source, { harmonic: entry.harmonic, amplitude }));
              closeEntry(entry.harmonic);
            }}
            onCancel={() => closeEntry(entry.harmonic)}
          />
        )}
      </div>
      <p id={hintId} className="field-description">
        Drag to draw. Arrow keys walk and set a bar, with Shift in steps of 0.1; digits set it exactly; Delete
        takes its partial away.
      </p>
    </div>
  );
}

/** Left edge of the scrolling box, top and height of the plane in it. */
function boxOf(frame: HTMLElement | null, plane: HTMLElement): DOMRect {
  const { top, height } = plane.getBoundingClientRect();
  const { left, width } = (frame ?? plane).getBoundingClientRect();
  return new DOMRect(left, top, width, height);
}

interface TurnButtonProps {
  label: string;
  direction: -1 | 1;
  isThere: boolean;
  onTurn: (direction: -1 | 1) => void;
}

/** Where a finger on the field draws, it cannot scroll it too. */
function TurnButton({ label, direction, isThere, onTurn }: TurnButtonProps) {
  return (
    <IconButton
      size="small"
      label={label}
      icon={direction < 0 ? turnIcons.back : turnIcons.on}
      isDisabled={!isThere}
      disabledReason="There are no more."
      onPress={() => onTurn(direction)}
    />
  );
}

function tellBar(amplitude: number, strongest: number): string {
  const height = formatQuantity(amplitude);
  return amplitude === 0
    ? height
    : `${height} · ${formatQuantity(relativeDb(amplitude, strongest), 'dB', { decimals: 1 })}`;
}
