import { Link, useRevalidator, useRouteError } from 'react-router-dom';
import { ProblemError } from '../api/problem-error.ts';
import { Button, EmptyState } from '../components/index.ts';
import { paths } from '../paths.ts';
import { RouteFault } from '../shell/route-fault.tsx';

/** Stands in for a place whose content the server did not give. */
export function PlaceFault() {
  const fault = useRouteError();
  const { revalidate, state } = useRevalidator();
  if (!(fault instanceof ProblemError)) return <RouteFault />;
  return (
    <EmptyState
      isPlace
      title={fault.status === 404 ? 'This is not there, or not yours to see' : 'This could not be fetched'}
      actions={
        <>
          <Button variant="primary" isDisabled={state === 'loading'} onPress={() => void revalidate()}>
            Try again
          </Button>
          <Link to={paths.bench} className="button button-plain">
            Go to the bench
          </Link>
        </>
      }
    >
      <p role="alert">{fault.message}</p>
    </EmptyState>
  );
}
