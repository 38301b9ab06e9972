import { z } from 'zod';
import * as contract from '../../../shared/contract/index.ts';

export type JsonSchema = Record<string, unknown>;

const place = (id: string) => `#/components/schemas/${id}`;

/** Schemas that have a name of their own in the document: as answered, and as sent where that differs. */
const answered: Readonly<Record<string, z.ZodType>> = {
  Definition: contract.definitionSchema,
  Source: contract.sourceSchema,
  Report: contract.reportSchema,
  Warning: contract.warningSchema,
  Table: contract.libraryTableSchema,
  TableSummary: contract.tableSummarySchema,
  Revision: contract.revisionSchema,
  RevisionSummary: contract.revisionSummarySchema,
  Board: contract.boardSchema,
  LibraryBoard: contract.libraryBoardSchema,
  BoardSummary: contract.boardSummarySchema,
  BoardRevision: contract.boardRevisionSchema,
  BoardRevisionSummary: contract.boardRevisionSummarySchema,
  GeneratedFile: contract.generatedFileSchema,
  Review: contract.reviewSchema,
  Comment: contract.commentSchema,
  LimitSet: contract.limitSetSchema,
  Team: contract.teamSchema,
  Member: contract.memberSchema,
  Invitation: contract.invitationSchema,
  Account: contract.accountSchema,
  Session: contract.sessionSchema,
};
const sent: Readonly<Record<string, z.ZodType>> = {
  DefinitionInput: contract.definitionSchema,
  SourceInput: contract.sourceSchema,
  BoardInput: contract.boardSchema,
};

/** Fields that take anything here, so that the engine's own parser can say what is wrong with it, and what they hold. */
const parsedLater = new Map<unknown, string>([
  [contract.definitionField, 'Definition'],
  [contract.renderRequestSchema.shape.definition, 'Definition'],
  [contract.boardField, 'Board'],
]);

type Side = 'input' | 'output';
const named = { input: sent, output: answered };

/** The components: every named schema, with references to each other. */
export const componentSchemas = (): Record<string, JsonSchema> => ({ ...allOf('output'), ...allOf('input') });

function allOf(io: Side): Record<string, JsonSchema> {
  const registry = z.registry<{ id: string }>();
  for (const [id, schema] of Object.entries(named[io])) registry.add(schema, { id });
  const { schemas } = z.toJSONSchema(registry, {
    io,
    uri: place,
    unrepresentable: 'any',
    override: tidied(io),
  });
  return Object.fromEntries(Object.entries(schemas).map(([id, schema]) => [id, withoutMarks(schema)]));
}

/** Any schema, with references to the named ones in it. */
export function jsonSchemaOf(schema: z.ZodType, io: Side): JsonSchema {
  const registry = z.registry<{ id: string }>();
  for (const [id, own] of Object.entries(named[io])) registry.add(own, { id });
  registry.add(schema, { id: registry.get(schema)?.id ?? 'this' });
  const { schemas } = z.toJSONSchema(registry, {
    io,
    uri: place,
    unrepresentable: 'any',
    override: tidied(io),
  });
  return registry.get(schema)?.id === 'this'
    ? withoutMarks(schemas.this)
    : { $ref: place(String(registry.get(schema)?.id)) };
}

/** What a list holds that counts its items before it looks at them: on its way in it is a list of anything. */
function itemsCountedFirst(schema: unknown): z.ZodType | undefined {
  if (!(schema instanceof z.ZodPipe)) return undefined;
  const { in: before, out: after } = schema as z.ZodPipe;
  const isCounted = before instanceof z.ZodArray && before.element instanceof z.ZodUnknown;
  return isCounted && after instanceof z.ZodArray ? (after.element as z.ZodType) : undefined;
}

const tidied =
  (io: Side) =>
  ({ zodSchema, jsonSchema }: { zodSchema: unknown; jsonSchema: JsonSchema }) => {
    const items = io === 'input' ? itemsCountedFirst(zodSchema) : undefined;
    if (items !== undefined) {
      const of = z.toJSONSchema(items, { io, unrepresentable: 'any', override: tidied(io) });
      jsonSchema.items = withoutMarks(of);
    }
    const held = parsedLater.get(zodSchema);
    if (held !== undefined) jsonSchema.$ref = place(io === 'input' ? `${held}Input` : held);
    // What every integer of JavaScript keeps to says nothing; `date-time` says all that its pattern does.
    if (jsonSchema.minimum === Number.MIN_SAFE_INTEGER) delete jsonSchema.minimum;
    if (jsonSchema.maximum === Number.MAX_SAFE_INTEGER) delete jsonSchema.maximum;
    if (jsonSchema.format === 'date-time' || jsonSchema.format === 'email') delete jsonSchema.pattern;
  };

/** The dialect is OpenAPI's own, and a component is named by its place. */
const withoutMarks = ({ $schema: _dialect, $id: _name, id: _alias, ...schema }: JsonSchema): JsonSchema =>
  schema;
