import { buildTable } from '../../shared/build-table.ts';
import { Refusal, type DefinitionInput, type GeneratedFile } from '../../shared/contract/index.ts';
import { renderFiles, targets, type TemplateTexts } from '../../shared/firmware/index.ts';

// Run by same-bytes.spec.ts twice: in Node.js, and bundled into a blank page of Chromium.

/** All that a firmware gets from one definition, as one text; or the refusal's own text. */
function bytesOf(definition: DefinitionInput, templates: TemplateTexts, number: number): string {
  const target = targets[number % targets.length];
  const options = 'pulses' in target.options.shape ? { pulses: pulsesOf(number) } : {};
  try {
    const table = buildTable(definition);
    return JSON.stringify({
      codes: Array.from(table.codes),
      stored: Array.from(table.stored),
      files: filesOf(() => renderFiles(table, target.id, options, templates)),
      warnings: table.warnings,
    });
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
}

/** A pattern of pulses and pauses, another for each number. */
const pulsesOf = (number: number) =>
  `${1 + ((number * 7919) % 60_000)}/${(number * 104_729) % 60_001}x${1 + (number % 255)} 500/0${number % 2 === 0 ? ' endless' : ''}`;

/** Files, or what the target cannot take of a table that is none the worse for it. */
function filesOf(render: () => readonly GeneratedFile[]): readonly GeneratedFile[] | string {
  try {
    return render();
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
}

/** Every target in turn; `first` is the number of the first definition. */
export function bytesOfAll(
  definitions: readonly DefinitionInput[],
  templates: TemplateTexts,
  first: number,
): string[] {
  return definitions.map((definition, k) => bytesOf(definition, templates, first + k));
}

Object.assign(globalThis, { bytesOfAll });
