import { createBrowserRouter } from 'react-router-dom';
import { paths } from './paths.ts';
import { FirstLoad } from './shell/first-load.tsx';
import { NotFoundPage } from './shell/not-found-page.tsx';
import type { Place } from './shell/places.ts';
import { RouteFault } from './shell/route-fault.tsx';
import { Shell } from './shell/shell.tsx';

/** Places in the header, in order. */
const places: readonly Place[] = [{ label: 'Bench', to: paths.bench }];

/** Composes the features into one application. Each place loads its code when it is entered. */
export function createRouter() {
  return createBrowserRouter([
    {
      element: <Shell places={places} />,
      ErrorBoundary: RouteFault,
      HydrateFallback: FirstLoad,
      children: [
        {
          path: paths.bench,
          ErrorBoundary: RouteFault,
          lazy: async () => ({ Component: (await import('./features/bench/bench-page.tsx')).BenchPage }),
        },
        {
          path: paths.sharedWave,
          ErrorBoundary: RouteFault,
          lazy: async () => ({
            Component: (await import('./features/bench/shared-wave-page.tsx')).SharedWavePage,
          }),
        },
        { path: '*', element: <NotFoundPage /> },
      ],
    },
  ]);
}
