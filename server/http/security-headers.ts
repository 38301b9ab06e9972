import { randomBytes } from 'node:crypto';
import type { RequestHandler } from 'express';
import helmet from 'helmet';

/** A fresh nonce for each response, in `response.locals.cspNonce`: styles injected by scripts carry it. */
export const cspNonce: RequestHandler = (_request, response, next) => {
  response.locals.cspNonce = randomBytes(16).toString('base64');
  next();
};

/**
 * The security headers. `policy: false` leaves the content policy out, for the development server, which injects
 * scripts of its own. Over plain http (this machine alone) neither HSTS nor an upgrade to https makes sense.
 */
export function securityHeaders({ https, policy }: { https: boolean; policy: boolean }): RequestHandler {
  return helmet({
    contentSecurityPolicy: policy && {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        styleSrc: ["'self'", (_request, response) => `'nonce-${nonceOf(response)}'`],
        imgSrc: ["'self'", 'data:', 'blob:'],
        mediaSrc: ["'self'", 'blob:'],
        connectSrc: ["'self'"],
        workerSrc: ["'self'"],
        fontSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'self'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
      },
    },
    strictTransportSecurity: https,
    // 'no-referrer' would make browsers send `Origin: null` with forms.
    referrerPolicy: { policy: 'same-origin' },
    xFrameOptions: { action: 'deny' },
  });
}

const nonceOf = (response: object) =>
  'locals' in response ? String((response.locals as { cspNonce: unknown }).cspNonce) : '';
