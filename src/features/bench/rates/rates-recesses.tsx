import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { useBench, useDefinition } from '../state/use-bench.ts';
import { sampleRateOf, timerOf } from '../state/wave.ts';
import { later } from '../view/later.tsx';
import { Recess } from '../view/recess.tsx';

const RatesPanel = later('the rate planning', async () => (await import('./rates-panel.tsx')).RatesPanel);
const AccumulatorPanel = later(
  'the phase accumulator',
  async () => (await import('./accumulator-panel.tsx')).AccumulatorPanel,
);
const TwoTonesPanel = later(
  'the two tones',
  async () => (await import('./two-tones-panel.tsx')).TwoTonesPanel,
);

const PulsesPanel = later('the pulses', async () => (await import('./pulses-panel.tsx')).PulsesPanel);

/** How the part makes the rate and the tone: parts of the output flight that open in place. */
export function RatesRecesses() {
  const playback = useBench(({ history }) => history.present.playback);
  const table = useDefinition((definition) => definition.table);
  const timer = timerOf(playback);
  const { accumulator } = playback;
  const hertz = (value: number) => formatQuantity(value, 'Hz', { significant: 5 });
  return (
    <div className="recesses">
      <Recess
        id="rates"
        title="Timer settings for the tone"
        summary={
          timer === undefined
            ? 'None chosen'
            : `Prescaler ${timer.prescaler}, compare ${timer.compare} at ${hertz(timer.clockHz)}`
        }
      >
        <RatesPanel />
      </Recess>
      <Recess
        id="accumulator"
        title="Phase accumulator"
        summary={
          accumulator === undefined
            ? 'None chosen: the table is a loop'
            : `${accumulator.accumulatorBits} bits, step word ${accumulator.stepWord}: ${hertz(
                (accumulator.stepWord * sampleRateOf(playback, table)) / 2 ** accumulator.accumulatorBits,
              )}`
        }
      >
        <AccumulatorPanel />
      </Recess>
      <Recess id="two-tones" title="Two tones in one loop" summary="Finds the loop that holds both">
        <TwoTonesPanel />
      </Recess>
      {table.range === 'unipolar' && (
        <Recess id="pulses" title="Pulses of the envelope" summary="What a PWM pin does, period by period">
          <PulsesPanel />
        </Recess>
      )}
    </div>
  );
}
