import type { AnswerNode, ApiDocument, OperationNode, ParameterNode } from '../../api/openapi.ts';

export interface Route {
  readonly method: string;
  readonly path: string;
  readonly operation: OperationNode;
}

export interface RouteSection {
  readonly name: string;
  readonly description: string | undefined;
  readonly routes: readonly Route[];
}

const plain = (text: string) => text.toLowerCase();

/** The document's routes under their tags; only those that hold every wanted word in path, method or summary. */
export function sectionsOf(document: ApiDocument, wanted: string): RouteSection[] {
  const words = plain(wanted).split(/\s+/).filter(Boolean);
  const routes = Object.entries(document.paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, operation]): Route => ({ method, path, operation })),
  );
  const found = routes.filter(({ method, path, operation }) => {
    const text = plain(`${method} ${path} ${operation.summary ?? ''} ${operation.operationId ?? ''}`);
    return words.every((word) => text.includes(word));
  });
  return (document.tags ?? [])
    .map(({ name, description }) => ({
      name,
      description,
      routes: found.filter(({ operation }) => operation.tags?.includes(name)),
    }))
    .filter((section) => section.routes.length > 0);
}

const nameOfRef = (ref: string) => ref.slice(ref.lastIndexOf('/') + 1);

export const parameterOf = (parameter: ParameterNode, document: ApiDocument): ParameterNode =>
  parameter.$ref === undefined
    ? parameter
    : (document.components?.parameters?.[nameOfRef(parameter.$ref)] ?? { name: nameOfRef(parameter.$ref) });

export const answerOf = (answer: AnswerNode, document: ApiDocument): AnswerNode =>
  answer.$ref === undefined ? answer : (document.components?.responses?.[nameOfRef(answer.$ref)] ?? answer);
