import { createServer, request as httpRequest, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { mkdtempSync, mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Router } from 'express';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import request from 'supertest';
import { z } from 'zod';
import { Refusal } from '../../shared/contract/index.ts';
import { openDatabase } from '../../server/db/client.ts';
import { clientFiles } from '../../server/http/client-files.ts';
import { jsonLimit } from '../../server/http/json-body.ts';
import { host, makeTestApp, origin, type TestApp } from '../support/test-app.ts';

let folder: string;
let test: TestApp;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'stepwell-client-'));
  mkdirSync(join(folder, 'assets'));
  writeFileSync(
    join(folder, 'index.html'),
    '<meta property="csp-nonce" nonce="__NONCE__"><style nonce="__NONCE__"></style>',
  );
  writeFileSync(join(folder, 'assets', 'main-abc123.js'), 'export {};');
  test = makeTestApp({ client: clientFiles(folder) });
});
afterAll(async () => {
  await test.close();
  rmSync(folder, { recursive: true });
});

const get = (path: string) => request(test.app).get(path).set('Host', host);
const post = (path: string) => request(test.app).post(path).set('Host', host).set('Origin', origin);

function expectProblem(response: request.Response, status: number, kind: string) {
  expect(response.status).toBe(status);
  expect(response.headers['content-type']).toBe('application/problem+json; charset=utf-8');
  expect(response.headers['cache-control']).toBe('no-store');
  expect(response.body).toMatchObject({ type: `/problems/${kind}`, status });
}

describe('health', () => {
  it('answers 200 while the database answers', async () => {
    const response = await get('/api/v1/health');
    expect(response.status).toBe(200);
    expect(response.body).toEqual({ status: 'ok' });
    expect(response.headers['cache-control']).toBe('no-store');
  });

  it('answers 503 while it does not', async () => {
    const away = makeTestApp({
      database: openDatabase('mysql://nobody@localhost/stepwell_test_away?socketPath=%2Fnowhere%2Fs.sock'),
    });
    const response = await request(away.app).get('/api/v1/health').set('Host', host);
    expectProblem(response, 503, 'unavailable');
    expect(response.headers['retry-after']).toBe('5');
    await away.close();
  });
});

describe('requests that are refused before any feature sees them', () => {
  it.each(['evil.example', 'localhost', '127.0.0.1:1', ''])('421 for the host "%s"', async (name) => {
    expectProblem(await request(test.app).get('/').set('Host', name), 421, 'wrong-host');
  });

  it('403 for a write from another site, with none of ours as Origin', async () => {
    const write = () => request(test.app).post('/api/v1/health').set('Host', host);
    expectProblem(await write().set('Cookie', 'a=b'), 403, 'foreign-origin');
    expectProblem(await write().set('Origin', 'https://evil.example'), 403, 'foreign-origin');
    expectProblem(await write().set('Origin', 'null'), 403, 'foreign-origin');
    expectProblem(await write().set('Authorization', 'Bearer x'), 405, 'method-not-allowed');
    // Neither cookie nor Origin: no page of any site sends that, and there is no sign-in to borrow.
    expectProblem(await write(), 405, 'method-not-allowed');
  });

  it('404 below /api for an unknown address, whatever the method', async () => {
    for (const path of [
      '/api',
      '/api/v1',
      '/api/v1/nothing',
      '/api/v2/health',
      '/api/v1/%zz',
      '/api/v1/health/x',
    ]) {
      expectProblem(await get(path), 404, 'not-found');
    }
    expectProblem(await post('/api/v1/nothing').send({}), 404, 'not-found');
  });

  it('405 with the methods that are allowed', async () => {
    const response = await post('/api/v1/health').send({});
    expectProblem(response, 405, 'method-not-allowed');
    expect(response.headers.allow).toBe('GET, HEAD');
  });

  it.each(['{"a":', '{"a":1}x', 'nonsense', '"text"', '\u0000', '{"a":1e}', '[1,]'])(
    '400 for the body %j',
    async (body) => {
      const response = await post('/api/v1/health').set('Content-Type', 'application/json').send(body);
      expectProblem(response, 400, 'malformed-request');
    },
  );

  it('413 for a body over the limit, by its announced length and by what comes', async () => {
    const body = JSON.stringify('x'.repeat(10_000_000));
    const response = await post('/api/v1/health').set('Content-Type', 'application/json').send(body);
    expectProblem(response, 413, 'too-large');
    expect(response.body.detail).toContain(String(jsonLimit));
    expect(await postInPieces(10_000_000)).toBe(413);
  });

  it.each([
    'text/plain',
    'application/x-www-form-urlencoded',
    'multipart/form-data; boundary=x',
    'application/xml',
  ])('415 for %s', async (type) => {
    const response = await post('/api/v1/health').set('Content-Type', type).send('a=1');
    expectProblem(response, 415, 'unsupported-media-type');
    expect(response.body.detail).toContain('application/json');
  });

  it('415 for a charset or an encoding that nobody can read', async () => {
    const charset = post('/api/v1/health')
      .set('Content-Type', 'application/json; charset=klingon')
      .send('{}');
    expectProblem(await charset, 415, 'unsupported-media-type');
    const encoding = post('/api/v1/health')
      .set('Content-Type', 'application/json')
      .set('Content-Encoding', 'zip');
    expectProblem(await encoding.send('{}'), 415, 'unsupported-media-type');
  });

  it('422 for nesting that would exhaust a parser', async () => {
    const deep = '['.repeat(200_000) + ']'.repeat(200_000);
    const response = await post('/api/v1/health').set('Content-Type', 'application/json').send(deep);
    expectProblem(response, 422, 'validation');
    expect(response.body.errors[0].path).toBe('body');
  });
});

