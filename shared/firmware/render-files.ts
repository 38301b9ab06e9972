import { Liquid } from 'liquidjs';
import { Refusal, showValue, type GeneratedFile } from '../contract/index.ts';
import { engineVersion as thisEngine } from '../engine-version.ts';
import { arrayNameFrom } from './c-identifier.ts';
import { digestOf } from './digest.ts';
import { inertText } from './inert-text.ts';
import { codingNames, keyFigures } from './key-figures.ts';
import type { ExportableTable, Facts, Target } from './target.ts';
import { targets } from './targets/index.ts';
import { wordLiteral, wordRows, wordSpan } from './word-rows.ts';
import { wordTypeOf } from './word-type.ts';

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
 * Files of one export. The same table, options and templates give the same bytes on every machine; lines end in LF.
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
  const { licenceLine, arrayPrefix, ...given } = target.parseOptions(options);
  const arrayName = given.arrayName ?? arrayNameFrom(table.definition.name, arrayPrefix);
  const licence = inertText(licenceLine);
  const top = licence === '' ? '' : `${target.lineComment} ${licence}\n`;
  const facts = { ...sharedFacts(table, arrayName), ...target.factsOf(table, options) };
  const liquid = new Liquid({
    templates: templates as Record<string, string>,
    extname: '.liquid',
    strictVariables: true,
    strictFilters: true,
    ownPropertyOnly: true,
  });
  return target.files.map(({ template, ending }) => ({
    name: `${arrayName}${ending}`,
    text: top + String(liquid.renderFileSync(template, facts)),
  }));
}

/** Facts that every target's templates can print. */
function sharedFacts(table: ExportableTable, arrayName: string): Facts {
  const { definition, codes, stored, report, engineVersion = thisEngine } = table;
  const { bits, coding, complement, fold, length, range, scale, levels } = definition.table;
  const wordType = wordTypeOf(definition.table);
  const words = wordSpan(stored);
  const digest = digestOf({ definition, engineVersion, codes });
  return {
    title: inertText(definition.name) || arrayName,
    arrayName,
    macro: arrayName.toUpperCase(),
    storedCount: stored.length,
    tableLength: length,
    bits,
    levelCount: 2 ** bits,
    halfLevels: 2 ** (bits - 1),
    topCode: 2 ** bits - 1,
    coding: codingNames[coding],
    twosComplement: coding === 'twos-complement',
    complement,
    folded: fold === 'quarter',
    range,
    scale: levels === undefined ? scale : 'measured',
    wordType: wordType.name,
    wordBytes: wordType.bytes,
    minWordLiteral: wordLiteral(words.min, wordType),
    maxWordLiteral: wordLiteral(words.max, wordType),
    rows: wordRows(stored),
    figures: keyFigures({
      definition,
      report,
      wordType,
      storedCount: stored.length,
      minWord: words.min,
      maxWord: words.max,
      engineVersion,
      digest,
    }),
  };
}
