import './rates.css';
import { useState } from 'react';
import { Refusal } from '../../../../shared/contract/index.ts';
import { pulseTrain, type PulseTrain } from '../../../../shared/fades/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { ChoiceField, Explain, NumberField, type SelectOption } from '../../../components/index.ts';
import { useLive } from '../../../live/index.ts';
import { sayHere } from '../problems/field-problem.tsx';
import { useCalmTable } from '../state/tables.ts';
import { rateWishes, wish, type RateWishes } from './wishes.ts';

const modes: readonly SelectOption<RateWishes['pwmMode']>[] = [
  { value: 'fast', label: 'Fast', hint: 'Each pulse begins with its period: duty (code + 1)/2^b.' },
  {
    value: 'phase-correct',
    label: 'Phase-correct',
    hint: 'Each pulse lies in the middle of its period: duty code/(2^b − 1).',
  },
];

const [width, height] = [360, 84];
/** More periods than these stand too close to be told apart. */
const mostPeriods = 24;

/** The pulses that a PWM pin puts out for the envelope on the bench, some periods at a time. */
export function PulsesPanel() {
  const wishes = useLive(rateWishes);
  const table = useCalmTable();
  const [entry, setEntry] = useState(0);
  if (table === null) return <p role="status">No table has been built yet.</p>;
  const { codes, definition } = table;
  const last = codes.length - 1;
  const first = Math.min(entry, last);
  const bits = Math.max(wishes.pwmBits, definition.table.bits);
  const entries = Math.max(
    1,
    Math.min(codes.length - first, Math.floor(mostPeriods / wishes.periodsPerEntry)),
  );
  const made = trainOf(codes.subarray(first, first + entries), wishes, bits);
  return (
    <>
      <p className="field-description">
        A lamp’s driver takes each code as the duty of some PWM periods. What the pin does is drawn from the
        entry that is chosen.
      </p>
      <div className="field-pair">
        <NumberField
          label="From entry"
          isInteger
          min={0}
          max={last}
          allowed={`a whole number from 0 to ${last}`}
          value={first}
          onChange={setEntry}
        />
        <NumberField
          label="Periods an entry"
          isInteger
          min={1}
          max={1_000}
          allowed="a whole number from 1 to 1000"
          value={wishes.periodsPerEntry}
          onChange={(periodsPerEntry) => wish({ periodsPerEntry })}
        />
        <NumberField
          label="PWM depth"
          unit="bits"
          isInteger
          min={definition.table.bits}
          max={16}
          allowed={`a whole number from ${definition.table.bits} to 16`}
          value={bits}
          onChange={(pwmBits) => wish({ pwmBits })}
        />
        <NumberField
          label="PWM prescaler"
          isInteger
          min={1}
          max={65_536}
          allowed="a whole number from 1 to 65536"
          value={wishes.pwmPrescaler}
          onChange={(pwmPrescaler) => wish({ pwmPrescaler })}
        />
      </div>
      <ChoiceField
        label="PWM"
        options={modes}
        value={wishes.pwmMode}
        onChange={(pwmMode) => wish({ pwmMode })}
        aside={
          <Explain title="PWM">
            <p>
              The carrier is <code>clock/(prescaler·2^b)</code>, phase-correct{' '}
              <code>clock/(2·prescaler·(2^b − 1))</code>, with the CPU clock of the timer settings above.
            </p>
            <p>
              A carrier below some 200 Hz is seen to flicker, more so at the edge of the eye (common practice,
              no source).
            </p>
          </Explain>
        }
      />
      {'fault' in made ? (
        <p className="figure-note">{made.fault}</p>
      ) : (
        <TrainDrawing train={made} first={first} entries={entries} periodsPerEntry={wishes.periodsPerEntry} />
      )}
    </>
  );
}

function TrainDrawing({
  train,
  first,
  entries,
  periodsPerEntry,
}: {
  train: PulseTrain;
  first: number;
  entries: number;
  periodsPerEntry: number;
}) {
  const { periodS, duties, risesS, fallsS } = train;
  const shown = Math.min(mostPeriods, duties.length);
  const span = shown * periodS;
  const x = (second: number) => ((second / span) * width).toFixed(2);
  const [high, low] = [12, height - 18];
  let path = `M0 ${low}`;
  for (let period = 0; period < shown; period += 1) {
    if (duties[period] > 0) path += `H${x(risesS[period])}V${high}H${x(fallsS[period])}V${low}`;
  }
  path += `H${width}`;
  const percent = (duty: number) => formatQuantity(100 * duty, '%', { significant: 3 });
  const words =
    `Entries ${first} to ${first + Math.min(entries, Math.ceil(shown / periodsPerEntry)) - 1}: duty from ` +
    `${percent(duties[0])} to ${percent(duties[shown - 1])}, a period lasts ${formatQuantity(periodS, 's', { significant: 4 })}, ` +
    `the carrier is at ${formatQuantity(1 / periodS, 'Hz', { significant: 4 })}.`;
  return (
    <figure className="pulse-train">
      <svg viewBox={`0 0 ${width} ${height}`} role="img" aria-label={words}>
        {Array.from({ length: Math.ceil(shown / periodsPerEntry) }, (_, index) => (
          <path
            key={index}
            className="pulse-entry"
            d={`M${x(index * periodsPerEntry * periodS)} 4V${height - 4}`}
          />
        ))}
        <path className="pulse-edges" d={path} />
      </svg>
      <figcaption>{words}</figcaption>
    </figure>
  );
}

function trainOf(
  codes: Uint16Array,
  { clockHz, periodsPerEntry, pwmMode, pwmPrescaler }: RateWishes,
  bits: number,
): PulseTrain | { fault: string } {
  try {
    return pulseTrain(codes, {
      pwm: { bits, mode: pwmMode, prescaler: pwmPrescaler },
      clockHz,
      periodsPerEntry,
    });
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    return { fault: sayHere(error.problems[0]) };
  }
}
