import './import.css';
import { useCallback, useState } from 'react';
import { Button, Dialog } from '../../../components/index.ts';
import type { AnyFile } from '../../../../shared/imports/index.ts';
import type { OpenedRecording } from '../../../workers/imports-messages.ts';
import { CodeView } from './code-view.tsx';
import { ColumnsView } from './columns-view.tsx';
import { Faults } from './faults.tsx';
import { FilesView } from './files-view.tsx';
import { RecordingView } from './recording-view.tsx';
import { fileOf, type Chosen } from './chosen.ts';
import { StartView } from './start-view.tsx';
import { usePutOnBench } from './put-on-bench.ts';
import { faultsOf, useImportsWorker } from './use-imports.ts';

type Stage =
  | { readonly kind: 'start' }
  | { readonly kind: 'reading'; readonly name: string }
  | { readonly kind: 'files'; readonly files: readonly File[] }
  | {
      readonly kind: 'recording';
      readonly chosen: Chosen;
      readonly bytes: Uint8Array;
      readonly opened: OpenedRecording;
    }
  | {
      readonly kind: 'columns';
      readonly chosen: Chosen;
      readonly read: Extract<AnyFile, { kind: 'columns' }>;
    }
  | { readonly kind: 'code'; readonly chosen: Chosen; readonly read: Extract<AnyFile, { kind: 'code' }> };

/** What was pasted outlives the dialog: closing it loses nothing that was typed. */
let keptText = '';

/** Brings in what exists already: one file or pasted text at a time, or a folder at once. */
export function BringInDialog({ onClose }: { onClose: () => void }) {
  const worker = useImportsWorker();
  const put = usePutOnBench(onClose);
  const [stage, setStage] = useState<Stage>({ kind: 'start' });
  const [pasted, setPasted] = useState(keptText);
  const [faults, setFaults] = useState<readonly string[]>([]);

  const read = useCallback(
    async (chosen: Chosen) => {
      setFaults([]);
      setStage({ kind: 'reading', name: chosen.name });
      try {
        const bytes = chosen.file
          ? new Uint8Array(await chosen.file.arrayBuffer())
          : new TextEncoder().encode(chosen.text);
        const file = await worker.run('readAny', { bytes, name: chosen.name });
        if (file.kind === 'recording') {
          const opened = await worker.run('openRecording', { bytes, channel: 0 });
          setStage({ kind: 'recording', chosen, bytes, opened });
        } else if (file.kind === 'columns') setStage({ kind: 'columns', chosen, read: file });
        else setStage({ kind: 'code', chosen, read: file });
      } catch (error) {
        setFaults(faultsOf(error).map((fault) => (chosen.file ? `${chosen.name}: ${fault}` : fault)));
        setStage({ kind: 'start' });
      }
    },
    [worker],
  );
  const back = stage.kind !== 'start' && (
    <div>
      <Button variant="quiet" size="small" onPress={() => setStage({ kind: 'start' })}>
        Choose something else
      </Button>
    </div>
  );

  return (
    <Dialog title="Bring in" isOpen onClose={onClose} size="wide">
      <div className="bring-in">
        <div aria-live="polite" className="bring-in-faults">
          <Faults faults={faults} />
        </div>
        {stage.kind === 'start' && (
          <StartView
            pasted={pasted}
            onType={(text) => {
              keptText = text;
              setPasted(text);
            }}
            onChoose={(chosen) => void read(chosen)}
            onChooseMany={(files) => setStage({ kind: 'files', files })}
          />
        )}
        {stage.kind === 'reading' && <p role="status">Reading {stage.name} …</p>}
        {stage.kind === 'recording' && <RecordingView {...stage} worker={worker} onPut={put} />}
        {stage.kind === 'columns' && <ColumnsView {...stage} worker={worker} onPut={put} />}
        {stage.kind === 'code' && (
          <CodeView
            {...stage}
            worker={worker}
            onPut={put}
            onAll={() => setStage({ kind: 'files', files: [fileOf(stage.chosen)] })}
          />
        )}
        {stage.kind === 'files' && <FilesView files={stage.files} worker={worker} onPut={put} />}
        {back}
      </div>
    </Dialog>
  );
}
