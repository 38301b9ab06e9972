import { useState } from 'react';
import { nameOfFile, type AnyFile, type CodeArray } from '../../../../shared/imports/index.ts';
import { Button, Notice, SelectField } from '../../../components/index.ts';
import type { ImportsWorker } from '../../../workers/imports-client.ts';
import type { ImagePart } from '../../../workers/imports-messages.ts';
import { Faults } from './faults.tsx';
import { ImageFields } from './image-fields.tsx';
import { OldTableFigures } from './old-table-figures.tsx';
import type { Brought } from './put-on-bench.ts';
import { Sketch } from './sketch.tsx';
import { fileOf, type Chosen } from './chosen.ts';
import { sayFault, useAnswer } from './use-imports.ts';

interface CodeViewProps {
  chosen: Chosen;
  read: Extract<AnyFile, { kind: 'code' }>;
  worker: ImportsWorker;
  onPut: (brought: Brought) => void;
  /** Takes every array, each as a draft. */
  onAll: () => void;
}

const languages = {
  c: 'C or C++ source',
  assembly: 'assembly source',
  'intel-hex': 'an Intel HEX image',
} as const;

/** Arrays out of code: one is picked, its figures are told, and a better table is proposed beside it. */
export function CodeView({ chosen, read, worker, onPut, onAll }: CodeViewProps) {
  const { language, arrays, refused } = read.code;
  const [picked, setPicked] = useState(0);
  const [part, setPart] = useState<ImagePart | null>(null);
  const image = useAnswer(part, (wanted) =>
    wanted === null ? Promise.resolve(null) : worker.run('readImage', { text: read.text, part: wanted }),
  );
  const array = part === null ? arrays[picked] : image.result;

  return (
    <div className="space-y-4">
      <h3>
        {chosen.name}: {languages[language]}
      </h3>
      {arrays.length > 1 && (
        <SelectField
          label={`One of ${arrays.length} ${language === 'intel-hex' ? 'stretches' : 'arrays'}`}
          value={String(picked)}
          options={arrays.map((one, index) => ({ value: String(index), label: sayArray(one) }))}
          onChange={(index) => {
            setPicked(Number(index));
            setPart(null);
          }}
        />
      )}
      {arrays.length > 1 && (
        <Button size="small" onPress={onAll}>
          Take all {arrays.length} as drafts
        </Button>
      )}
      {refused.length > 0 && (
        <Notice
          title={`${refused.length} more ${refused.length === 1 ? 'array' : 'arrays'} cannot be taken.`}
        >
          <ul>
            {refused.slice(0, 20).map(({ name, line, problem }) => (
              <li key={`${name} ${line}`} className="break-words">
                {name || 'unnamed'}: {sayFault(problem)}
              </li>
            ))}
          </ul>
        </Notice>
      )}
      {language === 'intel-hex' && <ImageFields key={picked} segment={arrays[picked]} onChange={setPart} />}
      <Faults faults={image.faults} />
      {array && (
        <PickedArray
          key={`${picked} ${JSON.stringify(part)}`}
          array={array}
          name={array.name || nameOfFile(chosen.file ? chosen.name : '')}
          file={fileOf(chosen)}
          {...{ worker, onPut }}
        />
      )}
    </div>
  );
}

const sayArray = ({ name, line, values, typeName }: CodeArray) =>
  `${name || 'unnamed'}, line ${line}: ${values.length} of ${typeName || 'no type'}`;

interface PickedArrayProps extends Pick<CodeViewProps, 'worker' | 'onPut'> {
  array: CodeArray;
  name: string;
  file: File;
}

function PickedArray({ array, name, file, worker, onPut }: PickedArrayProps) {
  const { result, faults } = useAnswer(name, () => worker.run('readTable', { array, name }));
  if (faults.length > 0) return <Faults faults={faults} />;
  if (result === null) return <p role="status">Working out its figures …</p>;
  const { definition, report, better } = result;
  return (
    <div className="space-y-4">
      {array.notes.map((note) => (
        <p key={note}>{note}</p>
      ))}
      <Sketch values={array.values} label={`The ${array.values.length} entries of ${name}`} />
      <OldTableFigures before={report} after={better?.after ?? null} />
      {better && (
        <p className="quiet">
          The better table has the same length and depth. It is made from{' '}
          {better.method === 'harmonics'
            ? 'the harmonics that best tell the old one'
            : 'the smoothest loop that rounds to the old codes'}
          , without the mean, over the whole range of codes.
        </p>
      )}
      <div className="form-actions">
        {better && (
          <Button variant="primary" onPress={() => onPut({ definition: better.definition, file })}>
            Put the better table on the bench
          </Button>
        )}
        <Button onPress={() => onPut({ definition, file })}>Put it on the bench as it is</Button>
      </div>
    </div>
  );
}
