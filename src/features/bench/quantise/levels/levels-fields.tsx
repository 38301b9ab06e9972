import { useId, useState } from 'react';
import { limits, type Definition } from '../../../../../shared/contract/index.ts';
import { Button, Explain, TextField, icons } from '../../../../components/index.ts';
import { FieldProblem } from '../../../../components/field-frame.tsx';
import { saveText } from '../../../../components/save-text.ts';
import { createLive, useLive } from '../../../../live/index.ts';
import { nameOfField } from '../../problems/field-names.ts';
import { Spot } from '../../problems/field-problem.tsx';
import { sameValue } from '../../state/same-value.ts';
import { changeDefinition, useBench, useDefinition } from '../../state/use-bench.ts';
import { LevelsDrawing } from './levels-drawing.tsx';
import { readLevels, type Comma, type LevelsReading } from './read-levels.ts';

/** What was typed or dropped in, and how its commas are meant; it stays while the recess is shut. */
const typed = createLive<{ text: string; comma: Comma | undefined }>({ text: '', comma: undefined });

/** A file of 65,536 voltages takes less. */
const largestFile = 4_000_000;

const conflicting = ['table.dither', 'table.shaping', 'table.scale', 'table.rounding'];

/** Voltages measured at the converter, to which the codes are then fitted. */
export function LevelsFields() {
  const levels = useDefinition(({ table }) => table.levels);
  const problems = useBench((state) => state.problems);
  const conflicts = levels === undefined ? [] : problems.filter(({ path }) => conflicting.includes(path));
  const own = problems.find(({ path }) => path.startsWith('table.levels'));
  return (
    <>
      <p className="field-description">
        With the voltage of every code measured, each entry takes the code that comes nearest, even where the
        converter’s steps are uneven or fall back.
      </p>
      {levels !== undefined && (
        <div className="space-y-2">
          {levels.length >= 2 && <LevelsDrawing volts={levels} />}
          <div className="flex flex-wrap gap-2">
            <Button size="small" icon={icons.close} onPress={() => changeDefinition(withoutLevels)}>
              Clear the measured levels
            </Button>
            <Button
              size="small"
              icon={icons.download}
              onPress={() => saveText('levels.csv', csvOf(levels), 'text/csv')}
            >
              Download as CSV
            </Button>
          </div>
        </div>
      )}
      <div aria-live="polite">
        {own !== undefined && (
          <FieldProblem id="levels-problem">
            {own.value} is not allowed. Allowed: {own.allowed}.
          </FieldProblem>
        )}
        {conflicts.length > 0 && (
          <div className="reasons">
            <p>Measured levels are refused together with:</p>
            <ul>
              {conflicts.map(({ path, value }) => (
                <li key={path}>
                  {nameOfField(path)}: {value}
                </li>
              ))}
            </ul>
            <Button size="small" onPress={() => changeDefinition(withoutConflicts)}>
              Set what they need
            </Button>
          </div>
        )}
      </div>
      <LevelsEntry />
    </>
  );
}

