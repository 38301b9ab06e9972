import './rates.css';
import type { ReactNode } from 'react';
import { Refusal, type Problem } from '../../../../shared/contract/index.ts';
import {
  accumulatorProblems,
  centsBetween,
  outputHz,
  planStepWord,
  resolutionHz,
  type Accumulator,
} from '../../../../shared/playback/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, Explain, NumberField } from '../../../components/index.ts';
import { useLive } from '../../../live/index.ts';
import { sayHere } from '../problems/field-problem.tsx';
import { useCalmTable } from '../state/tables.ts';
import { changeDefinition, theBench, useBench, useDefinition } from '../state/use-bench.ts';
import { sampleRateOf, toneOf } from '../state/wave.ts';
import { readTone, sayCents, sayTone } from './read-tone.ts';
import { SpurPlot } from './spur-plot.tsx';
import { withExportOptions } from './to-export.ts';
import { ToneField } from './tone-field.tsx';
import { useAccumulator } from './use-accumulator.ts';
import { rateWishes, wish } from './wishes.ts';

const usualBits = 24;

/** A table stepped through by a phase accumulator: its frequency, its resolution and its spurs. */
export function AccumulatorPanel() {
  const length = useDefinition(({ table }) => table.length);
  const isPower = Number.isInteger(Math.log2(length)) && length >= 2;
  if (isPower) return <Accumulating length={length} />;
  const near = 2 ** Math.min(16, Math.max(1, Math.round(Math.log2(length > 2 ? length : 2))));
  return (
    <div className="reasons">
      <p>
        A phase accumulator takes the index from its top bits, so the table length must be a power of two.{' '}
        {length} is none.
      </p>
      <Button
        size="small"
        onPress={() =>
          changeDefinition((definition) => ({
            ...definition,
            table: { ...definition.table, length: near },
          }))
        }
      >
        Use {near.toLocaleString('en')} entries
      </Button>
    </div>
  );
}

function Accumulating({ length }: { length: number }) {
  const table = useDefinition((definition) => definition.table);
  const playback = useBench(({ history }) => history.present.playback);
  const { accumulatorTone } = useLive(rateWishes);
  const built = useCalmTable();
  const rateHz = sampleRateOf(playback, table);
  const least = Math.log2(length);

  const wantedText =
    accumulatorTone === ''
      ? `${Number((toneOf(playback, table) / table.cycles).toPrecision(7))} Hz`
      : accumulatorTone;
  const wanted = readTone(wantedText);
  const chosen = playback.accumulator;
  const bits = chosen?.accumulatorBits ?? Math.max(usualBits, least);
  const planned = 'hz' in wanted ? plan(bits, rateHz, wanted.hz) : undefined;
  const accumulator: Accumulator = chosen ?? {
    accumulatorBits: bits,
    stepWord: planned?.kind === 'planned' ? planned.stepWord : 1,
  };
  const problems = accumulatorProblems(length, accumulator);
  const isSound = problems.length === 0;
  const isCurrent = built !== null && built.values.length === length;
  const found = useAccumulator(isCurrent ? built.values : null, isSound ? accumulator : null);

  return (
    <>
      <p className="field-description">
        At each sample the step word is added to an accumulator of M bits, and its top {least} bits index the
        table: any tone from one sample rate.
      </p>
      <div className="field-pair">
        <NumberField
          label="Accumulator"
          unit="bits"
          isInteger
          min={least}
          max={48}
          allowed={`a whole number from ${least} to 48`}
          value={accumulator.accumulatorBits}
          onChange={(accumulatorBits) => {
            const next = 'hz' in wanted ? plan(accumulatorBits, rateHz, wanted.hz) : undefined;
            setAccumulator({
              accumulatorBits,
              stepWord:
                next?.kind === 'planned'
                  ? next.stepWord
                  : Math.min(accumulator.stepWord, 2 ** accumulatorBits - 1),
            });
          }}
          problem={problemAt(problems, 'accumulatorBits')}
        />
        <ToneField
          label="Wanted frequency"
          text={wantedText}
          onChange={(text) => {
            wish({ accumulatorTone: text });
            const read = readTone(text);
            const next = 'hz' in read ? plan(bits, rateHz, read.hz) : undefined;
            if (next?.kind === 'planned') setAccumulator({ accumulatorBits: bits, stepWord: next.stepWord });
          }}
          problem={planned?.kind === 'refused' ? planned.fault : undefined}
        />
        <NumberField
          label="Step word"
          isInteger
          min={1}
          max={2 ** accumulator.accumulatorBits - 1}
          allowed={`a whole number from 1 to ${2 ** accumulator.accumulatorBits - 1}`}
          value={accumulator.stepWord}
          onChange={(stepWord) => setAccumulator({ ...accumulator, stepWord })}
          problem={problemAt(problems, 'stepWord')}
          aside={
            <Explain title="Step word">
              <p>
                <code>f = W·fs/2^M</code>; the resolution is <code>fs/2^M</code>. Firmware computes it from
                millihertz as <code>(m·NUM + DEN/2)/DEN</code> in 64-bit integers.
              </p>
              <p>
                Bits below the index are cut off, and the error of that comes as spurs near −6.02·p dBc with a
                sine in 2^p entries, at worst 3.92 dB above (Nicholas and Samueli 1987). A step word that
                2^(M−p) divides has none.
              </p>
            </Explain>
          }
        />
      </div>
      {isSound && <Facts {...{ accumulator, rateHz }} wantedHz={'hz' in wanted ? wanted.hz : null} />}
      <div aria-live="polite">
        {found.kind === 'failed' && (
          <p className="figure-note">The spurs could not be computed: {found.message}</p>
        )}
        {found.kind === 'waiting' && isSound && <p className="figure-note">Computing the spurs…</p>}
      </div>
      {found.kind === 'there' && isSound && (
        <>
          <SpurPlot data={{ ...found, sampleRateHz: rateHz, tableLength: length }} />
          <dl className="rate-figures">
            <Fact
              name="Worst spur of the cut phase"
              is={db(found.figures.worstTruncationDbc, 'none')}
              explain="The strongest line k ≥ N/2 of the output, against the carrier: what comes of indexing the table by the top bits only. A longer table lowers it by 6.02 dB a doubling."
            />
            <Fact
              name="Strongest other line"
              is={db(found.figures.worstOtherDbc, 'none')}
              explain="Whatever line is strongest besides DC and the carrier: the wave’s own harmonics, rounding, or the cut phase."
            />
            <Fact
              name="Signal to all else"
              is={db(found.figures.snrDb, '–', 'dB')}
              explain="The carrier’s power over that of all other lines, DC left out. For a wave of several partials they count as noise here."
            />
            <Fact
              name="Repeats after"
              is={`${found.figures.period.toLocaleString('en')} samples, ${formatQuantity(found.figures.period / rateHz, 's', { significant: 4 })}`}
              explain="P = 2^M/gcd(W, 2^M). A short round has few spurs, each stronger."
            />
          </dl>
        </>
      )}
      {chosen === undefined ? (
        <Button
          size="small"
          isDisabled={!isSound}
          disabledReason="The settings are not allowed."
          onPress={() => setAccumulator(accumulator)}
        >
          Keep with the wave and set the export’s options
        </Button>
      ) : (
        <Button size="small" onPress={letGo}>
          Let the accumulator go
        </Button>
      )}
    </>
  );
}