/** A body of unknown length, sent in pieces until the server answers. */
async function postInPieces(bytes: number): Promise<number> {
  const server: Server = createServer(test.app).listen(0, '127.0.0.1');
  await new Promise((resolve) => server.once('listening', resolve));
  const { port } = server.address() as AddressInfo;
  const headers = { Host: host, Origin: origin, 'Content-Type': 'application/json' };
  const status = await new Promise<number>((resolve, reject) => {
    const outgoing = httpRequest({
      port,
      host: '127.0.0.1',
      path: '/api/v1/health',
      method: 'POST',
      headers,
    });
    outgoing.on('response', (response) => {
      response.resume();
      resolve(response.statusCode ?? 0);
    });
    outgoing.on('error', reject);
    for (let sent = 0; sent < bytes; sent += 100_000) outgoing.write(' '.repeat(100_000));
    outgoing.end();
  });
  server.closeAllConnections();
  await new Promise((resolve) => server.close(resolve));
  return status;
}

describe('errors thrown below a route', () => {
  const throwing = (error: unknown) => {
    const router = Router();
    router.get('/api-of-the-test', () => {
      throw error;
    });
    return makeTestApp({ client: router });
  };
  const answerTo = async (error: unknown) => {
    const broken = throwing(error);
    const response = await request(broken.app).get('/api-of-the-test').set('Host', host);
    await broken.close();
    return response;
  };

  it("the engine's refusal becomes 422 with path, value and what is allowed", async () => {
    const problem = { path: 'table.bits', value: '17', allowed: 'a whole number from 1 to 16' };
    const response = await answerTo(new Refusal(problem));
    expectProblem(response, 422, 'validation');
    expect(response.body.errors).toEqual([problem]);
  });

  it("a schema's complaint becomes 422", async () => {
    const error = z.object({ bits: z.number('a number') }).safeParse({ bits: 'x' }).error;
    const response = await answerTo(error);
    expectProblem(response, 422, 'validation');
    expect(response.body.errors).toMatchObject([{ path: 'bits', allowed: 'a number' }]);
  });

  it('anything else becomes 500 and gives nothing away but a number to look up', async () => {
    const response = await answerTo(new Error('the password is mustard'));
    expectProblem(response, 500, 'internal');
    expect(response.body.instance).toMatch(/^urn:uuid:[0-9a-f-]{36}$/);
    expect(response.text).not.toContain('mustard');
  });

  it('an error after the first bytes ends the connection instead of mixing two answers', async () => {
    const router = Router();
    router.get('/half', (_request, response) => {
      response.set('Content-Length', '100').write('half');
      throw new Error('too late');
    });
    const broken = makeTestApp({ client: router });
    await expect(request(broken.app).get('/half').set('Host', host)).rejects.toThrow(/aborted|hang up/);
    await broken.close();
  });
});

describe('the client', () => {
  it('comes with a content policy whose nonce is in the page and new each time', async () => {
    const [first, second] = [await get('/'), await get('/any/page')];
    const nonces = [first, second].map((response) => {
      const [, nonce] = /'nonce-([A-Za-z0-9+/=]+)'/.exec(response.headers['content-security-policy']) ?? [];
      expect(response.text.match(/nonce="([^"]*)"/g)).toEqual([`nonce="${nonce}"`, `nonce="${nonce}"`]);
      expect(response.headers['cache-control']).toBe('no-cache');
      return nonce;
    });
    expect(nonces[0]).not.toBe(nonces[1]);
    expect(first.headers['content-security-policy']).toContain("object-src 'none'");
    expect(first.headers['content-security-policy']).toContain("frame-ancestors 'none'");
    expect(first.headers['strict-transport-security']).toBeUndefined();
    expect(first.headers['x-powered-by']).toBeUndefined();
  });

  it('asks browsers to stay on https where it is served so', async () => {
    const secure = makeTestApp({ origins: ['https://tables.example'], client: clientFiles(folder) });
    const response = await request(secure.app).get('/').set('Host', 'tables.example');
    expect(response.headers['strict-transport-security']).toContain('max-age=');
    await secure.close();
  });

  it('keeps assets for ever and says 404 for files that are not there', async () => {
    const asset = await get('/assets/main-abc123.js');
    expect(asset.status).toBe(200);
    expect(asset.headers['cache-control']).toBe('public, max-age=31536000, immutable');
    for (const path of ['/assets/gone-1.js', '/favicon.png']) {
      expectProblem(await get(path), 404, 'not-found');
    }
    const outside = await get('/assets/%2e%2e%2findex.html');
    expect(outside.status).toBe(403);
    expect(outside.body).toEqual({ type: 'about:blank', title: 'Forbidden', status: 403 });
    expectProblem(await get('/%zz'), 400, 'malformed-request');
    expectProblem(await request(test.app).delete('/any/page').set('Host', host), 404, 'not-found');
  });
});