function LevelsEntry() {
  const { text, comma } = useLive(typed);
  const bits = useDefinition(({ table }) => table.bits);
  const inUse = useDefinition(({ table }) => table.levels);
  const [fault, setFault] = useState<string | null>(null);
  const fileId = useId();
  const reading = readLevels(text, comma);
  const set = (next: string) => {
    setFault(null);
    typed.set({ text: next, comma: undefined });
  };
  const takeFile = async (file: File | undefined) => {
    if (file === undefined) return;
    if (file.size > largestFile)
      return setFault(`${file.name} has ${file.size.toLocaleString('en')} bytes; allowed: at most 4 MB`);
    set(await file.text());
  };
  return (
    <div className="space-y-2">
      <Spot path="table.levels">
        <TextField
          label="Voltages"
          multiline
          isCode
          value={text}
          onChange={set}
          placeholder={'0.0012\n0.0207\n0.0399'}
          description={`${(2 ** bits).toLocaleString('en')} of them, in the order of the codes; or lines of a code and its voltage.`}
          problem={fault ?? sayFaults(reading)}
          aside={
            <Explain title="Measured levels">
              <p>
                The voltage of each code before complement, L = 2^b of them. A sample x is meant to be{' '}
                <code>Vmin + (x + 1)/2·(Vmax − Vmin)</code>, unipolar <code>Vmin + x·(Vmax − Vmin)</code>; the
                code whose voltage is nearest is stored.
              </p>
              <p>
                It helps with ladders of common resistors and with converters whose steps are uneven. Dither,
                shaping, mid-tread and another rounding than half up do not go with it.
              </p>
            </Explain>
          }
        />
      </Spot>
      {reading.kind === 'ask' && (
        <div className="reasons" role="group" aria-label={`How ${reading.text} is meant`}>
          <p>“{reading.text}” can be read in two ways. In this text the comma is</p>
          <div className="flex flex-wrap gap-2">
            {reading.readings.map(({ comma: meant, says }) => (
              <Button key={meant} size="small" onPress={() => typed.set({ text, comma: meant })}>
                {says}
              </Button>
            ))}
          </div>
        </div>
      )}
      {reading.kind === 'levels' && !sameValue(reading.volts, inUse) && (
        <TakeUp volts={reading.volts} bits={bits} />
      )}
      <label htmlFor={fileId} className="button button-plain button-small file-button">
        <icons.upload />
        Open a CSV file
        <input
          id={fileId}
          type="file"
          className="sr-only"
          accept=".csv,.txt,text/csv,text/plain"
          onChange={({ target }) => {
            void takeFile(target.files?.[0]);
            target.value = '';
          }}
        />
      </label>
    </div>
  );
}

/** Takes as many voltages as there are codes up; of another count it says what depth they would be of. */
function TakeUp({ volts, bits }: { volts: readonly number[]; bits: number }) {
  const fitting = Math.log2(volts.length);
  const fits = volts.length === 2 ** bits;
  const isDepth = Number.isInteger(fitting) && fitting >= limits.bits.min && fitting <= limits.bits.max;
  return (
    <div className="space-y-2" role="status">
      <p className="field-description">
        {volts.length.toLocaleString('en')} voltages read
        {fits ? '.' : `; ${bits} bits need ${(2 ** bits).toLocaleString('en')}.`}
      </p>
      {fits && (
        <Button size="small" variant="primary" onPress={() => takeLevels(volts)}>
          Use these levels
        </Button>
      )}
      {!fits && isDepth && (
        <Button size="small" onPress={() => takeLevels(volts, fitting)}>
          Use them with {fitting} {fitting === 1 ? 'bit' : 'bits'}
        </Button>
      )}
    </div>
  );
}

function takeLevels(volts: readonly number[], bits?: number): void {
  changeDefinition((definition) => ({
    ...definition,
    table: { ...definition.table, levels: [...volts], ...(bits === undefined ? {} : { bits }) },
  }));
}

export function withoutLevels(definition: Definition): Definition {
  const { levels: _gone, ...table } = definition.table;
  return { ...definition, table };
}

/** The settings that measured levels ask for. */
export function withoutConflicts(definition: Definition): Definition {
  return {
    ...definition,
    table: { ...definition.table, dither: 'none', shaping: 0, scale: 'full-span', rounding: 'half-up' },
  };
}

function sayFaults(reading: LevelsReading) {
  if (reading.kind !== 'faults') return undefined;
  return (
    <ul>
      {reading.faults.map(({ line, value, allowed }, index) => (
        <li key={index}>
          Line {line}: “{value}” is not allowed. Allowed: {allowed}.
        </li>
      ))}
    </ul>
  );
}

function csvOf(levels: readonly number[]): string {
  return `code,volts\n${levels.map((volt, code) => `${code},${volt}\n`).join('')}`;
}
