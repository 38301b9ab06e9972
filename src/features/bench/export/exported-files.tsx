import type { GeneratedFile } from '../../../../shared/contract/index.ts';
import { storedBytes } from '../../../../shared/firmware/index.ts';
import { FilesView, useCopy } from '../../../components/code/index.ts';
import { Button, icons } from '../../../components/index.ts';
import { saveFile } from '../../../components/save-file.ts';
import { saveText } from '../../../components/save-text.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { sayRoom, type FlashBudget } from './flash-budget.ts';
import { ProofStatus } from './proof-status.tsx';
import { commandFor, definitionFileName, type TypedOptions } from './render-export.ts';

interface ExportedFilesProps {
  table: TableAnswer;
  targetId: string;
  options: TypedOptions;
  files: readonly GeneratedFile[];
  /** Name of the file in sight; the first where there is none of that name. */
  selected: string;
  onSelect: (name: string) => void;
  /** What the words have to fit into, if a board says so. */
  budget: FlashBudget | null;
}

export function ExportedFiles({
  table,
  targetId,
  options,
  files,
  selected,
  onSelect,
  budget,
}: ExportedFilesProps) {
  const copy = useCopy();
  const { name } = table.definition;
  const bytes = storedBytes(table, targetId, options);

  return (
    <div className="space-y-3">
      <p>
        The words take <strong className="font-mono">{bytes.toLocaleString('en')}</strong>{' '}
        {bytes === 1 ? 'byte' : 'bytes'} of flash{options.storage === 'ram' && ', and as many of RAM'}.
        {budget !== null && ` ${sayRoom(bytes, budget)}`}
      </p>
      <FilesView
        {...{ files, selected, onSelect }}
        downloads={(shown) => (
          <>
            <Button size="small" icon={icons.download} onPress={() => saveFile(shown)}>
              Download {shown.name}
            </Button>
            <Button size="small" icon={icons.download} onPress={() => files.forEach(saveFile)}>
              Download each file
            </Button>
          </>
        )}
      />
      <ProofStatus targetId={targetId} />
      <section className="space-y-2">
        <h3>The same files from the command line</h3>
        <p>
          Keep the definition beside your firmware and let its build write the files: the bytes are the same
          as here.
        </p>
        <pre className="command-line">{commandFor(name, targetId, options)}</pre>
        <div className="flex flex-wrap gap-2">
          <Button
            size="small"
            icon={icons.copy}
            onPress={() => void copy(commandFor(name, targetId, options), 'Command line')}
          >
            Copy the command line
          </Button>
          <Button
            size="small"
            icon={icons.download}
            onPress={() =>
              saveText(
                definitionFileName(name),
                `${JSON.stringify(table.definition, null, 2)}\n`,
                'application/json',
              )
            }
          >
            Download {definitionFileName(name)}
          </Button>
        </div>
      </section>
    </div>
  );
}
