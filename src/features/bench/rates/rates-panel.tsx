import './rates.css';
import { useMemo, useState } from 'react';
import { Refusal } from '../../../../shared/contract/index.ts';
import { planRates, type RatePlan } from '../../../../shared/playback/index.ts';
import {
  Button,
  ChoiceField,
  Explain,
  NumberField,
  TextField,
  icons,
  type SelectOption,
} from '../../../components/index.ts';
import { saveText } from '../../../components/save-text.ts';
import { useLive } from '../../../live/index.ts';
import { theBench, useBench, useDefinition } from '../state/use-bench.ts';
import { timerOf, toneOf } from '../state/wave.ts';
import { CostFields } from './cost-fields.tsx';
import { PlanTable } from './plan-table.tsx';
import { readTone } from './read-tone.ts';
import { costCyclesOf } from './sample-cost.ts';
import { withExportOptions } from './to-export.ts';
import { ToneField } from './tone-field.tsx';
import { rateWishes, readPrescalers, wish, type RateWishes } from './wishes.ts';

const shownAtFirst = 6;
const mostPlans = 48;

const widths: readonly SelectOption<RateWishes['compareBits']>[] = [
  { value: '8', label: '8' },
  { value: '16', label: '16' },
  { value: '32', label: '32' },
];

const lengthChoices: readonly SelectOption<RateWishes['lengths']>[] = [
  { value: 'this', label: 'As it is', hint: 'Only settings for the table on the bench.' },
  {
    value: 'others',
    label: 'May change',
    hint: 'Other lengths near it are tried too; choosing one changes the table length.',
  },
];

/** Timer settings for a wanted tone, the nearest first. */
export function RatesPanel() {
  const wishes = useLive(rateWishes);
  const table = useDefinition((definition) => definition.table);
  const playback = useBench(({ history }) => history.present.playback);
  const [shown, setShown] = useState(shownAtFirst);

  const toneText = wishes.tone === '' ? `${Number(toneOf(playback, table).toPrecision(7))} Hz` : wishes.tone;
  const { length, cycles } = table;
  const found = useMemo(() => plansFor(wishes, toneText, length, cycles), [wishes, toneText, length, cycles]);
  const prescalers = readPrescalers(wishes.prescalers);

  return (
    <>
      <p className="field-description">
        A timer divides the clock down to the sample rate. Each setting below is told by how far its tone lies
        from the wanted one.
      </p>
      <div className="field-pair">
        <ToneField label="Wanted tone" text={toneText} onChange={(tone) => wish({ tone })} />
        <NumberField
          label="CPU clock"
          unit="Hz"
          min={1}
          max={1e10}
          step={1e6}
          allowed="a number of hertz from 1 to 10 GHz"
          value={wishes.clockHz}
          onChange={(clockHz) => wish({ clockHz })}
        />
        <TextField
          label="Prescalers"
          value={wishes.prescalers}
          onChange={(text) => wish({ prescalers: text })}
          isCode
          description="Those that the timer offers."
          problem={'fault' in prescalers ? prescalers.fault : undefined}
        />
        <ChoiceField
          label="Compare register, bits"
          options={widths}
          value={wishes.compareBits}
          onChange={(compareBits) => wish({ compareBits })}
        />
        <CostFields wishes={wishes} />
        <NumberField
          label="Clock tolerance"
          unit="ppm"
          min={0}
          max={100_000}
          allowed="a number of parts per million from 0 to 100000"
          description="To either side, from the crystal’s data sheet."
          value={wishes.tolerancePpm}
          onChange={(tolerancePpm) => wish({ tolerancePpm })}
        />
      </div>
      <ChoiceField
        label="Table length"
        options={lengthChoices}
        value={wishes.lengths}
        onChange={(lengths) => wish({ lengths })}
        aside={
          <Explain title="Rate planning">
            <p>
              <code>fs = clock/(prescaler·(compare + 1))</code>, and the tone is <code>K·fs/N</code>. The
              error is <code>1200·log2(f/f_wanted)</code> cents; a hundred cents are a semitone.
            </p>
            <p>
              Within the clock’s own tolerance a smaller error is worth nothing. The cost of a sample must fit
              between two samples, with room for the rest of the program.
            </p>
          </Explain>
        }
      />
      {'fault' in found ? (
        <p role="status" className="figure-note">
          {found.fault}
        </p>
      ) : (
        <>
          <PlanTable plans={found.plans.slice(0, shown)} isChosen={isIn(work())} onChoose={choose} />
          <div className="flex flex-wrap gap-2">
            {shown < found.plans.length && (
              <Button size="small" onPress={() => setShown(mostPlans)}>
                Show {found.plans.length - shown} more
              </Button>
            )}
            <Button
              size="small"
              icon={icons.download}
              onPress={() => saveText('stepwell-rates.csv', csvOf(found.plans), 'text/csv')}
            >
              All as CSV
            </Button>
          </div>
        </>
      )}
    </>
  );

  function choose(plan: RatePlan): void {
    const { prescaler, compare, sampleRateHz, tableLength } = plan;
    const { clockHz } = rateWishes.now();
    theBench().change(({ definition, playback: heard, ...rest }) =>
      withExportOptions({
        ...rest,
        definition: { ...definition, table: { ...definition.table, length: tableLength } },
        playback: {
          ...heard,
          by: 'sampleRate',
          sampleRateHz,
          toneHz: plan.actualHz,
          timer: { clockHz, prescaler, compare },
        },
      }),
    );
    // The tone that was wanted stays wanted, though the bench now has the nearest.
    wish({ tone: toneText });
  }
}

