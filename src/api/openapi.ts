import { queryOptions } from '@tanstack/react-query';
import { ask } from './client.ts';

/** A JSON Schema, as far as it is shown. */
export interface SchemaNode {
  readonly $ref?: string;
  readonly type?: string | readonly string[];
  readonly description?: string;
  readonly format?: string;
  readonly pattern?: string;
  readonly const?: unknown;
  readonly enum?: readonly unknown[];
  readonly default?: unknown;
  readonly minimum?: number;
  readonly maximum?: number;
  readonly exclusiveMinimum?: number;
  readonly exclusiveMaximum?: number;
  readonly minLength?: number;
  readonly maxLength?: number;
  readonly minItems?: number;
  readonly maxItems?: number;
  readonly items?: SchemaNode;
  readonly properties?: Readonly<Record<string, SchemaNode>>;
  readonly required?: readonly string[];
  readonly anyOf?: readonly SchemaNode[];
  readonly oneOf?: readonly SchemaNode[];
  readonly allOf?: readonly SchemaNode[];
}

export interface ParameterNode {
  readonly $ref?: string;
  readonly name?: string;
  readonly in?: string;
  readonly required?: boolean;
  readonly description?: string;
  readonly schema?: SchemaNode;
}

type Content = Readonly<Record<string, { readonly schema?: SchemaNode }>>;

export interface AnswerNode {
  readonly $ref?: string;
  readonly description?: string;
  readonly headers?: Readonly<Record<string, unknown>>;
  readonly content?: Content;
}

export interface OperationNode {
  readonly operationId?: string;
  readonly tags?: readonly string[];
  readonly summary?: string;
  readonly description?: string;
  readonly security?: readonly object[];
  readonly parameters?: readonly ParameterNode[];
  readonly requestBody?: { readonly required?: boolean; readonly content?: Content };
  readonly responses?: Readonly<Record<string, AnswerNode>>;
}

/** An OpenAPI 3.1 document, as far as it is shown. */
export interface ApiDocument {
  readonly info: { readonly title: string; readonly version: string; readonly description?: string };
  readonly servers?: readonly { readonly url: string }[];
  readonly tags?: readonly { readonly name: string; readonly description?: string }[];
  readonly paths: Readonly<Record<string, Readonly<Record<string, OperationNode>>>>;
  readonly components?: {
    readonly schemas?: Readonly<Record<string, SchemaNode>>;
    readonly parameters?: Readonly<Record<string, ParameterNode>>;
    readonly responses?: Readonly<Record<string, AnswerNode>>;
  };
}

export const apiDocumentPath = '/api/v1/openapi.json';

export const apiQueries = {
  /** Not parsed: a page that shows a document shows what is in it. */
  document: () =>
    queryOptions({
      queryKey: ['openapi'],
      queryFn: async ({ signal }) => (await ask<ApiDocument>('/openapi.json', { signal })).data,
      staleTime: Infinity,
    }),
};
