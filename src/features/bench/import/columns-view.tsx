import { useState } from 'react';
import {
  definitionOfValues,
  nameOfFile,
  type AnyFile,
  type CsvReading,
} from '../../../../shared/imports/index.ts';
import { Button, SelectField, SwitchField } from '../../../components/index.ts';
import type { ImportsWorker } from '../../../workers/imports-client.ts';
import { Faults } from './faults.tsx';
import type { Brought } from './put-on-bench.ts';
import { Sketch } from './sketch.tsx';
import { fileOf, type Chosen } from './chosen.ts';
import { faultsOf, useAnswer } from './use-imports.ts';

interface ColumnsViewProps {
  chosen: Chosen;
  read: Extract<AnyFile, { kind: 'columns' }>;
  worker: ImportsWorker;
  onPut: (brought: Brought) => void;
}

/** Columns of numbers: what can be read in two ways is asked, then one column becomes a cycle. */
export function ColumnsView({ chosen, read, worker, onPut }: ColumnsViewProps) {
  const [reading, setReading] = useState<CsvReading>({});
  const [putFaults, setPutFaults] = useState<readonly string[]>([]);
  const { result, faults } = useAnswer(reading, (wanted) =>
    worker.run('readColumns', { text: read.text, reading: wanted }),
  );
  const outcome = result ?? (faults.length === 0 ? read.outcome : null);
  const change = (part: CsvReading) => setReading((before) => ({ ...before, ...part }));
  const put = (values: readonly number[]) => {
    try {
      onPut({ definition: definitionOfValues(nameOfFile(chosen.name), values), file: fileOf(chosen) });
    } catch (error) {
      setPutFaults(faultsOf(error));
    }
  };

  return (
    <div className="space-y-4">
      <h3>{chosen.name}: columns of numbers</h3>
      <Faults faults={[...faults, ...putFaults]} />
      {outcome === null && <Button onPress={() => setReading({})}>Back to how it was read first</Button>}
      {outcome?.kind === 'ask' && (
        <div role="group" aria-label="A question" className="slab">
          <div className="space-y-2">
            <p>
              {outcome.question.about === 'decimal'
                ? `“${outcome.question.cell}” can be read in two ways. Which is meant?`
                : 'Several columns hold numbers. Which one is the wave?'}
            </p>
            <div className="form-actions">
              {outcome.question.answers.map(({ reading: answer, shown }) => (
                <Button key={shown} onPress={() => change(answer)}>
                  {shown}
                </Button>
              ))}
            </div>
          </div>
        </div>
      )}
      {outcome && (
        <div className="field-pair">
          {outcome.kind === 'read' && (
            <SelectField
              label="Column"
              value={String(outcome.column)}
              options={outcome.columns.map(({ name }, index) => ({ value: String(index), label: name }))}
              onChange={(column) => change({ column: Number(column) })}
            />
          )}
          <SwitchField
            label="The first row is a heading"
            isOn={outcome.hasHeader}
            onChange={(hasHeader) => change({ hasHeader })}
          />
        </div>
      )}
      {outcome?.kind === 'read' && (
        <>
          <Sketch values={outcome.values} label={`${outcome.values.length} numbers, one after the other`} />
          <Button variant="primary" onPress={() => put(outcome.values)}>
            Put {outcome.values.length.toLocaleString('en')} numbers on the bench
          </Button>
        </>
      )}
    </div>
  );
}
