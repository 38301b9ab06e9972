import { Liquid } from 'liquidjs';
import { Refusal, showValue, type GeneratedFile } from '../contract/index.ts';
import { engineVersion as thisEngine } from '../engine-version.ts';
import { toBase64 } from './base64.ts';
import { arrayNameFrom } from './c-identifier.ts';
import { digestOf } from './digest.ts';
import type { ExportableTable } from './exportable-table.ts';
import { inertText } from './inert-text.ts';
import { layOut } from './layout.ts';
import { wordsToPlayOnce } from './once.ts';
import { sharedFacts } from './shared-facts.ts';
import type { SharedOptions, Target } from './target.ts';
import { targets } from './targets/index.ts';

/** Text of each template by its path below `templates/`, the ending `.liquid` included. */
export type TemplateTexts = Readonly<Record<string, string>>;

/** @throws {Refusal} where there is no target of that name. */
export function targetOf(id: string): Target {
  const target = targets.find((candidate) => candidate.id === id);
  if (target !== undefined) return target;
  const known = targets.map((candidate) => `"${candidate.id}"`).join(', ');
  throw new Refusal({ path: 'target', value: showValue(id), allowed: `one of ${known}` });
}

/**
 * Files of one export. The same table, options and templates give the same bytes on every machine.
 *
 * @param options by the target's own schema; `{}` takes every default
 * @throws {Refusal} naming what the target cannot take: an option as `options.NAME`, a field of the definition as such.
 */
export function renderFiles(
  table: ExportableTable,
  targetId: string,
  options: unknown,
  templates: TemplateTexts,
): GeneratedFile[] {
  const target = targetOf(targetId);
  const given = target.parseOptions(options);
  const { definition, codes, engineVersion = thisEngine } = table;
  const { played, layout } = laidOut(table, target, given);
  const input = {
    table: played,
    options: given,
    arrayName: given.arrayName ?? arrayNameFrom(definition.name, given.arrayPrefix),
    layout,
    digest: digestOf({ definition, engineVersion, codes }),
  };
  const licence = inertText(given.licenceLine ?? '');
  const top = licence === '' || target.commentOf === undefined ? '' : `${target.commentOf(licence)}\n`;
  const files = target.filesOf(input);
  const facts = sharedFacts(input, target.numbersOf);
  const liquid = new Liquid({
    templates: templates as Record<string, string>,
    extname: '.liquid',
    strictVariables: true,
    strictFilters: true,
    ownPropertyOnly: true,
  });
  return files.map((file): GeneratedFile => {
    const name = `${input.arrayName}${file.ending}`;
    if ('bytes' in file) return { name, text: toBase64(file.bytes), encoding: 'base64' };
    const body = String(liquid.renderFileSync(file.template, { ...facts, ...file.facts }));
    // Parts that a file leaves out leave no more than one empty line.
    const text = top + body.replace(/\n{3,}/g, '\n\n');
    return {
      name,
      text: given.lineEnding === 'crlf' ? text.replaceAll('\n', '\r\n') : text,
      encoding: 'utf-8',
    };
  });
}

/** A table's words as its target stores them; of a wave played once with what leads in and out. */
function laidOut(table: ExportableTable, target: Target, given: SharedOptions) {
  const played = given.playback === 'once' ? { ...table, stored: wordsToPlayOnce(table, given) } : table;
  return { played, layout: (target.layOut ?? layOut)(played, given) };
}

/**
 * Bytes that the arrays of an export take where they are stored.
 *
 * @throws {Refusal} as `renderFiles`
 */
export function storedBytes(table: ExportableTable, targetId: string, options: unknown): number {
  const target = targetOf(targetId);
  return laidOut(table, target, target.parseOptions(options)).layout.byteCount;
}
