import { Link, useLocation } from 'react-router-dom';
import { EmptyState } from '../components/index.ts';
import { paths } from '../paths.ts';

/** An address with nothing behind it. */
export function NotFoundPage() {
  const { pathname } = useLocation();
  return (
    <EmptyState
      isPlace
      title="Nothing at this address"
      actions={
        <Link to={paths.bench} className="button button-primary">
          Go to the bench
        </Link>
      }
    >
      <p>
        <code className="break-all">{pathname}</code> leads nowhere. It may have been mistyped, or what was
        here has gone.
      </p>
    </EmptyState>
  );
}
