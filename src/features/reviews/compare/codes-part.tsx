import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Panel } from '../../../components/index.ts';
import type { CodesCompared } from './code-differences.ts';
import type { Pair } from './side.ts';

interface CodesPartProps {
  pair: Pair;
  names: { a: string; b: string };
  compared: CodesCompared;
}

/** Which codes differ: how many, and the largest differences first. */
export function CodesPart({ pair, names, compared }: CodesPartProps) {
  if (compared.kind === 'other-length') {
    const { before, after } = compared;
    return (
      <Panel title="The tables have different lengths">
        <p>
          {before.toLocaleString('en')} entries in {names.a}, {after.toLocaleString('en')} in {names.b}: no
          code of one has its fellow in the other. The drawing lays both over the same width.
        </p>
      </Panel>
    );
  }
  const { count, differences, largest, unit } = compared;
  const all = differences.length.toLocaleString('en');
  return (
    <Panel
      title={
        count === 0
          ? 'No code differs'
          : `${count.toLocaleString('en')} of ${all} ${count === 1 ? 'codes differs' : 'codes differ'}`
      }
    >
      {unit === 'LSB' && (
        <p className="quiet">
          A code stands for another step in each, so what they stand for is compared, in LSB of {names.b}.
        </p>
      )}
      {count === 0 ? (
        <p className="quiet">
          All {all} entries are the same. {sayStored(pair)}
        </p>
      ) : (
        <details open={largest.length <= 8}>
          <summary>
            {count > largest.length
              ? `The ${largest.length} largest differences`
              : 'All differences, the largest first'}
          </summary>
          {count > largest.length && (
            <p className="quiet">
              All of them are in the data of the drawing above, which is exported as CSV.
            </p>
          )}
          <div className="ledger-scroll" tabIndex={0} role="region" aria-label="Codes that differ">
            <table className="ledger code-rows">
              <thead>
                <tr>
                  <th scope="col" className="is-number">
                    Entry
                  </th>
                  <th scope="col" className="is-number">
                    {names.a}
                  </th>
                  <th scope="col" className="is-number">
                    {names.b}
                  </th>
                  <th scope="col" className="is-number">
                    Difference
                  </th>
                </tr>
              </thead>
              <tbody>
                {largest.map(({ index, before, after, difference }) => (
                  <tr key={index}>
                    <th scope="row" className="is-number">
                      {index}
                    </th>
                    <td className="is-number">{before}</td>
                    <td className="is-number">{after}</td>
                    <td className="is-number">
                      {difference > 0 ? '+' : ''}
                      {formatQuantity(difference, unit === 'LSB' ? 'LSB' : '', { significant: 4 })}
                    </td>
                  </tr>
                ))}
              </tbody>
            </table>
          </div>
        </details>
      )}
    </Panel>
  );
}

/** The same codes may be stored in another way. */
function sayStored({ a, b }: Pair): string {
  const [one, other] = [a.revision.definition.table, b.revision.definition.table];
  const isSame =
    one.coding === other.coding && one.complement === other.complement && one.fold === other.fold;
  return isSame ? '' : 'They are stored in another way, though: see the settings.';
}
