import compression from 'compression';
import express, { type Express, type RequestHandler, type Router } from 'express';
import { authRoutes } from './auth/auth-routes.ts';
import { readSignIn } from './auth/sign-in-state.ts';
import type { Feature, ServerDeps } from './feature.ts';
import { account } from './features/account/routes.ts';
import { audit } from './features/audit/routes.ts';
import { boards } from './features/boards/routes.ts';
import { health } from './features/health/routes.ts';
import { invitations } from './features/invitations/routes.ts';
import { limitSets } from './features/limit-sets/routes.ts';
import { mailbox } from './features/mailbox/routes.ts';
import { notices } from './features/notices/routes.ts';
import { openapi } from './features/openapi/routes.ts';
import { rendering } from './features/rendering/routes.ts';
import { reviews } from './features/reviews/routes.ts';
import { tables } from './features/tables/routes.ts';
import { teams } from './features/teams/routes.ts';
import { uploads } from './features/uploads/routes.ts';
import { errorTranslator } from './http/error-translator.ts';
import { fileBody } from './http/file-body.ts';
import { formBody } from './http/form-body.ts';
import { generalLimit } from './http/general-limit.ts';
import { hostGate } from './http/host-gate.ts';
import { jsonBody } from './http/json-body.ts';
import { originGate } from './http/origin-gate.ts';
import { Problem } from './http/problem.ts';
import { rateLimiter } from './http/rate-limiter.ts';
import { requestLog } from './http/request-log.ts';
import { noSuchRoute } from './http/routes.ts';
import { cspNonce, securityHeaders } from './http/security-headers.ts';

/** Every resource of the API, the most asked for first: a request goes through their routes in this order. */
const features: readonly Feature[] = [
  tables,
  boards,
  reviews,
  uploads,
  health,
  account,
  teams,
  limitSets,
  invitations,
  notices,
  audit,
  mailbox,
  rendering,
  openapi,
];

export interface AppDeps extends ServerDeps {
  /** Serves the client: the built files or, in development, the development server. */
  readonly client: RequestHandler | Router;
  /** Off in development, whose server injects scripts of its own. */
  readonly contentPolicy: boolean;
}

/** The routers of all features, for the API and for the tests that go through every route. */
export const buildRouters = (deps: ServerDeps): Router[] => features.map((feature) => feature(deps));

/** Puts the application together; it listens nowhere yet. */
export function buildApp(deps: AppDeps): Express {
  const { config, origins } = deps;
  const app = express();
  app.set('trust proxy', config.trustedProxies.length > 0 && [...config.trustedProxies]);
  app.set('query parser', 'simple');
  // Entity tags say which state of a resource is meant; only what has states gets one, by hand.
  app.set('etag', false);
  app.disable('x-powered-by');

  app.use(requestLog(deps.logger));
  app.use(hostGate(origins));
  app.use(cspNonce);
  app.use(securityHeaders({ https: origins[0].startsWith('https:'), policy: deps.contentPolicy }));
  app.use(packed);

  const known = [readSignIn(deps), generalLimit(rateLimiter(deps))];
  app.use('/auth', noStore, ...known, ...authRoutes(deps));
  const routers = buildRouters(deps);
  app.use('/api/v1/notices/unsubscribe', formBody);
  app.use(
    '/api/v1',
    noStore,
    originGate(origins),
    ...known,
    fileBody,
    jsonBody,
    ...routers,
    noSuchRoute(routers),
  );
  app.use('/api', nothingHere);

  app.use(deps.client);
  app.use(nothingHere);
  app.use(errorTranslator);
  return app;
}

const pack = compression();
/** An export has a tag that stands for its very bytes: whether to pack it is not even considered. */
const packed: RequestHandler = (request, response, next) =>
  request.path.endsWith('/export') ? next() : pack(request, response, next);

const noStore: RequestHandler = (_request, response, next) => {
  response.set('Cache-Control', 'no-store');
  next();
};

const nothingHere: RequestHandler = (request) => {
  throw new Problem('not-found', { detail: `There is nothing at ${request.originalUrl}.` });
};
