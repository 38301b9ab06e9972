import { Validator } from '@seriousme/openapi-schema-validator';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildRouters } from '../../server/app.ts';
import { listRoutes } from '../../server/http/routes.ts';
import { asPerson } from '../support/people.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

interface Document {
  readonly openapi: string;
  readonly paths: Record<
    string,
    Record<string, { operationId: string; parameters: { name: string; in: string }[] }>
  >;
  readonly components: Record<string, Record<string, unknown>>;
}

let test: TestApp;
let document: Document;
beforeAll(async () => {
  test = makeTestApp();
  document = (await asPerson(test).get('/openapi.json')).body;
});
afterAll(() => test.close());

describe('the OpenAPI document', () => {
  it('is valid by the JSON schema of OpenAPI 3.1 (spec.openapis.org, in @seriousme/openapi-schema-validator)', async () => {
    const validator = new Validator();
    const { valid, errors } = await validator.validate(structuredClone(document) as never);
    expect(errors).toBeUndefined();
    expect(valid).toBe(true);
    expect(validator.version).toBe('3.1');
    const { info: _, ...untitled } = structuredClone(document) as Document & { info: object };
    expect((await new Validator().validate(untitled as never)).valid).toBe(false);
  });

  it('tells of every route that the routers have, and of no other', () => {
    const routes = listRoutes(buildRouters(test.deps)).flatMap(({ path, methods }) =>
      methods.map((method) => `${method} ${path.replace(/:(\w+)/g, '{$1}')}`),
    );
    const told = Object.entries(document.paths).flatMap(([path, operations]) =>
      Object.keys(operations).map((method) => `${method.toUpperCase()} ${path}`),
    );
    expect(told.sort()).toEqual(routes.sort());
  });

  it('names each operation once and describes every part of its path', () => {
    const operations = Object.entries(document.paths).flatMap(([path, methods]) =>
      Object.values(methods).map((operation) => ({ path, ...operation })),
    );
    const ids = operations.map(({ operationId }) => operationId);
    expect(new Set(ids).size).toBe(ids.length);
    for (const { path, parameters } of operations) {
      const described = parameters.filter((parameter) => parameter.in === 'path').map(({ name }) => name);
      expect(described).toEqual([...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name));
    }
  });

  it('refers only to what is in it', () => {
    const references = [...JSON.stringify(document).matchAll(/"\$ref":"#\/components\/([\w]+)\/([\w]+)"/g)];
    expect(references.length).toBeGreaterThan(50);
    for (const [, part, name] of references)
      expect(document.components[part], `${part} ${name}`).toHaveProperty(name);
    expect(JSON.stringify(document)).not.toMatch(/"\$ref":"(?!#\/components\/)/);
  });

  it('tells what every list holds', () => {
    const lists: Record<string, unknown>[] = [];
    JSON.stringify(document, (_key, value: Record<string, unknown> | null) => {
      if (value?.type === 'array') lists.push(value);
      return value;
    });
    expect(lists.length).toBeGreaterThan(50);
    expect(
      lists.filter(({ items }) => items === undefined || Object.keys(items as object).length === 0),
    ).toEqual([]);
  });

  it('is sent again only where it has changed', async () => {
    const first = await asPerson(test).get('/openapi.json');
    const second = await asPerson(test).get('/openapi.json').set('If-None-Match', first.headers.etag);
    expect([first.status, second.status]).toEqual([200, 304]);
  });
});