function Facts({
  accumulator,
  rateHz,
  wantedHz,
}: {
  accumulator: Accumulator;
  rateHz: number;
  wantedHz: number | null;
}) {
  const hz = outputHz(accumulator, rateHz);
  const folded = hz > rateHz / 2 ? rateHz - hz : hz;
  const stepHz = resolutionHz(accumulator.accumulatorBits, rateHz);
  return (
    <dl className="rate-figures">
      <Fact
        name="Output"
        is={`${sayTone(folded)}${folded === hz ? '' : ' (folded back)'}`}
        explain="W·fs/2^M; above half the sample rate it is heard folded back, at fs − f."
      />
      {wantedHz !== null && (
        <Fact
          name="Error"
          is={sayCents(centsBetween(hz, wantedHz))}
          explain="1200·log2(f/f_wanted); a hundred cents are a semitone."
        />
      )}
      <Fact
        name="Resolution"
        is={formatQuantity(stepHz, 'Hz', { significant: 4 })}
        explain="fs/2^M: what one more in the step word adds to the frequency."
      />
    </dl>
  );
}

function Fact({ name, is, explain }: { name: string; is: ReactNode; explain: string }) {
  return (
    <div>
      <dt>
        {name}
        <Explain title={name}>
          <p>{explain}</p>
        </Explain>
      </dt>
      <dd>{is}</dd>
    </div>
  );
}

const db = (level: number | null, none: string, unit = 'dBc') =>
  level === null ? none : formatQuantity(level, unit, { decimals: 1 });

function problemAt(problems: readonly Problem[], path: string) {
  const problem = problems.find((one) => one.path === path);
  return problem && sayHere(problem);
}

type Plan = { kind: 'planned'; stepWord: number } | { kind: 'refused'; fault: string };

function plan(accumulatorBits: number, sampleRateHz: number, wantedHz: number): Plan {
  try {
    return { kind: 'planned', stepWord: planStepWord({ accumulatorBits, sampleRateHz }, wantedHz).stepWord };
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    return { kind: 'refused', fault: sayHere(error.problems[0]) };
  }
}

function setAccumulator(accumulator: Accumulator): void {
  theBench().change((work) => withExportOptions({ ...work, playback: { ...work.playback, accumulator } }), {
    coalesce: 'accumulator',
  });
}

function letGo(): void {
  theBench().change(({ playback: { accumulator: _gone, mode, ...playback }, ...work }) => ({
    ...work,
    playback: { ...playback, mode: mode === 'accumulator' ? 'loop' : mode },
  }));
}
