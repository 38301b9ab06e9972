import { PlotLinkProvider } from '../../../plots/index.ts';
import { FigureStrips } from '../figures/figure-strips.tsx';
import { Warnings } from '../figures/warnings.tsx';
import { LimitsSlot } from '../limits/limits-slot.tsx';
import { liveTable, useCalmTable, useIsLate } from '../state/tables.ts';
import { useBench } from '../state/use-bench.ts';
import { useSightInUrl } from '../view/use-sight-in-url.ts';
import { LiveDrawings } from './drawings.tsx';
import { usePointsOverlay } from './use-points-overlay.ts';

/** Drawings and figures of the newest table. While the draft has a problem they stay, dimmed. */
export function BenchDrawings({ onGoTo }: { onGoTo: (path: string) => void }) {
  const isThere = useBench(({ table }) => table !== null);
  const isStale = useBench(({ problems, failure }) => problems.length > 0 || failure !== null);
  return (
    <section
      className="bench-drawings"
      aria-labelledby="drawings-title"
      data-stale={isStale ? '' : undefined}
    >
      <h2 id="drawings-title" className="sr-only">
        Drawings and figures
      </h2>
      {isThere ? (
        <>
          <Late />
          <Drawn />
          <Figures onGoTo={onGoTo} />
        </>
      ) : (
        <p className="drawings-wait" role="status">
          {isStale ? 'Nothing could be built yet.' : 'Building the first table…'}
        </p>
      )}
    </section>
  );
}

function Late() {
  return useIsLate() && <p className="drawings-late">Building…</p>;
}

function Drawn() {
  const overlay = usePointsOverlay();
  const link = useSightInUrl();
  return (
    <PlotLinkProvider value={link}>
      <LiveDrawings {...liveTable()} overlay={overlay} />
    </PlotLinkProvider>
  );
}

function Figures({ onGoTo }: { onGoTo: (path: string) => void }) {
  const table = useCalmTable();
  if (table === null) return null;
  return (
    <>
      <Warnings warnings={table.warnings} onGoTo={onGoTo} />
      <LimitsSlot table={table} />
      <FigureStrips table={table} />
    </>
  );
}
