import type { z } from 'zod';
import { problemsIn, Refusal, type Definition, type Report } from '../contract/index.ts';

/** A table as it is exported: freshly built, or a saved revision with the figures and engine version stored then. */
export interface ExportableTable {
  readonly definition: Definition;
  /** One code an entry, before complement, coding and fold. */
  readonly codes: Uint16Array;
  /** The words to store (engine specification §3.6). */
  readonly stored: Int32Array;
  readonly report: Report;
  /** Version of the engine that built the codes; this engine's where left out. */
  readonly engineVersion?: string;
}

export interface TargetFile {
  /** Below `templates/`, without its ending: `c99/header.h` is the file `c99/header.h.liquid`. */
  readonly template: string;
  /** What follows the array's name in the file's: `.h`. */
  readonly ending: string;
}

/** Facts a template can print. Texts are inert already; numbers print as they are. */
export type Facts = Readonly<Record<string, unknown>>;

/** What every target can be told. */
export interface SharedOptions {
  /** Made from the definition's name where left out. */
  readonly arrayName?: string;
  /** Put before a name that is made. */
  readonly arrayPrefix: string;
  /** Stands as a comment at the top of each file; empty for none. */
  readonly licenceLine: string;
}

export interface Target {
  readonly id: string;
  /** What the export is, in a few words, for lists. */
  readonly title: string;
  /** What begins a comment that ends with its line, in the files' language. */
  readonly lineComment: string;
  readonly files: readonly TargetFile[];
  readonly options: z.ZodObject & z.ZodType<SharedOptions>;
  /**
   * Parses options by the target's schema.
   *
   * @throws {Refusal} naming the option at fault as `options.NAME`, its value and what is allowed.
   */
  readonly parseOptions: (input: unknown) => SharedOptions;
  /**
   * What the target's own templates need beyond the facts that all share.
   *
   * @throws {Refusal} where the target cannot take the table.
   */
  readonly factsOf: (table: ExportableTable, input: unknown) => Facts;
}

interface TargetDescriptor<Options extends Target['options']> extends Omit<
  Target,
  'options' | 'parseOptions' | 'factsOf'
> {
  readonly options: Options;
  readonly factsOf: (table: ExportableTable, options: z.output<Options>) => Facts;
}

/** Makes a target of its descriptor: the small part of an export that is not a template. */
export function defineTarget<const Options extends Target['options']>(
  descriptor: TargetDescriptor<Options>,
): Target {
  const parseOptions = (input: unknown) => parse(descriptor.options, input);
  return {
    ...descriptor,
    parseOptions,
    factsOf: (table, input) => descriptor.factsOf(table, parseOptions(input)),
  };
}

function parse<Schema extends z.ZodType>(schema: Schema, input: unknown): z.output<Schema> {
  const result = schema.safeParse(input);
  if (result.success) return result.data;
  const issues = result.error.issues.map((issue) => ({ ...issue, path: ['options', ...issue.path] }));
  const [first, ...others] = problemsIn(issues, { options: input });
  throw new Refusal(first, ...others);
}
