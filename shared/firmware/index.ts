export { arrayNameFault, arrayNameFrom, arrayNameLength } from './c-identifier.ts';
export { canonicalJson, digestOf, type DigestInput } from './digest.ts';
export { inertText } from './inert-text.ts';
export { decimal } from './key-figures.ts';
export { flagOf, optionOf } from './option-flags.ts';
export { renderFiles, targetOf, type TemplateTexts } from './render-files.ts';
export type { ExportableTable, Target } from './target.ts';
export { targets } from './targets/index.ts';
export { wordTypeOf, type WordType } from './word-type.ts';
