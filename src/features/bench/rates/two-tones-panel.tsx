import './rates.css';
import { useMemo } from 'react';
import { Refusal } from '../../../../shared/contract/index.ts';
import { planTwoTones, twoToneSource, type TwoTonePlan } from '../../../../shared/playback/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, Explain, NumberField, useToast } from '../../../components/index.ts';
import { useLive } from '../../../live/index.ts';
import { useSettled } from '../../../components/use-settled.ts';
import { sayHere } from '../problems/field-problem.tsx';
import { theBench, useBench, useDefinition } from '../state/use-bench.ts';
import { sampleRateOf } from '../state/wave.ts';
import { readTone, sayCents } from './read-tone.ts';
import { ToneField } from './tone-field.tsx';
import { rateWishes, wish, type RateWishes } from './wishes.ts';

/** Searching all lengths takes some milliseconds: it is done once typing rests so long, in milliseconds. */
const restMs = 150;

/** A loop that holds two tones at once, each a whole number of cycles. */
export function TwoTonesPanel() {
  const wishes = useLive(rateWishes);
  const table = useDefinition((definition) => definition.table);
  const playback = useBench(({ history }) => history.present.playback);
  const rateHz = sampleRateOf(playback, table);
  const settled = useSettled(wishes, restMs);
  const found = useMemo(() => search(settled, rateHz), [settled, rateHz]);
  return (
    <>
      <p className="field-description">
        Two tones in one loop at {formatQuantity(rateHz, 'Hz', { significant: 6 })}: the loop must hold a
        whole number of cycles of each.
      </p>
      <div className="field-pair">
        <ToneField label="First tone" text={wishes.firstTone} onChange={(firstTone) => wish({ firstTone })} />
        <ToneField
          label="Second tone"
          text={wishes.secondTone}
          onChange={(secondTone) => wish({ secondTone })}
        />
        <NumberField
          label="Longest loop"
          unit="entries"
          isInteger
          min={5}
          max={65_536}
          allowed="a whole number from 5 to 65536"
          value={wishes.longest}
          onChange={(longest) => wish({ longest })}
        />
        <NumberField
          label="Either off by at most"
          unit="cents"
          min={0.01}
          max={1_200}
          allowed="a number of cents from 0.01 to 1200"
          value={wishes.withinCents}
          onChange={(withinCents) => wish({ withinCents })}
          aside={
            <Explain title="Two tones">
              <p>
                N entries with K₁ and K₂ cycles give K₁·fs/N and K₂·fs/N. All lengths are tried; the shortest
                that keeps both errors within the limit is offered, and the best of all.
              </p>
            </Explain>
          }
        />
      </div>
      <div aria-live="polite">
        {'fault' in found ? (
          <p className="figure-note">{found.fault}</p>
        ) : (
          <>
            {found.shortest === null && (
              <p className="figure-note">No loop so short keeps both within {wishes.withinCents} cents.</p>
            )}
            {found.shortest !== null && <Choice title="Shortest within the limit" plan={found.shortest} />}
            {found.best.tableLength !== found.shortest?.tableLength && (
              <Choice title="Least error" plan={found.best} />
            )}
          </>
        )}
      </div>
    </>
  );
}

function Choice({ title, plan }: { title: string; plan: TwoTonePlan }) {
  const toast = useToast();
  const { tableLength, cycles, actualHz, errorCents } = plan;
  return (
    <div className="two-tone-choice">
      <div>
        <strong>{title}</strong>: {tableLength.toLocaleString('en')} entries with {cycles[0]} and {cycles[1]}{' '}
        cycles give {formatQuantity(actualHz[0], 'Hz', { significant: 6 })} ({sayCents(errorCents[0])}) and{' '}
        {formatQuantity(actualHz[1], 'Hz', { significant: 6 })} ({sayCents(errorCents[1])}).
      </div>
      <Button
        size="small"
        aria-label={`Put the loop of ${tableLength} entries on the bench`}
        onPress={() => {
          take(plan);
          toast({
            message: 'The two tones are on the bench. What was there comes back with Undo.',
            action: { label: 'Undo', onPress: theBench().undo },
          });
        }}
      >
        Put it on the bench
      </Button>
    </div>
  );
}

function take(plan: TwoTonePlan): void {
  theBench().change(({ definition, playback, ...work }) => {
    const sampleRateHz = sampleRateOf(playback, definition.table);
    return {
      ...work,
      definition: {
        ...definition,
        source: twoToneSource(plan),
        table: { ...definition.table, length: plan.tableLength, cycles: 1 },
      },
      playback: { ...playback, by: 'sampleRate', sampleRateHz, mode: 'loop' },
    };
  });
}

function search({ firstTone, secondTone, longest, withinCents }: RateWishes, sampleRateHz: number) {
  const tones = [readTone(firstTone), readTone(secondTone)];
  const [first, second] = tones;
  if ('fault' in first || 'fault' in second)
    return { fault: 'Put the marked field right, and the loops show.' };
  try {
    return planTwoTones({
      sampleRateHz,
      tonesHz: [first.hz, second.hz],
      largestLength: longest,
      withinCents,
    });
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    return { fault: sayHere(error.problems[0]) };
  }
}
