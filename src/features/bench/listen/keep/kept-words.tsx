import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { Button, Notice } from '../../../../components/index.ts';
import type { KeepSettings } from './keep-settings.ts';
import type { KeepState } from './use-keep.ts';

const dbfs = (db: number) => formatQuantity(db, 'dBFS', { decimals: 2 });

interface KeptWordsProps {
  state: KeepState;
  onStop: () => void;
  /** Keeps it once more with other settings. */
  onKeepWith: (part: Partial<KeepSettings>) => void;
}

/** How far the file is, what was saved, or why nothing was. */
export function KeptWords({ state, onStop, onKeepWith }: KeptWordsProps) {
  switch (state.kind) {
    case 'idle':
      return null;
    case 'working':
      return (
        <div className="space-y-2">
          <progress
            className="keep-bar"
            max={1}
            value={state.share}
            aria-label="Share of the file that is made"
          />
          <Button size="small" onPress={onStop}>
            Stop making the file
          </Button>
        </div>
      );
    case 'stopped':
      return <p role="status">Stopped. Nothing was saved.</p>;
    case 'failed':
      return (
        <Notice tone="fault" title="Nothing was saved.">
          <p>{state.message}</p>
        </Notice>
      );
    case 'clips':
      return (
        <div className="reasons" role="alert">
          <p>
            Nothing was saved: with the table’s full scale as the file’s, it peaks at {dbfs(state.peakDbfs)},
            and whole numbers end at 0 dBFS. Limited to half of the file’s rate, and behind a filter or a
            device, a wave swings a little beyond its steps.
          </p>
          <div className="flex flex-wrap gap-2">
            <Button size="small" onPress={() => onKeepWith({ level: 'peak' })}>
              Keep it with its peak at −1 dBFS
            </Button>
            <Button size="small" onPress={() => onKeepWith({ depth: '32f' })}>
              Keep it as 32-bit float
            </Button>
          </div>
        </div>
      );
    case 'done':
      return (
        <p role="status" className="break-words">
          Saved {state.plan.fileName}: {formatQuantity(state.plan.seconds, 's', { significant: 6 })},{' '}
          {state.file.length.toLocaleString('en')} bytes. Peak {dbfs(state.peakDbfs)}, RMS{' '}
          {dbfs(state.rmsDbfs)}; the table’s full scale is {dbfs(state.fullScaleDbfs)}.
        </p>
      );
  }
}
