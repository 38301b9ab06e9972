import { buildTable } from '../../shared/build-table.ts';
import { Refusal, type DefinitionInput, type GeneratedFile } from '../../shared/contract/index.ts';
import { renderFiles, targets, type TemplateTexts } from '../../shared/firmware/index.ts';

// Run by same-bytes.spec.ts twice: in Node.js, and bundled into a blank page of Chromium.

/** All that a firmware gets from one definition, as one text; or the refusal's own text. */
function bytesOf(definition: DefinitionInput, templates: TemplateTexts, targetId: string): string {
  try {
    const table = buildTable(definition);
    return JSON.stringify({
      codes: Array.from(table.codes),
      stored: Array.from(table.stored),
      files: filesOf(() => renderFiles(table, targetId, {}, templates)),
      warnings: table.warnings,
    });
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
}

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
  return definitions.map((definition, k) =>
    bytesOf(definition, templates, targets[(first + k) % targets.length].id),
  );
}

Object.assign(globalThis, { bytesOfAll });
