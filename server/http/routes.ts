import type { RequestHandler, Router } from 'express';
import { Problem } from './problem.ts';

/** A feature's routes, all with their full path below the API's root and none nested in a further router. */
export interface Route {
  readonly path: string;
  readonly methods: readonly string[];
}

const methodsOf = (layer: Router['stack'][number]): string[] =>
  Object.keys(
    (layer.route as unknown as { methods?: Record<string, boolean> } | undefined)?.methods ?? {},
  ).map((name) => name.toUpperCase());

/** Every route of the routers, for the tests that prove something about each of them. */
export const listRoutes = (routers: readonly Router[]): Route[] =>
  routers.flatMap((router) =>
    router.stack.flatMap((layer) =>
      layer.route ? [{ path: layer.route.path, methods: methodsOf(layer) }] : [],
    ),
  );

/** Ends the API: what none of its routers took has a wrong method (405) or a wrong address (404). */
export function noSuchRoute(routers: readonly Router[]): RequestHandler {
  return (request) => {
    const allowed = new Set(
      routers
        .flatMap((router) => router.stack)
        .filter((layer) => layer.route && matches(layer, request.path))
        .flatMap(methodsOf),
    );
    if (allowed.size === 0)
      throw new Problem('not-found', { detail: `There is nothing at ${request.originalUrl}.` });
    if (allowed.has('GET')) allowed.add('HEAD');
    const list = [...allowed].sort().join(', ');
    throw new Problem('method-not-allowed', {
      detail: `${request.method} is not taken here; allowed: ${list}.`,
      headers: { Allow: list },
    });
  };
}

const matches = (layer: object, path: string): boolean =>
  'match' in layer && typeof layer.match === 'function' && Boolean(layer.match(path));
