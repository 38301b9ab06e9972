import type { z } from 'zod';
import { problemsIn, Refusal } from '../contract/index.ts';
import type { ExportableTable } from './exportable-table.ts';
import type { Layout, LayoutOptions } from './layout.ts';
import type { NumberStyle } from './word-rows.ts';

/** Facts a template can print. Texts are inert already; numbers print as they are. */
export type Facts = Readonly<Record<string, unknown>>;

/** A file as a target describes it: a template, with facts beyond the shared ones, or bytes. */
export type TargetFile = {
  /** What follows the array's name in the file's: `.h`. */
  readonly ending: string;
} & (
  | {
      /** Below `templates/`, without its ending: `c99/header.h` is the file `c99/header.h.liquid`. */
      readonly template: string;
      readonly facts?: Facts;
    }
  | { readonly bytes: Uint8Array }
);

/** What targets can be told; each has the names, and of the others those that mean something to it. */
export interface SharedOptions extends LayoutOptions {
  /** Made from the definition's name where left out. */
  readonly arrayName?: string;
  /** Put before a name that is made. */
  readonly arrayPrefix: string;
  /** Stands as a comment at the top of each file; empty for none. */
  readonly licenceLine?: string;
  readonly lineEnding?: 'lf' | 'crlf';
  readonly playback?: string;
  readonly idleCode?: number;
  readonly rampWords?: number;
  readonly numberBase?: NumberStyle['base'];
  readonly columns?: number;
}

/** One export on its way: what a target makes files of. */
export interface ExportInput<Options> {
  readonly table: ExportableTable;
  readonly layout: Layout;
  readonly options: Options;
  readonly arrayName: string;
  readonly digest: string;
}

export interface Target {
  readonly id: string;
  /** What the export is, in a few words, for lists. */
  readonly title: string;
  /** A comment of one line in the files' language; absent where that has none. */
  readonly commentOf?: (text: string) => string;
  /** How elements of so many bytes are written, where not in the way of C. */
  readonly numbersOf?: (bytes: 1 | 2 | 4) => Partial<NumberStyle>;
  /** How words lie in storage, where not as `layOut` has it. @throws {Refusal} where they cannot. */
  readonly layOut?: (table: ExportableTable, options: SharedOptions) => Layout;
  readonly options: z.ZodObject & z.ZodType<SharedOptions>;
  /**
   * Parses options by the target's schema.
   *
   * @throws {Refusal} naming the option at fault as `options.NAME`, its value and what is allowed.
   */
  readonly parseOptions: (input: unknown) => SharedOptions;
  /**
   * The files of an export, in the order of lists.
   *
   * @throws {Refusal} where the target cannot take the table.
   */
  readonly filesOf: (input: ExportInput<SharedOptions>) => readonly TargetFile[];
}

interface TargetDescriptor<Options extends Target['options']> extends Omit<
  Target,
  'options' | 'parseOptions' | 'filesOf'
> {
  readonly options: Options;
  readonly filesOf: (input: ExportInput<z.output<Options>>) => readonly TargetFile[];
}

/** Makes a target of its descriptor: the small part of an export that is not a template. */
export function defineTarget<const Options extends Target['options']>(
  descriptor: TargetDescriptor<Options>,
): Target {
  return {
    ...descriptor,
    parseOptions: (input) => parse(descriptor.options, input),
    // Options reach `filesOf` only as `parseOptions` of the same target has made them.
    filesOf: (input) => descriptor.filesOf(input as ExportInput<z.output<Options>>),
  };
}

function parse<Schema extends z.ZodType>(schema: Schema, input: unknown): z.output<Schema> {
  const result = schema.safeParse(input);
  if (result.success) return result.data;
  const issues = result.error.issues.map((issue) => ({ ...issue, path: ['options', ...issue.path] }));
  const [first, ...others] = problemsIn(issues, { options: input });
  throw new Refusal(first, ...others);
}
