import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import express, { Router } from 'express';
import { Problem } from './problem.ts';

const oneYear = 365 * 24 * 3600 * 1000;

/** What the built page writes where each response's own nonce belongs (`html.cspNonce` in vite.config.ts). */
const noncePlace = '__NONCE__';

/** Serves the built client: its assets, whose names change with their content, and its one page at every other path. */
export function clientFiles(folder: string): Router {
  const page = readFileSync(join(folder, 'index.html'), 'utf8');
  const router = Router();
  router.use(
    '/assets',
    express.static(join(folder, 'assets'), {
      immutable: true,
      maxAge: oneYear,
      index: false,
      fallthrough: false,
    }),
  );
  router.use(express.static(folder, { index: false, redirect: false }));
  router.get('/{*path}', (request, response) => {
    // A path that looks like a file is one that is missing: answering it with the page would hide that.
    if (/\.[A-Za-z0-9]+$/.test(request.path)) throw new Problem('not-found');
    const html = page.replaceAll(noncePlace, String(response.locals.cspNonce));
    response.set('Cache-Control', 'no-cache').type('html').send(html);
  });
  return router;
}
