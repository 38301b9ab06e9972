import type { z } from 'zod';
import { revisionStateField } from '../../../shared/contract/index.ts';
import { problemKinds } from '../../http/problem.ts';
import { componentSchemas, jsonSchemaOf, type JsonSchema } from './json-schema.ts';
import type { Answer, Operation, Section } from './operation.ts';

export interface Surroundings {
  /** Name of the cookie of a sign-in. */
  readonly cookieName: string;
}

/** Puts the OpenAPI 3.1 document together. */
export function openApiDocument(sections: readonly Section[], { cookieName }: Surroundings): JsonSchema {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const { name, operations } of sections) {
    for (const operation of operations) {
      const path = operation.path.replace(/:(\w+)/g, '{$1}');
      paths[path] = { ...paths[path], [operation.method]: operationObject(operation, name) };
    }
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Stepwell',
      version: '1',
      description:
        'Wave tables for converters: compute, keep and export them. Errors are problem details (RFC 9457); ' +
        'RateLimit headers say how many requests are left.',
    },
    servers: [{ url: '/api/v1' }],
    tags: sections.map(({ name, description }) => ({ name, description })),
    paths,
    components: {
      schemas: { ...componentSchemas(), Problem: problemSchema },
      parameters: sharedParameters,
      headers: sharedHeaders,
      responses: refusalResponses,
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: cookieName, description: 'The cookie of a sign-in.' },
      },
    },
  };
}

function operationObject(operation: Operation, tag: string) {
  const { id, summary, description, access, answer } = operation;
  const role =
    access === 'anyone' || access === 'signed-in'
      ? undefined
      : `Takes the role ${access} or one that includes it.`;
  return {
    operationId: id,
    tags: [tag],
    summary,
    description: [description, role].filter(Boolean).join(' ') || undefined,
    security: access === 'anyone' ? [] : [{ session: [] }],
    parameters: parametersOf(operation),
    requestBody: bodyObject(operation),
    responses: { [answer.status]: answerObject(answer), ...refusalsOf(operation) },
  };
}

function bodyObject({ body, fileBody, bodyOptional = false }: Operation) {
  // A file has no schema: its media type says it all (OpenAPI 3.1, "Considerations for File Uploads").
  if (fileBody) return { required: true, content: { 'application/octet-stream': {} } };
  return (
    body && {
      required: !bodyOptional,
      content: { 'application/json': { schema: jsonSchemaOf(body, 'input') } },
    }
  );
}

function parametersOf({ path, query, conditional, repeatable, answer }: Operation) {
  const inPath = [...path.matchAll(/:(\w+)/g)].map(([, name]) => ({
    name,
    in: 'path',
    required: true,
    schema: pathSchemas[name] ?? { type: 'string' },
  }));
  const inQuery = Object.entries(query?.shape ?? {}).map(([name, schema]) =>
    queryParameter(name, schema as z.ZodType),
  );
  return [
    ...inPath,
    ...inQuery,
    ...(conditional ? [reference('parameters', 'IfMatch')] : []),
    ...(repeatable ? [reference('parameters', 'IdempotencyKey')] : []),
    ...(answer.cacheable ? [reference('parameters', 'IfNoneMatch')] : []),
  ];
}

const slug = { type: 'string', description: 'As in its address' };
const pathSchemas: Readonly<Record<string, JsonSchema>> = {
  team: slug,
  table: slug,
  board: slug,
  number: { type: 'integer', minimum: 1 },
  userId: { type: 'integer', minimum: 1 },
};

/** As it is once read: the text of a number is a number. */
function queryParameter(name: string, schema: z.ZodType) {
  const { description, ...shape } = jsonSchemaOf(schema, 'output');
  return { name, in: 'query', required: !schema.safeParse(undefined).success, description, schema: shape };
}

function answerObject({ description, schema, alsoAs, textAs, headers = [] }: Answer) {
  const text = { schema: { type: 'string' } };
  return {
    description,
    headers: Object.fromEntries([...headers, 'RateLimit'].map((name) => [name, reference('headers', name)])),
    content: textAs
      ? { [textAs]: text }
      : schema && {
          'application/json': { schema: jsonSchemaOf(schema, 'output') },
          ...(alsoAs ? { [alsoAs]: text } : {}),
        },
  };
}

function refusalsOf({
  access,
  query,
  body,
  fileBody,
  conditional,
  repeatable,
  answer,
  refusals = [],
}: Operation) {
  const isTeams = access !== 'anyone' && access !== 'signed-in';
  const statuses = [
    ...(access === 'anyone' ? [] : [401]),
    ...(isTeams ? [404] : []),
    ...(isTeams && access !== 'viewer' ? [403] : []),
    ...(query || repeatable ? [422] : []),
    ...(body || fileBody ? [400, 413, 415, 422] : []),
    ...(conditional ? [412, 428] : []),
    429,
    ...refusals,
  ];
  const unchanged = answer.cacheable ? { 304: { description: 'It is what If-None-Match names' } } : {};
  return {
    ...unchanged,
    ...Object.fromEntries(
      [...new Set(statuses)].sort().map((status) => [status, reference('responses', nameOf(status))]),
    ),
  };
}

const reference = (part: string, name: string) => ({ $ref: `#/components/${part}/${name}` });

const nameOf = (status: number) => `Status${status}`;

const sharedParameters = {
  IfMatch: {
    name: 'If-Match',
    in: 'header',
    required: true,
    description: 'The ETag of the state that was changed (RFC 9110 §13.1.1).',
    schema: { type: 'string' },
  },
  IfNoneMatch: {
    name: 'If-None-Match',
    in: 'header',
    description: 'The ETag of the answer that is there already (RFC 9110 §13.1.2).',
    schema: { type: 'string' },
  },
  IdempotencyKey: {
    name: 'Idempotency-Key',
    in: 'header',
    description: 'A request repeated with the same key is done once and answered alike.',
    schema: { type: 'string', pattern: '^[\\x21-\\x7e]{1,100}$' },
  },
};

const sharedHeaders = {
  ETag: { description: 'Names the state that is answered.', schema: { type: 'string' } },
  Location: { description: 'Where the new thing is.', schema: { type: 'string' } },
  'Stepwell-Revision-State': {
    description: 'The state of the revision as it is exported; its files are the same in every state.',
    schema: jsonSchemaOf(revisionStateField, 'output'),
  },
  RateLimit: { description: 'How many requests are left, and for how long.', schema: { type: 'string' } },
};

const problemSchema = {
  type: 'object',
  description: 'Problem details (RFC 9457). `current` comes with 412: the state that is there now.',
  properties: {
    type: { type: 'string', description: 'Names the kind of problem for good.' },
    title: { type: 'string' },
    status: { type: 'integer' },
    detail: { type: 'string' },
    errors: {
      type: 'array',
      description: 'The fields at fault.',
      items: {
        type: 'object',
        properties: { path: { type: 'string' }, value: { type: 'string' }, allowed: { type: 'string' } },
        required: ['path', 'value', 'allowed'],
      },
    },
    current: {},
  },
  required: ['type', 'title', 'status'],
};

/** One for each status that some problem has; a status that stands for several says them all. */
const refusalResponses = Object.fromEntries(
  [...new Set(Object.values(problemKinds).map(({ status }) => status))].map((status) => [
    nameOf(status),
    {
      description: Object.values(problemKinds)
        .filter((kind) => kind.status === status)
        .map(({ title }) => title)
        .join('; '),
      content: { 'application/problem+json': { schema: reference('schemas', 'Problem') } },
    },
  ]),
);
