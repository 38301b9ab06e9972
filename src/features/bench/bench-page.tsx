import './bench.css';
import { useCallback, useEffect, useRef } from 'react';
import { Flight, Flights, useToast } from '../../components/index.ts';
import { BenchHead } from './bench-head.tsx';
import { BenchNotices } from './bench-notices.tsx';
import { BenchDrawings } from './drawings/bench-drawings.tsx';
import { ExportFlight, ExportSummary } from './export/export-flight.tsx';
import { OutputFlight, OutputSummary } from './output/output-flight.tsx';
import { flightOfField, type FlightId } from './problems/field-names.ts';
import { flightOfInput, goToField, goToInput } from './problems/go-to-field.ts';
import { ProblemSummary } from './problems/problem-summary.tsx';
import { QuantiseFlight, QuantiseSummary } from './quantise/quantise-flight.tsx';
import { BenchShape, ShapeSummary } from './shape-on-bench.tsx';
import { DefinitionText } from './source-text/index.ts';
import { useCopyLink } from './share/use-copy-link.tsx';
import { theBench } from './state/use-bench.ts';
import { useBenchKeys } from './view/use-bench-keys.ts';
import { useSteps } from './view/use-steps.ts';
import { useIsWide } from './view/use-is-wide.ts';
import { useOpenFlights } from './view/use-open-flights.ts';

const flights = [
  { id: 'shape', title: 'Shape', Summary: ShapeSummary, Body: BenchShape },
  { id: 'quantise', title: 'Quantise', Summary: QuantiseSummary, Body: QuantiseFlight },
  { id: 'output', title: 'Output', Summary: OutputSummary, Body: OutputFlight },
  { id: 'export', title: 'Export', Summary: ExportSummary, Body: ExportFlight },
] as const;

/** The first page: flights at the left, drawings at the right; where there is no room for both, drawings first. */
export function BenchPage() {
  const flightState = useOpenFlights();
  const { open, setOpen } = flightState;
  const isWide = useIsWide();
  const toast = useToast();
  const { copyLink, linkDialog } = useCopyLink();

  const copy = useCallback(() => {
    const { history, table, problems } = theBench().getState();
    if (problems.length === 0 && table !== null) {
      copyLink({ definition: table.definition, playback: history.present.playback });
    } else {
      toast({
        message: 'A link can carry only a wave that builds. Put the marked fields right first.',
        tone: 'fault',
      });
    }
  }, [copyLink, toast]);

  const openThen = useOpenThen(flightState);
  const goTo = useCallback(
    (path: string) => openThen(flightOfField(path), () => goToField(path)),
    [openThen],
  );
  useBenchKeys(setOpen, copy);
  useSteps();

  const parts = [
    <div key="flights" className="bench-flights">
      <Flights>
        {flights.map(({ id, title, Summary, Body }, index) => (
          <Flight
            key={id}
            id={id}
            number={(index + 1) as 1 | 2 | 3 | 4}
            title={title}
            summary={<Summary />}
            isOpen={open.includes(id)}
            onToggle={(isOpen) => setOpen(id, isOpen)}
          >
            <Body isOpen={open.includes(id)} onGoTo={goTo} />
          </Flight>
        ))}
      </Flights>
      <DefinitionText />
    </div>,
    <BenchDrawings key="drawings" onGoTo={goTo} />,
  ];
  return (
    <div className="bench">
      <div className="bench-top">
        <BenchHead onCopyLink={copy} />
        <BenchNotices />
        <ProblemSummary
          onGoTo={goTo}
          onGoToInput={(id) => openThen(flightOfInput(id), () => goToInput(id))}
        />
      </div>
      {isWide ? parts : parts.toReversed()}
      {linkDialog}
    </div>
  );
}

/** Opens a flight, unless it is open or there is none, and once it is there goes on. */
function useOpenThen({ open, setOpen }: ReturnType<typeof useOpenFlights>) {
  const next = useRef<(() => void) | null>(null);
  useEffect(() => {
    next.current?.();
    next.current = null;
  }, [open]);
  return useCallback(
    (flight: FlightId | null, goOn: () => void) => {
      if (flight === null || open.includes(flight)) return goOn();
      next.current = goOn;
      setOpen(flight, true);
    },
    [open, setOpen],
  );
}
