import type { RequestHandler } from 'express';
import { Problem } from './problem.ts';

/**
 * Serves only requests addressed to one of our own origins: mailed links and sign-in addresses are built from the
 * Host header, and a foreign name that resolves to this machine must not reach a person's data. Comes first.
 */
export function hostGate(origins: readonly string[]): RequestHandler {
  const hosts = new Set(origins.map((origin) => new URL(origin).host));
  return (request, _response, next) => {
    if (hosts.has(request.headers.host ?? '')) {
      next();
      return;
    }
    throw new Problem('wrong-host', { detail: `Open ${origins[0]} instead.` });
  };
}