const work = () => theBench().getState().history.present;

/** Whether a plan is what the bench plays by. */
function isIn({ playback, definition }: ReturnType<typeof work>) {
  const timer = timerOf(playback);
  return ({ prescaler, compare, tableLength }: RatePlan) =>
    timer?.prescaler === prescaler &&
    timer.compare === compare &&
    timer.clockHz === rateWishes.now().clockHz &&
    definition.table.length === tableLength;
}

function plansFor(
  { clockHz, prescalers: text, compareBits, tolerancePpm, lengths, ...cost }: RateWishes,
  toneText: string,
  length: number,
  cycles: number,
): { plans: RatePlan[] } | { fault: string } {
  const tone = readTone(toneText);
  const read = readPrescalers(text);
  if ('fault' in tone || 'fault' in read)
    return { fault: 'Put the marked field right, and the settings show.' };
  try {
    const plans = planRates(
      {
        clockHz,
        prescalers: read.prescalers,
        compareBits: Number(compareBits),
        clockTolerancePpm: tolerancePpm,
      },
      {
        wantedHz: tone.hz,
        lengths: lengths === 'this' ? [length] : lengthsNear(length),
        cycles: [cycles],
        costCycles: costCyclesOf(cost),
        limit: mostPlans,
      },
    );
    return { plans };
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    return { fault: 'No settings for a table or tone that is not allowed.' };
  }
}

/** Every length from three quarters to five quarters of the present one. */
function lengthsNear(length: number): number[] {
  const from = Math.max(2, Math.ceil(length * 0.75));
  const to = Math.min(65_536, Math.floor(length * 1.25));
  const step = Math.max(1, Math.floor((to - from) / 512));
  const lengths = [length];
  for (let near = from; near <= to; near += step) if (near !== length) lengths.push(near);
  return lengths;
}

function csvOf(plans: readonly RatePlan[]): string {
  const rows = plans.map((plan) =>
    [
      plan.prescaler,
      plan.compare,
      plan.tableLength,
      plan.cycles,
      plan.sampleRateHz,
      plan.actualHz,
      plan.errorCents,
      plan.toleranceCents ?? '',
      plan.cyclesPerSample,
      plan.fits ?? '',
    ].join(','),
  );
  return `prescaler,compare,table_length,cycles,sample_rate_hz,tone_hz,error_cents,tolerance_cents,cycles_per_sample,fits\n${rows.join('\n')}\n`;
}
