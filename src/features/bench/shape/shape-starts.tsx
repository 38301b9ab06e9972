import { useMemo, useState } from 'react';
import { limits, type HarmonicsSource } from '../../../../shared/contract/index.ts';
import { ChoiceField, NumberField } from '../../../components/index.ts';
import type { OnChange } from './change.ts';
import { Sketch } from './sketches.tsx';
import { highestHeld, sameHarmonics, shapeSource, shapes, type Shape } from './starts.ts';

interface ShapeStartsProps {
  source: HarmonicsSource;
  onChange: OnChange<HarmonicsSource>;
  highestFitting: number;
}

const names: Record<Shape, string> = {
  sine: 'Sine',
  triangle: 'Triangle',
  sawtooth: 'Sawtooth',
  square: 'Square',
  pulse: 'Pulse',
};

interface Wishes {
  readonly extent: 'table' | 'number';
  readonly highest: number;
  readonly dutyPercent: number;
}

function sourceOf(shape: Shape, { extent, highest, dutyPercent }: Wishes, fitting: number): HarmonicsSource {
  return shapeSource(shape, { highest: extent === 'table' ? fitting : highest, duty: dutyPercent / 100 });
}

/**
 * Standard shapes to start from. While the wave is still the shape as it was set, how far its series goes and its duty
 * can be changed; once it has been edited, the next press starts anew.
 */
export function ShapeStarts({ source, onChange, highestFitting }: ShapeStartsProps) {
  const [wishes, setWishes] = useState<Wishes>({ extent: 'table', highest: 15, dutyPercent: 25 });
  const [made, setMade] = useState<{ shape: Shape; source: HarmonicsSource } | null>(null);
  const fitting = Math.max(1, highestFitting);

  // Kept from change to change: a drag over the bars compares with all of them each time.
  const wished = useMemo(() => shapes.map((shape) => sourceOf(shape, wishes, fitting)), [wishes, fitting]);
  const start = (shape: Shape, wanted: Wishes, coalesce?: string) => {
    const next = sourceOf(shape, wanted, fitting);
    setWishes(wanted);
    setMade({ shape, source: next });
    onChange(next, { coalesce });
  };

  const asWished = shapes.find((_, index) => sameHarmonics(wished[index], source));
  const asMade = made !== null && sameHarmonics(made.source, source) ? made.shape : undefined;
  const current = asWished ?? asMade;

  return (
    <div className="space-y-3">
      <div className="start-stones" role="group" aria-label="Standard shapes to start from">
        {shapes.map((shape) => (
          <button
            key={shape}
            type="button"
            className="start-stone"
            aria-pressed={shape === current}
            onClick={() => start(shape, wishes)}
          >
            <Sketch of={shape} />
            {names[shape]}
          </button>
        ))}
      </div>
      {current !== undefined && current !== 'sine' && (
        <div className="field-pair">
          <ChoiceField
            label={`Partials of the ${names[current].toLowerCase()}`}
            value={wishes.extent}
            options={[
              {
                value: 'table',
                label: 'Fill the table',
                hint:
                  asWished === undefined
                    ? refillHint(names[current], fitting)
                    : fillHint(fitting, highestHeld(current)),
              },
              {
                value: 'number',
                label: 'Up to a number',
                hint: 'The series stops at the harmonic that you set.',
              },
            ]}
            onChange={(extent) => start(current, { ...wishes, extent })}
          />
          {wishes.extent === 'number' && (
            <NumberField
              label="Highest harmonic"
              isInteger
              min={1}
              max={limits.partials.max}
              allowed={`a whole number from 1 to ${limits.partials.max}`}
              value={wishes.highest}
              onChange={(highest) => start(current, { ...wishes, highest }, 'shape:highest')}
            />
          )}
          {current === 'pulse' && (
            <NumberField
              label="Duty of the pulse"
              unit="%"
              min={0.1}
              max={99.9}
              allowed="a number from 0.1 to 99.9"
              description="Share of the cycle that is high."
              value={wishes.dutyPercent}
              onChange={(dutyPercent) => start(current, { ...wishes, dutyPercent }, 'shape:duty')}
            />
          )}
        </div>
      )}
    </div>
  );
}

const say = (count: number) => count.toLocaleString('en');

function fillHint(fitting: number, held: number): string {
  if (fitting <= held) return `Harmonics 1 to ${say(fitting)}: all that the table holds.`;
  return `Harmonics 1 to ${say(held)} of the ${say(fitting)} that fit: a wave holds ${say(limits.partials.max)} partials.`;
}

function refillHint(name: string, fitting: number): string {
  return `Made for another table. This one holds harmonics 1 to ${say(fitting)}; press ${name} again to fill it.`;
}
