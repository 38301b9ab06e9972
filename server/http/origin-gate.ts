import type { RequestHandler } from 'express';
import { Problem } from './problem.ts';

const reading = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Lets a write through only from our own pages (`Origin`), so that no other site can use a person's cookies.
 * A request with a bearer token carries its own proof, and its cookies are ignored (`readSignIn`); where they are not,
 * `takesBearer: false` lets nothing through on its account. What carries neither cookie nor `Origin` comes from no
 * browser's page and borrows nobody's sign-in: a build's `curl` may ask the stateless routes.
 */
export function originGate(origins: readonly string[], { takesBearer = true } = {}): RequestHandler {
  const own = new Set(origins);
  return (request, _response, next) => {
    const byToken = takesBearer && /^bearer /i.test(request.headers.authorization ?? '');
    const { origin, cookie } = request.headers;
    const fromNoPage = takesBearer && origin === undefined && cookie === undefined;
    if (reading.has(request.method) || byToken || fromNoPage || own.has(origin ?? '')) {
      next();
      return;
    }
    throw new Problem('foreign-origin', {
      detail: `A change needs the header Origin: ${origins[0]}${takesBearer ? ', or a bearer token' : ''}.`,
    });
  };
}
