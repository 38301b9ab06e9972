import { useRouteError } from 'react-router-dom';
import { Button, icons } from '../components/index.ts';
import { paths } from '../paths.ts';

/** Stands in for a place that could not be shown: says what happened and what can be done. Work is kept elsewhere. */
export function RouteFault() {
  const fault = useRouteError();
  const words = fault instanceof Error ? fault.message : String(fault);
  return (
    <section className="route-fault" role="alert">
      <h1>This place could not be shown</h1>
      <p>
        Something here went wrong, or a part of the application could not be fetched. Your work is kept in
        this browser; loading the page again brings it back.
      </p>
      <p className="slab slab-oxide">
        <icons.fault className="slab-sign" />
        <code className="min-w-0 wrap-anywhere">{words}</code>
      </p>
      <div className="flex flex-wrap gap-2">
        <Button
          variant="primary"
          onPress={() => {
            location.reload();
          }}
        >
          Load again
        </Button>
        <a className="button button-plain" href={paths.bench}>
          Go to the bench
        </a>
      </div>
    </section>
  );
}
