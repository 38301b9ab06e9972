import { useState } from 'react';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, NumberField, icons } from '../../../components/index.ts';
import { saveText } from '../../../components/save-text.ts';
import type { LevelsAnswer } from '../../../workers/stage-messages.ts';

const rowsShown = 16;

/** Ideal and real voltage of each code. */
export function LevelTable({ answer }: { answer: LevelsAnswer }) {
  const { volts, ideal, linearity } = answer;
  const [asked, setFrom] = useState(0);
  const last = volts.length - 1;
  const from = Math.max(0, Math.min(asked, last - rowsShown + 1));
  const codes = Array.from({ length: Math.min(rowsShown, volts.length) }, (_, row) => from + row);
  const errorLsb = (code: number) => (volts[code] - ideal[code]) / linearity.lsbVolts;
  return (
    <section className="space-y-2" aria-label="Level of each code">
      <h3>Level of each code</h3>
      {last >= rowsShown && (
        <NumberField
          label="From code"
          isInteger
          min={0}
          max={last}
          allowed={`a whole number from 0 to ${last}`}
          value={Math.min(asked, last)}
          onChange={setFrom}
        />
      )}
      <table className="level-table">
        <caption className="sr-only">
          Codes {from} to {from + codes.length - 1} of {volts.length}
        </caption>
        <thead>
          <tr>
            <th scope="col">Code</th>
            <th scope="col">Ideal, V</th>
            <th scope="col">Real, V</th>
            <th scope="col">Error, LSB</th>
          </tr>
        </thead>
        <tbody>
          {codes.map((code) => (
            <tr key={code}>
              <th scope="row">{code}</th>
              <td>{formatQuantity(ideal[code], '', { decimals: 5 })}</td>
              <td>{formatQuantity(volts[code], '', { decimals: 5 })}</td>
              <td>{formatQuantity(errorLsb(code), '', { decimals: 3 })}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <Button
        size="small"
        icon={icons.download}
        onPress={() => {
          const rows = Array.from(
            volts,
            (real, code) => `${code},${ideal[code]},${real},${errorLsb(code)}\n`,
          );
          saveText(
            'stepwell-levels.csv',
            `code,ideal_volts,real_volts,error_lsb\n${rows.join('')}`,
            'text/csv',
          );
        }}
      >
        All as CSV
      </Button>
    </section>
  );
}
