import { useMemo, useState } from 'react';
import { createPlotLink, PlotLinkProvider } from '../../../plots/index.ts';
import { DifferencePlot, OverlayPlot, SpectraPlot } from '../../../plots/comparison-plots.tsx';
import type { CodesCompared } from './code-differences.ts';
import type { Pair, Side } from './side.ts';

interface DrawingsPartProps {
  pair: Pair;
  names: { a: string; b: string };
  compared: CodesCompared;
}

/** Names on a drawing have little room. */
const longestName = 26;
const shortened = (name: string) => (name.length > longestName ? `${name.slice(0, longestName - 1)}…` : name);

/** Both staircases, what lies between them, and both spectra. */
export function DrawingsPart({ pair: { a, b }, names, compared }: DrawingsPartProps) {
  const [link] = useState(createPlotLink);
  const [nameA, nameB] = [shortened(names.a), shortened(names.b)];
  const overlay = useMemo(() => ({ a: stairsOf(a, nameA), b: stairsOf(b, nameB) }), [a, b, nameA, nameB]);
  const spectra = useMemo(() => ({ a: linesOf(a, nameA), b: linesOf(b, nameB) }), [a, b, nameA, nameB]);
  const isOtherwiseLong = compared.kind === 'other-length';
  return (
    <section className="compare-plots" aria-label="Drawings">
      <PlotLinkProvider value={link}>
        <OverlayPlot data={overlay} />
        {!isOtherwiseLong && compared.count > 0 && <DifferencePlot data={compared} />}
      </PlotLinkProvider>
      {a.revision.definition.table.cycles !== b.revision.definition.table.cycles && (
        <p className="quiet">
          The tables hold different numbers of cycles, {a.revision.definition.table.cycles} and{' '}
          {b.revision.definition.table.cycles}: the drawing lays table over table, not cycle over cycle.
        </p>
      )}
      <SpectraPlot data={spectra} />
    </section>
  );
}

const stairsOf = ({ table, revision }: Side, name: string) => ({
  name,
  values: table.values,
  codes: table.codes,
  range: revision.definition.table.range,
});

const linesOf = ({ table, revision }: Side, name: string) => ({
  name,
  amplitudes: table.spectrum.amplitudes,
  cycles: revision.definition.table.cycles,
});
