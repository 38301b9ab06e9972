import type { Definition, Source } from '../../shared/contract/index.ts';
import { leavesOf, leavesOfLevel, leavesOfSource, type Leaf } from './leaves.ts';
import { nameOfSetting } from './names.ts';
import { sayInWords } from './source-words.ts';
import { sayValue } from './values.ts';

/** A setting in words. */
export interface SettingInWords {
  readonly path: string;
  readonly name: string;
  readonly value: string;
}

/** Every setting of a definition, in its order: name, shape, level, table. */
export function listSettings({ name, source, level, table, schema }: Definition): SettingInWords[] {
  const leaves = [
    ...leavesOf({ name }).values(),
    ...sourceLeaves(source),
    ...leavesOfLevel({ name, source, level, table, schema }).values(),
    ...leavesOf({ table }).values(),
  ];
  return [
    ...leaves.slice(0, 1).map(inWords),
    { path: 'source', name: nameOfSetting('source'), value: sayInWords(source) },
    ...leaves.slice(1).map(inWords),
    ...(table.levels === undefined ? [] : [longList('table.levels', table.levels)]),
  ];
}

const inWords = ({ path, name, value }: Leaf): SettingInWords => ({
  path,
  name,
  value: sayValue(path, value),
});

const longList = (path: string, list: readonly number[]): SettingInWords => ({
  path,
  name: nameOfSetting(path),
  value: `${list.length.toLocaleString('en')} numbers`,
});

/** The kind itself is told with the shape. */
function sourceLeaves(source: Source, path = 'source'): Leaf[] {
  if (source.kind !== 'mix') {
    return [...leavesOfSource(source, path).values()].filter(({ path: at }) => !at.endsWith('.kind'));
  }
  return [
    { path: `${path}.operation`, name: nameOfSetting(`${path}.operation`), value: source.operation },
    ...source.parts.flatMap(({ gain, source: part }, index) => {
      const at = `${path}.parts[${index}]`;
      return [
        { path: `${at}.gain`, name: nameOfSetting(`${at}.gain`), value: gain },
        ...sourceLeaves(part, `${at}.source`),
      ];
    }),
  ];
}
