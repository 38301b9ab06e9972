import { limits, type TableSettings } from '../../../../shared/contract/index.ts';
import { Button, ChoiceField, Explain, type SelectOption } from '../../../components/index.ts';
import { Spot } from '../problems/field-problem.tsx';
import { changeDefinition } from '../state/use-bench.ts';
import { DraftNumberField } from './draft-number-field.tsx';
import { useTableField } from './fields.ts';

const dithers: readonly SelectOption<TableSettings['dither']>[] = [
  { value: 'none', label: 'None', hint: 'The error follows the wave, and its lines stand at harmonics.' },
  {
    value: 'rectangular',
    label: 'Rectangular',
    hint: 'One draw of ±½ LSB an entry: no mean error is left that follows the wave. 3.0 dB more noise.',
  },
  {
    value: 'triangular',
    label: 'Triangular',
    hint: 'The sum of two draws: neither the mean nor the power of the error follows the wave. 4.8 dB more noise.',
  },
];

type Order = '0' | '1' | '2';

const orders: readonly SelectOption<Order>[] = [
  { value: '0', label: 'None', hint: 'Each entry is rounded by itself.' },
  {
    value: '1',
    label: 'Order 1',
    hint: 'Each entry takes the error of the one before off. Noise rises by 6 dB an octave; 3.0 dB more in all.',
  },
  {
    value: '2',
    label: 'Order 2',
    hint: 'The errors of two entries are fed back. Noise rises by 12 dB an octave; 7.8 dB more in all.',
  },
];

/** Dither and noise shaping: what becomes of the error that rounding leaves. */
export function NoiseFields() {
  const dither = useTableField('dither');
  const shaping = useTableField('shaping');
  return (
    <>
      <Spot path="table.dither">
        <ChoiceField
          label="Dither"
          options={dithers}
          aside={
            <Explain title="Dither">
              <p>
                A small random number d is added just before rounding, code = round(v + d), so that the error
                no longer goes with the wave: tones that quantising added spread out into even noise.
              </p>
              <p>
                It helps where a low level or a slow fade makes single wrong tones heard. A table is a loop,
                so the same noise comes round with every pass; a long table hides that better.
              </p>
              <p>
                The theory: Lipshitz, Wannamaker and Vanderkooy, <cite>Quantization and Dither</cite>, J.
                Audio Eng. Soc. 40 (1992).
              </p>
            </Explain>
          }
          {...dither}
        />
      </Spot>
      {dither.value !== 'none' && <SeedFields />}
      <Spot path="table.shaping">
        <ChoiceField
          label="Noise shaping"
          options={orders}
          aside={
            <Explain title="Noise shaping">
              <p>
                Error feedback: what one entry was rounded by is taken off the next ones, so that the error
                moves up in frequency, where a filter or the ear takes it away.
              </p>
              <p>
                <code>u = v − e₁</code> (order 1) or <code>u = v − 2e₁ + e₂</code> (order 2): line k of the
                error is weighted by (2·sin(πk/N)) to the power of the order.
              </p>
              <p>
                It helps where the sample rate lies far above the tone. The figure “Low-band noise” tells what
                is left in the lowest sixteenth; SNR counts all frequencies and gets worse.
              </p>
            </Explain>
          }
          value={String(shaping.value) as Order}
          onChange={(order) => shaping.onChange(Number(order) as TableSettings['shaping'])}
          problem={shaping.problem}
        />
      </Spot>
    </>
  );
}

function SeedFields() {
  const seed = useTableField('seed');
  return (
    <div className="seed-row">
      <Spot path="table.seed">
        <DraftNumberField
          label="Seed"
          isInteger
          {...limits.seed}
          allowed={`a whole number from ${limits.seed.min} to ${limits.seed.max}`}
          description="The same seed gives the same table, everywhere."
          {...seed}
        />
      </Spot>
      <Button size="small" onPress={() => changeDefinition(withAnotherSeed)}>
        Another seed
      </Button>
    </div>
  );
}

const withAnotherSeed: Parameters<typeof changeDefinition>[0] = (definition) => ({
  ...definition,
  table: { ...definition.table, seed: nextSeed(definition.table.seed) },
});

/** The next seed, so that a row of presses can be gone through again; from the last one on to the first. */
export function nextSeed(seed: number): number {
  return Number.isInteger(seed) && seed >= limits.seed.min && seed < limits.seed.max
    ? seed + 1
    : limits.seed.min;
}
