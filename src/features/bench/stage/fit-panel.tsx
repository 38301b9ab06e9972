import './stage.css';
import { useMemo } from 'react';
import type { Board } from '../../../../shared/contract/index.ts';
import type { FittedTable } from '../../../../shared/output-stage/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, ChoiceField, Explain, TextField, useToast } from '../../../components/index.ts';
import { useLive } from '../../../live/index.ts';
import { readList } from '../../../boards/index.ts';
import type { StageJob } from '../../../workers/stage-messages.ts';
import { nameOfField } from '../problems/field-names.ts';
import { readLevels } from '../quantise/levels/read-levels.ts';
import { sameValue } from '../state/same-value.ts';
import { useCalmTable } from '../state/tables.ts';
import { changeDefinition, useDefinition } from '../state/use-bench.ts';
import { BagPart } from './bag-part.tsx';
import { BitsFit } from './bits-fit.tsx';
import { Fact, Facts } from './fact.tsx';
import { Fault } from './fault.tsx';
import { fitWishes, wishFit, type Measured } from './fit-wishes.ts';
import { KeepLevels } from './keep-levels.tsx';
import { MeasuredText } from './measured-text.tsx';
import { measuredVolts } from './measured-volts.ts';
import { OnStageBoard } from './on-stage-board.tsx';
import { useStage } from './use-stage.ts';

const kinds = [
  { value: 'levels', label: 'Levels', hint: 'The voltage of every code, measured at the output.' },
  { value: 'weights', label: 'Bit weights', hint: 'What each bit alone adds, in volts, bit 0 first.' },
  {
    value: 'resistors',
    label: 'Resistors',
    hint: 'Single resistors of the ladder, measured before soldering.',
  },
  {
    value: 'board',
    label: 'Board’s own',
    hint: 'Nothing more: the board’s own levels, of its ladder and pins or as they were measured.',
  },
] as const;

/** Codes chosen for the converter as it was built. */
export function FitPanel() {
  return <OnStageBoard>{(board) => <Fitting board={board} />}</OnStageBoard>;
}

function Fitting({ board }: { board: Board }) {
  const wishes = useLive(fitWishes);
  const { measured } = wishes;
  const volts = useMemo(() => measuredVolts(wishes, board), [wishes, board]);
  return (
    <>
      <ChoiceField
        label="What was measured"
        value={measured}
        options={kinds}
        onChange={(next: Measured) => wishFit({ measured: next })}
        aside={
          <Explain title="Fit to the real ladder">
            <p>
              With the voltage of every code known, each sample takes the code whose voltage is nearest to
              what it is meant to be, <code>Vmin + (x + 1)/2·(Vmax − Vmin)</code>. Uneven steps then cost far
              less.
            </p>
          </Explain>
        }
      />
      {measured === 'levels' && (
        <MeasuredText
          label="Level voltages"
          description="In order of the codes, or lines of a code and its voltage."
          text={wishes.levels}
          reading={readLevels(wishes.levels, wishes.levelsComma)}
          onChange={(levels, levelsComma) => wishFit({ levels, levelsComma })}
        />
      )}
      {measured === 'weights' && (
        <MeasuredText
          label="Bit weights"
          description={`${board.output.bits} voltages, bit 0 first, each above the level of code 0.`}
          text={wishes.weights}
          reading={readLevels(wishes.weights, wishes.weightsComma)}
          onChange={(weights, weightsComma) => wishFit({ weights, weightsComma })}
        />
      )}
      {measured === 'resistors' && board.output.kind === 'ladder' && (
        <>
          <OhmsField name="rungs" label="Rungs" count={board.output.bits} what="from pin to node" />
          <OhmsField
            name="series"
            label="Series resistors"
            count={board.output.bits - 1}
            what="from node to node"
          />
          <OhmsField name="terminator" label="Terminator" count={1} what="from node 0 to the low rail" />
          <BagPart board={board} output={board.output} />
        </>
      )}
      {volts.kind === 'refused' && volts.why !== undefined && (
        <p className="figure-note" role="status">
          {volts.why}
        </p>
      )}
      {volts.kind === 'volts' && (
        <>
          <Fitted volts={volts.volts} />
          {measured !== 'board' && <KeepLevels volts={volts.volts} />}
        </>
      )}
    </>
  );
}

function OhmsField({
  name,
  label,
  count,
  what,
}: {
  name: 'rungs' | 'series' | 'terminator';
  label: string;
  count: number;
  what: string;
}) {
  const text = useLive(fitWishes)[name];
  const read = readList(text, 'Ω');
  return (
    <TextField
      label={`${label}, Ω`}
      isCode
      autoComplete="off"
      value={text}
      onChange={(next) => wishFit({ [name]: next })}
      description={`${count} of them, ${what}, bit 0 first; nothing where they are as on the board.`}
      problem={'fault' in read ? read.fault : undefined}
    />
  );
}

function Fitted({ volts }: { volts: readonly number[] }) {
  const table = useCalmTable();
  const bits = Math.log2(volts.length);
  const tableBits = useDefinition((definition) => definition.table.bits);
  const fits = bits === tableBits && table?.definition.table.bits === bits;
  const definition = fits ? table.definition : null;
  const job = useMemo((): (StageJob & { kind: 'fit' }) | null => {
    if (definition === null) return null;
    // Against codes chosen for even levels, though the bench may have taken these up already.
    const { levels: _own, ...even } = definition.table;
    return { kind: 'fit', definition: { ...definition, table: even }, volts };
  }, [definition, volts]);
  const { answer, fault } = useStage('fit', job);
  return (
    <>
      <BitsFit bits={bits} />
      <Fault of="fit" fault={fault} />
      {fits && answer === null && fault === null && <p role="status">Fitting the table…</p>}
      {fits && answer !== null && <Outcome fitted={answer} />}
    </>
  );
}

function Outcome({ fitted }: { fitted: FittedTable }) {
  const toast = useToast();
  const inUse = useDefinition(({ table }) => table.levels);
  const { before, after, changed, definition } = fitted;
  const isTaken = sameValue(inUse, definition.table.levels);
  return (
    <>
      <Facts label="Before and after the fit">
        <Fact name="SINAD before" is={db(before.sinadDb)}>
          <p>The codes as they are for even levels, played through the measured ones.</p>
        </Fact>
        <Fact name="SINAD after" is={db(after.sinadDb)}>
          <p>Codes chosen for the measured levels, played through them.</p>
        </Fact>
        <Fact name="SNR before" is={db(before.snrDb)}>
          <p>
            The wave against all that the codes add to it. For a wave of several partials it tells more than
            SINAD, which counts the wave’s own partials as distortion.
          </p>
        </Fact>
        <Fact name="SNR after" is={db(after.snrDb)}>
          <p>The same with codes chosen for the measured levels.</p>
        </Fact>
      </Facts>
      {changed.length > 0 && (
        <p className="figure-note">
          Measured levels do not go with these, which are set aside:{' '}
          {changed.map(({ path, from, to }) => `${nameOfField(path)} ${from} becomes ${to}`).join('; ')}.
        </p>
      )}
      {isTaken ? (
        <p role="status" className="figure-note">
          The table on the bench is fitted to these levels.
        </p>
      ) : (
        <Button
          size="small"
          variant="primary"
          onPress={() => {
            changeDefinition((present) => ({ ...present, table: definition.table }));
            toast({ message: 'The table is fitted to the measured levels.', tone: 'good' });
          }}
        >
          Fit the table
        </Button>
      )}
    </>
  );
}

const db = (value: number | null) => formatQuantity(value, 'dB', { decimals: 1 });
