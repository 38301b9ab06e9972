import { PlotLinkProvider } from '../../../plots/index.ts';
import { FigureStrips } from '../figures/figure-strips.tsx';
import { Warnings } from '../figures/warnings.tsx';
import { useBench } from '../state/use-bench.ts';
import { sampleRateOf } from '../state/wave.ts';
import { useSightInUrl } from '../view/use-sight-in-url.ts';
import { Drawings } from './drawings.tsx';
import { usePointsOverlay } from './use-points-overlay.ts';

/** Drawings and figures of the newest table. While the draft has a problem they stay, dimmed. */
export function BenchDrawings({ onGoTo }: { onGoTo: (path: string) => void }) {
  const table = useBench((state) => state.table);
  const playback = useBench(({ history }) => history.present.playback);
  const isStale = useBench(({ problems, failure }) => problems.length > 0 || failure !== null);
  const isBuilding = useBench((state) => state.isBuilding);
  const overlay = usePointsOverlay(table);
  const link = useSightInUrl();
  return (
    <section
      className="bench-drawings"
      aria-labelledby="drawings-title"
      data-stale={isStale ? '' : undefined}
    >
      <h2 id="drawings-title" className="sr-only">
        Drawings and figures
      </h2>
      {table === null ? (
        <p className="drawings-wait" role="status">
          {isStale ? 'Nothing could be built yet.' : 'Building the first table…'}
        </p>
      ) : (
        <>
          {isBuilding && <p className="drawings-late">Building…</p>}
          <PlotLinkProvider value={link}>
            <Drawings
              table={table}
              sampleRateHz={sampleRateOf(playback, table.definition.table)}
              overlay={overlay}
            />
          </PlotLinkProvider>
          <Warnings warnings={table.warnings} onGoTo={onGoTo} />
          <FigureStrips table={table} />
        </>
      )}
    </section>
  );
}
