import { CodeFields } from './code-fields.tsx';
import { LevelFields } from './level-fields.tsx';
import { SamplingFields } from './sampling-fields.tsx';
import { TableFields } from './table-fields.tsx';
import { useDefinition } from '../state/use-bench.ts';

/** From the shape to codes: how many, of how many bits, at what level, rounded and coded how. */
export function QuantiseFlight() {
  return (
    <div className="space-y-5">
      <TableFields />
      <LevelFields />
      <CodeFields />
      <SamplingFields />
    </div>
  );
}

/** The flight's settings in one line. */
export function QuantiseSummary() {
  const { length, bits, range, scale, coding } = useDefinition((definition) => definition.table);
  const words = [
    `${length} entries of ${bits} ${bits === 1 ? 'bit' : 'bits'}`,
    range,
    scale === 'mid-tread' && 'mid-tread',
    coding === 'twos-complement' && 'two’s complement',
  ];
  return words.filter(Boolean).join(' · ');
}
