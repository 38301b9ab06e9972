import './limits.css';
import type { LimitOutcome } from '../../shared/contract/index.ts';
import { icons } from '../components/icons.tsx';
import { limitWords, sayAllowed, sayMeasured } from './words.ts';

/** Every limit with what was measured: passed or failed, by sign and word. */
export function LimitList({ outcomes }: { outcomes: readonly LimitOutcome[] }) {
  return (
    <ul className="limit-list">
      {outcomes.map((outcome) => (
        <Row key={`${outcome.tag} ${outcome.limit}`} outcome={outcome} />
      ))}
    </ul>
  );
}

function Row({ outcome }: { outcome: LimitOutcome }) {
  const { limit, tag, allowed, passed } = outcome;
  const Sign = passed ? icons.good : icons.fault;
  return (
    <li className="limit-row" data-passed={passed}>
      <Sign width="18" height="18" />
      <span className="limit-words">
        <span>
          <strong>{limitWords[limit].figure}</strong>{' '}
          <span className="limit-figure">{sayMeasured(outcome)}</span>
        </span>
        <span className="quiet">
          <span className="limit-verdict">{passed ? 'passed' : 'failed'}</span>: {sayAllowed(limit, allowed)}
          {tag !== null && `, for ${tag}`}
        </span>
      </span>
    </li>
  );
}
