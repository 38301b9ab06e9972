import type { Command } from 'commander';
import { z } from 'zod';
import { buildTable } from '../../shared/build-table.ts';
import { parseBoard, Refusal, type Board, type GeneratedFile } from '../../shared/contract/index.ts';
import {
  boardShare,
  contentOf,
  flagOf,
  notTakenOf,
  optionOf,
  renderFiles,
  targetOf,
  targets,
} from '../../shared/firmware/index.ts';
import { readTemplates } from '../tables/read-templates.ts';
import { say, sayError } from './output.ts';
import { readDefinition } from './read-definition.ts';
import { onOneLine } from './terminal.ts';
import { writeFiles } from './write-files.ts';

interface Flags extends Readonly<Record<string, string>> {
  readonly target: string;
  readonly out: string;
  readonly board: string;
}

/** `render DEFINITION.json --target NAME [--board BOARD.json] [--out DIR]`, and a flag for each option that some target has. */
export function addRender(command: Command): void {
  command
    .argument('<DEFINITION.json>', 'the definition; - reads standard input')
    .requiredOption('--target <name>', targets.map(({ id, title }) => `${id}: ${title}`).join('; '))
    .option(
      '--board <file>',
      'a board: its clock and port map, where no flag (--clock-hz, --port-map, --port …) says otherwise',
    )
    .option(
      '--out <folder>',
      'folder for the files, made where it is missing; without it they go to standard output',
    );
  for (const [flag, description] of optionFlags()) command.option(`${flag} <value>`, description);
  command.action(async (file: string, { target, out, board, ...options }: Flags) => {
    try {
      await render(file, target, { out, board }, options);
    } catch (error) {
      throw error instanceof Refusal ? inFlags(error) : error;
    }
  });
}

async function render(
  file: string,
  target: string,
  { out, board }: { readonly out?: string; readonly board?: string },
  flags: Readonly<Record<string, string>>,
) {
  const described = targetOf(target);
  const onBoard = board === undefined ? undefined : await readBoard(board);
  const table = buildTable(await readDefinition(file));
  // commander hands flags over in camel case, without their hyphens.
  const given = Object.fromEntries(
    Object.entries(flags).map(([flag, value]) => [optionOf(`--${flag}`), value]),
  );
  const ofBoard = onBoard === undefined ? {} : boardShare(described, onBoard, given).taken;
  const files = renderFiles(table, target, { ...ofBoard, ...given }, readTemplates());
  const said =
    out === undefined ? asOne(files, described.commentOf) : `${(await writeFiles(out, files)).join('\n')}\n`;
  say(said);
  for (const { path, message } of table.warnings) sayError(onOneLine(`warning: ${path}: ${message}`));
  const notTaken = onBoard === undefined ? [] : notTakenOf(described, onBoard);
  for (const phrase of notTaken) sayError(onOneLine(`note: not taken from the board: ${phrase}`));
}

/** A board's file. @throws {Refusal} with `board.` before the path of a field at fault */
async function readBoard(file: string): Promise<Board> {
  const input = await readDefinition(file);
  try {
    return parseBoard(input);
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    const [first, ...others] = error.problems.map((problem) => ({
      ...problem,
      path: `board.${problem.path}`,
    }));
    throw new Refusal(first, ...others);
  }
}

/**
 * One file as it is; several texts one after the other, each below a comment line that names it: `// file: tone.h`.
 *
 * @throws {Refusal} where several files cannot be told apart in one stream
 */
function asOne(files: readonly GeneratedFile[], commentOf?: (text: string) => string): string | Uint8Array {
  if (files.length === 1) return contentOf(files[0]);
  if (commentOf === undefined) {
    throw new Refusal({
      path: '--out',
      value: 'nothing',
      allowed: `a folder, as this export has ${files.length} files and no comments to part them`,
    });
  }
  return files.map(({ name, text }) => `${commentOf(`file: ${name}`)}\n${text}`).join('');
}

/** Flags of every option of every target, with what each says of itself and the targets that have it. */
function optionFlags(): [flag: string, description: string][] {
  const found = new Map<string, { description: string; ids: string[]; words: Set<string> }>();
  for (const { id, options } of targets) {
    for (const [option, schema] of Object.entries(options.shape)) {
      const entry = found.get(option) ?? { description: descriptionOf(schema), ids: [], words: new Set() };
      entry.ids.push(id);
      for (const word of wordsOf(schema)) entry.words.add(word);
      found.set(option, entry);
    }
  }
  return [...found].map(([option, { description, ids, words }]) => {
    const choices = words.size === 0 ? '' : `: ${[...words].join(', ')}`;
    const having = ids.length === targets.length ? '' : ` (${ids.join(', ')})`;
    return [flagOf(option), `${description}${choices}${having}`];
  });
}

/** The words that an option is chosen from; none where it is free. */
function wordsOf(schema: z.core.$ZodType): string[] {
  if (schema instanceof z.ZodDefault || schema instanceof z.ZodOptional) return wordsOf(schema.unwrap());
  return schema instanceof z.ZodEnum ? schema.options.map(String) : [];
}

const descriptionOf = (schema: object) => ('description' in schema ? String(schema.description) : '');

/** The same refusal in the words of the command line: `options.highPort` is `--high-port`. */
function inFlags({ problems }: Refusal): Refusal {
  const [first, ...others] = problems.map((problem) => ({
    ...problem,
    path: problem.path === 'target' ? '--target' : withFlags(problem.path),
    allowed: withFlags(problem.allowed),
  }));
  return new Refusal(first, ...others);
}

const withFlags = (text: string) =>
  text.replace(/\boptions\.(\w+)/g, (_path, option: string) => flagOf(option));
