import { Refusal, type GeneratedFile, type Problem } from '../../../../shared/contract/index.ts';
import { arrayNameFrom, flagOf, renderFiles } from '../../../../shared/firmware/index.ts';
import { templates } from '../../../../templates/index.ts';
import type { TableAnswer } from '../../../workers/engine-messages.ts';

/** A target's options as they were typed; an empty text stands for one that is not given. */
export type TypedOptions = Readonly<Record<string, unknown>>;

export type Rendered =
  { readonly files: readonly GeneratedFile[] } | { readonly problems: readonly Problem[] };

export function givenOptions(typed: TypedOptions): TypedOptions {
  return Object.fromEntries(Object.entries(typed).filter(([, value]) => value !== '' && value !== undefined));
}

/** The files of an export, or what the target cannot take. */
export function renderExport(table: TableAnswer, target: string, options: TypedOptions): Rendered {
  try {
    return { files: renderFiles(table, target, options, templates) };
  } catch (error) {
    if (error instanceof Refusal) return { problems: error.problems };
    throw error;
  }
}

/** File name for a definition, made as the array's name is. */
export function definitionFileName(name: string): string {
  return `${arrayNameFrom(name)}.json`;
}

/** The command that writes the same bytes from the definition's file: every option that was given, by its flag. */
export function commandFor(name: string, target: string, options: TypedOptions): string {
  const flags = Object.entries(options).map(
    ([option, value]) => `${flagOf(option)} ${quoted(String(value))}`,
  );
  return [
    'npm run --silent stepwell -- render',
    definitionFileName(name),
    `--target ${target}`,
    ...flags,
    '--out .',
  ].join(' ');
}

/** A word as a POSIX shell reads it back (IEEE Std 1003.1, Shell Command Language §2.2). */
function quoted(word: string): string {
  return /^[\w./:@%+=-]+$/.test(word) ? word : `'${word.replaceAll("'", "'\\''")}'`;
}
