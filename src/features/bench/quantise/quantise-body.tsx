import './quantise.css';
import type { TableSettings } from '../../../../shared/contract/index.ts';
import { FindSmallest } from '../size-search/index.ts';
import { useDefinition } from '../state/use-bench.ts';
import { later } from '../view/later.tsx';
import { Recess } from '../view/recess.tsx';
import { CodeFields } from './code-fields.tsx';
import { LevelFields } from './level-fields.tsx';
import { TableFields } from './table-fields.tsx';

const NoiseFields = later('the noise settings', async () => (await import('./noise-fields.tsx')).NoiseFields);
const SamplingFields = later(
  'the sampling settings',
  async () => (await import('./sampling-fields.tsx')).SamplingFields,
);
const StorageFields = later(
  'the storage settings',
  async () => (await import('./storage-fields.tsx')).StorageFields,
);
const LevelsFields = later(
  'the measured levels',
  async () => (await import('./levels/index.ts')).LevelsFields,
);

/** From the shape to codes: how many, of how many bits, at what level, rounded and coded how. */
export function QuantiseBody() {
  const table = useDefinition((definition) => definition.table);
  return (
    <div className="space-y-5">
      <div className="space-y-3">
        <TableFields />
        <FindSmallest />
      </div>
      <LevelFields />
      <CodeFields />
      <div className="recesses">
        <Recess
          id="noise"
          title="Noise"
          summary={sayNoise(table)}
          holds={['table.dither', 'table.seed', 'table.shaping']}
        >
          <NoiseFields />
        </Recess>
        <Recess
          id="sampling"
          title="Sampling"
          summary={`At the step’s ${table.sampleAt}, from ${table.startPhaseDeg}°`}
          holds={['table.sampleAt', 'table.startPhaseDeg']}
        >
          <SamplingFields />
        </Recess>
        <Recess
          id="storage"
          title="Storage"
          summary={sayStorage(table)}
          holds={['table.coding', 'table.complement', 'table.fold']}
        >
          <StorageFields />
        </Recess>
        <Recess
          id="levels"
          title="Measured levels"
          summary={
            table.levels === undefined
              ? 'None: the levels are taken as even'
              : `${table.levels.length.toLocaleString('en')} voltages`
          }
          holds={['table.levels']}
        >
          <LevelsFields />
        </Recess>
      </div>
    </div>
  );
}

function sayNoise({ dither, seed, shaping }: TableSettings): string {
  const dithered = dither === 'none' ? 'No dither' : `${capital(dither)} dither, seed ${seed}`;
  return `${dithered}, ${shaping === 0 ? 'no shaping' : `shaping of order ${shaping}`}`;
}

function sayStorage({ coding, complement, fold }: TableSettings): string {
  const words = [
    coding === 'offset-binary' ? 'Offset binary' : 'Two’s complement',
    complement && 'inverted',
    fold === 'quarter' ? 'the first quarter' : 'the whole table',
  ];
  return words.filter(Boolean).join(', ');
}

const capital = (word: string) => `${word[0].toUpperCase()}${word.slice(1)}`;
