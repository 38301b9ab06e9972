import type { RatePlan } from '../../../../shared/playback/index.ts';
import { formatQuantity } from '../../../../shared/quantities/index.ts';
import { Button, icons } from '../../../components/index.ts';
import { sayCents } from './read-tone.ts';

interface PlanTableProps {
  plans: readonly RatePlan[];
  isChosen: (plan: RatePlan) => boolean;
  onChoose: (plan: RatePlan) => void;
}

/** Timer settings in order of their error, each to be taken by a press. */
export function PlanTable({ plans, isChosen, onChoose }: PlanTableProps) {
  const hasLengths = new Set(plans.map(({ tableLength }) => tableLength)).size > 1;
  return (
    <table className="plan-table">
      <caption className="sr-only">Timer settings, the nearest tone first</caption>
      <thead>
        <tr>
          <th scope="col">Setting</th>
          <th scope="col">Tone and error</th>
          <th scope="col">Cycles a sample</th>
          <td />
        </tr>
      </thead>
      <tbody>
        {plans.map((plan) => {
          const { prescaler, compare, tableLength, sampleRateHz, actualHz, errorCents } = plan;
          const chosen = isChosen(plan);
          const setting = `prescaler ${prescaler}, compare ${compare}${hasLengths ? `, ${tableLength} entries` : ''}`;
          return (
            <tr key={setting} aria-current={chosen || undefined}>
              <th scope="row">
                <span>
                  <span className="sr-only">prescaler </span>÷{prescaler},{' '}
                  <span className="sr-only">compare </span>
                  {compare}
                </span>
                <small>
                  {hasLengths && `${tableLength} entries, `}
                  {formatQuantity(sampleRateHz, 'Hz', { significant: 5 })}
                </small>
              </th>
              <td>
                <span>{formatQuantity(actualHz, 'Hz', { significant: 6 })}</span>
                <small>{sayCents(errorCents)}</small>
              </td>
              <td>
                <span>{plan.cyclesPerSample.toLocaleString('en')}</span>
                <small>
                  {plan.fits === false ? (
                    <span className="plan-short">
                      <icons.caution width="14" height="14" /> too few
                    </span>
                  ) : (
                    'fits'
                  )}
                </small>
              </td>
              <td>
                {chosen ? (
                  <span className="plan-chosen">
                    <icons.good width="16" height="16" /> in use
                  </span>
                ) : (
                  <Button size="small" aria-label={`Use ${setting}`} onPress={() => onChoose(plan)}>
                    Use
                  </Button>
                )}
              </td>
            </tr>
          );
        })}
      </tbody>
      {plans.length > 0 && plans[0].toleranceCents !== null && (
        <tfoot>
          <tr>
            <td colSpan={4}>
              The clock’s own tolerance is worth ±{sayCents(plans[0].toleranceCents).replace('+', '')}.
            </td>
          </tr>
        </tfoot>
      )}
    </table>
  );
}
