import { buildTable } from '../../shared/build-table.ts';
import { Refusal, type DefinitionInput } from '../../shared/contract/index.ts';
import { renderFiles, type TemplateTexts } from '../../shared/firmware/index.ts';

// Run by same-bytes.spec.ts twice: in Node.js, and bundled into a blank page of Chromium.

/** All that a firmware gets from one definition, as one text; or the refusal's own text. */
export function bytesOf(definition: DefinitionInput, templates: TemplateTexts): string {
  try {
    const table = buildTable(definition);
    return JSON.stringify({
      codes: Array.from(table.codes),
      stored: Array.from(table.stored),
      files: renderFiles(table, 'c99', {}, templates),
      warnings: table.warnings,
    });
  } catch (error) {
    if (error instanceof Refusal) return error.message;
    throw error;
  }
}

export function bytesOfAll(definitions: readonly DefinitionInput[], templates: TemplateTexts): string[] {
  return definitions.map((definition) => bytesOf(definition, templates));
}

Object.assign(globalThis, { bytesOfAll });
