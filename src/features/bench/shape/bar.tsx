import { memo } from 'react';
import { joinClasses } from '../../../components/join-classes.ts';
import { barShare } from './bar-scale.ts';

interface BarProps {
  harmonic: number;
  amplitude: number;
  /** Amplitude at the top of the field. */
  ceiling: number;
  /** From the field's left edge to the bar's cell, and the cell's width, in CSS pixels. */
  left: number;
  width: number;
  isLeftOut: boolean;
  /** Whether Tab comes to this bar. */
  isStop: boolean;
  /** Partials of this harmonic. */
  count: number;
}

/**
 * One harmonic as a slider. It handles nothing by itself: the field does, so that a drag redraws only the bars it
 * changes.
 */
export const Bar = memo(function Bar({
  harmonic,
  amplitude,
  ceiling,
  left,
  width,
  isLeftOut,
  isStop,
  count,
}: BarProps) {
  const share = Math.min(1, Math.abs(amplitude) / ceiling);
  const words = [
    `harmonic ${harmonic}, amplitude ${amplitude}`,
    count > 1 && `the first of ${count} partials`,
    isLeftOut && 'left out, above what the table holds',
  ];
  return (
    <div
      role="slider"
      tabIndex={isStop ? 0 : -1}
      aria-label={`Harmonic ${harmonic}`}
      aria-orientation="vertical"
      aria-valuemin={-Math.max(ceiling, Math.abs(amplitude))}
      aria-valuemax={Math.max(ceiling, Math.abs(amplitude))}
      aria-valuenow={amplitude}
      aria-valuetext={words.filter(Boolean).join(', ')}
      data-harmonic={harmonic}
      className={joinClasses('bar', isLeftOut && 'bar-left-out')}
      style={{ left, width }}
    >
      {amplitude !== 0 && (
        <div
          className={joinClasses(
            'bar-fill',
            amplitude < 0 ? 'bar-down' : 'bar-up',
            Math.abs(amplitude) > ceiling && 'bar-cut',
          )}
          style={{ height: `${share * barShare * 100}%` }}
        />
      )}
      {count > 0 && amplitude === 0 && <div className="bar-rest" />}
      {count > 1 && <div className="bar-many" />}
    </div>
  );
});
