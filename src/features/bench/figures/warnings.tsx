import type { Warning } from '../../../../shared/contract/index.ts';
import { Caution } from '../../../components/index.ts';
import { nameOfField } from '../problems/field-names.ts';

/** More than these are counted, not listed. */
const mostListed = 3;

/** What the engine did that may not be meant: partials left out, samples clipped. */
export function Warnings({
  warnings,
  onGoTo,
}: {
  warnings: readonly Warning[];
  onGoTo?: (path: string) => void;
}) {
  if (warnings.length === 0) return null;
  return (
    <Caution title={warnings.length === 1 ? 'To note' : `${warnings.length} things to note`}>
      <ul>
        {warnings.slice(0, mostListed).map(({ path, message }, index) => (
          <li key={index}>
            {onGoTo && (
              <>
                <button type="button" className="link" onClick={() => onGoTo(path)}>
                  {nameOfField(path)}
                </button>
                {': '}
              </>
            )}
            {message}
          </li>
        ))}
      </ul>
      {warnings.length > mostListed && <p>And {warnings.length - mostListed} more.</p>}
    </Caution>
  );
}
