import { useMemo, useState } from 'react';
import { outputLimits, type LadderOutput } from '../../../../shared/contract/index.ts';
import {
  ladderValues,
  partsOf,
  resistorSeries,
  type LadderValues,
  type ResistorSeries,
} from '../../../../shared/output-stage/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Explain, NumberField, SelectField } from '../../../components/index.ts';

const shown = 8;

/** Ways to make R and 2R from standard values. */
export function ValuesPart({ output }: { output: LadderOutput }) {
  const [series, setSeries] = useState<ResistorSeries>('E24');
  const [wanted, setWanted] = useState<number | null>(null);
  const ohms = wanted ?? output.R;
  const ways = useMemo(() => ladderValues(series, ohms).slice(0, shown), [series, ohms]);
  return (
    <section className="space-y-2">
      <h3 className="flex items-center gap-2">
        Standard values
        <Explain title="Standard values">
          <p>
            Values of IEC 60063. A pair is one value for R and another for 2R, whose ratio is off by what is
            shown. Two of R in series, or two of 2R in parallel, have the ratio exactly and take more parts.
          </p>
        </Explain>
      </h3>
      <div className="field-pair">
        <SelectField
          label="Series"
          value={series}
          options={resistorSeries.map((value) => ({ value, label: value }))}
          onChange={setSeries}
        />
        <NumberField
          label="R near"
          unit="Ω"
          {...outputLimits.ohms}
          allowed="a resistance from 1e-9 to 1e12 Ω"
          value={ohms}
          onChange={setWanted}
        />
      </div>
      <table className="level-table">
        <caption className="sr-only">Ways to make R and 2R, exact ratios first</caption>
        <thead>
          <tr>
            <th scope="col">Buy</th>
            <th scope="col">R</th>
            <th scope="col">Ratio off</th>
            <th scope="col">Parts</th>
          </tr>
        </thead>
        <tbody>
          {ways.map((way) => (
            <tr key={`${way.from} ${way.values.join(' ')}`}>
              <th scope="row">{sayWay(way)}</th>
              <td>{q(way.R)}</td>
              <td>
                {way.ratioError === 0
                  ? 'exact'
                  : formatQuantity(100 * way.ratioError, '%', { significant: 2 })}
              </td>
              <td>{partsOf(way, output.bits)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

function sayWay({ from, values }: LadderValues): string {
  switch (from) {
    case 'pair':
      return `${q(values[0])} and ${q(values[1])}`;
    case 'series':
      return `${q(values[0])}, 2R in series`;
    case 'parallel':
      return `${q(values[0])}, R in parallel`;
  }
}

const q = (ohms: number) => formatQuantity(ohms, 'Ω', { significant: 4 });
