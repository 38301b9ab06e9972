import { useCallback, useEffect, useState, type ComponentType } from 'react';
import { Button } from '../../../components/index.ts';
import { useBench } from '../state/use-bench.ts';
import type { ExportPanelProps } from './export-panel.tsx';
import { targetTitles } from './target-titles.ts';

/** Files for firmware. Templates and the code view load when the flight is first opened. */
export function ExportFlight({ isOpen, onGoTo }: { isOpen: boolean } & ExportPanelProps) {
  const { Panel, hasFailed, load } = usePanel();
  useEffect(() => {
    if (isOpen) load();
  }, [isOpen, load]);
  if (Panel !== null) return <Panel onGoTo={onGoTo} />;
  if (!hasFailed) return <p role="status">Opening the export…</p>;
  return (
    <div role="alert" className="space-y-2">
      <p>The export could not be loaded. The wave on the bench is not touched by that.</p>
      <Button size="small" onPress={load}>
        Try again
      </Button>
    </div>
  );
}

function usePanel() {
  const [Panel, setPanel] = useState<ComponentType<ExportPanelProps> | null>(null);
  const [hasFailed, setHasFailed] = useState(false);
  const load = useCallback(() => {
    setHasFailed(false);
    import('./export-panel.tsx').then(
      ({ ExportPanel }) => setPanel(() => ExportPanel),
      () => setHasFailed(true),
    );
  }, []);
  return { Panel, hasFailed, load };
}

/** The target and the size of the array, in one line. */
export function ExportSummary() {
  const target = useBench(({ history }) => history.present.exporting.target);
  const bytes = useBench(({ table }) => table?.report.tableBytes);
  const size = bytes === undefined ? '' : ` · ${bytes.toLocaleString('en')} bytes`;
  return `${targetTitles[target] ?? target}${size}`;
}
