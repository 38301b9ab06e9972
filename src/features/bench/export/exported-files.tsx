import type { GeneratedFile } from '../../../../shared/contract/index.ts';
import { Button, TabPanel, TabRow, icons, useToast } from '../../../components/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';
import { saveText } from '../save-text.ts';
import { copyText } from '../share/copy-link.ts';
import { CodeView } from './code-view.tsx';
import { commandFor, definitionFileName, type TypedOptions } from './render-export.ts';

interface ExportedFilesProps {
  table: TableAnswer;
  targetId: string;
  options: TypedOptions;
  files: readonly GeneratedFile[];
  /** Name of the file in sight; the first where there is none of that name. */
  selected: string;
  onSelect: (name: string) => void;
}

export function ExportedFiles({ table, targetId, options, files, selected, onSelect }: ExportedFilesProps) {
  const toast = useToast();
  const shown = files.find(({ name }) => name === selected) ?? files[0];
  const { name } = table.definition;
  const bytes = table.report.tableBytes;

  const copy = async (text: string, what: string) => {
    if (await copyText(text)) toast({ message: `${what} copied.`, tone: 'good' });
    else
      toast({
        message: 'The browser does not let this page copy. Select the text and copy it by hand.',
        tone: 'fault',
      });
  };

  return (
    <div className="space-y-3">
      <p>
        The array takes <strong className="font-mono">{bytes.toLocaleString('en')}</strong>{' '}
        {bytes === 1 ? 'byte' : 'bytes'} of flash.
      </p>
      <div>
        <TabRow
          label="Generated files"
          group="export"
          tabs={files.map((file) => ({ id: file.name, label: file.name }))}
          selected={shown.name}
          onSelect={onSelect}
        />
        <TabPanel id={shown.name} group="export">
          <CodeView {...shown} />
        </TabPanel>
      </div>
      <div className="flex flex-wrap gap-2">
        <Button size="small" icon={icons.copy} onPress={() => void copy(shown.text, shown.name)}>
          Copy {shown.name}
        </Button>
        <Button
          size="small"
          icon={icons.download}
          onPress={() => saveText(shown.name, shown.text, 'text/x-c')}
        >
          Download {shown.name}
        </Button>
        <Button
          size="small"
          icon={icons.download}
          onPress={() => files.forEach((file) => saveText(file.name, file.text, 'text/x-c'))}
        >
          Download each file
        </Button>
      </div>
      <section className="space-y-2">
        <h3>The same files from the command line</h3>
        <p>
          Keep the definition beside your firmware and let its build write the files: the bytes are the same
          as here.
        </p>
        <pre className="command-line">
          {commandFor(name, targetId, options)}
        </pre>
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
