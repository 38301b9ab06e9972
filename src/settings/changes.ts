import type { Definition, Source } from '../../shared/contract/index.ts';
import { leavesOf, leavesOfLevel, leavesOfSource, type Leaves } from './leaves.ts';
import { nameOfSetting } from './names.ts';
import { sayInWords } from './source-words.ts';
import { absent, sayValue } from './values.ts';

/** A setting that differs between two definitions, in words. */
export interface SettingChange {
  /** Where it stands in the later definition, or in the earlier one if it is gone: `table.bits`. */
  readonly path: string;
  readonly name: string;
  readonly before: string;
  readonly after: string;
}

/** All settings that differ, in the order of the definition: name, shape, level, table. */
export function changedSettings(before: Definition, after: Definition): SettingChange[] {
  return [
    ...compared(leavesOf({ name: before.name }), leavesOf({ name: after.name })),
    ...changedSource(before.source, after.source, 'source'),
    ...compared(leavesOfLevel(before), leavesOfLevel(after)),
    ...compared(leavesOf({ table: before.table }), leavesOf({ table: after.table })),
    ...changedList('table.levels', before.table.levels, after.table.levels),
  ];
}

function changedSource(before: Source, after: Source, path: string): SettingChange[] {
  if (before.kind !== after.kind || (before.kind === 'mix' && !hasSameParts(before, after))) {
    return [{ path, name: nameOfSetting(path), before: sayInWords(before), after: sayInWords(after) }];
  }
  if (before.kind === 'mix' && after.kind === 'mix') return changedMix(before, after, path);
  if (before.kind === 'samples' && after.kind === 'samples') {
    return [
      ...changedList(`${path}.values`, before.values, after.values),
      ...compared(leavesOf(before, path), leavesOf(after, path)),
    ];
  }
  return compared(leavesOfSource(before, path), leavesOfSource(after, path));
}

type Mix = Extract<Source, { kind: 'mix' }>;

const hasSameParts = (before: Mix, after: Source): boolean =>
  after.kind === 'mix' && before.parts.length === after.parts.length;

function changedMix(before: Mix, after: Mix, path: string): SettingChange[] {
  const { parts: _before, ...plainBefore } = before;
  const { parts: _after, ...plainAfter } = after;
  return [
    ...compared(leavesOf(plainBefore, path), leavesOf(plainAfter, path)),
    ...before.parts.flatMap(({ gain, source }, index) => {
      const at = `${path}.parts[${index}]`;
      const other = after.parts[index];
      return [
        ...compared(leavesOf({ gain }, at), leavesOf({ gain: other.gain }, at)),
        ...changedSource(source, other.source, `${at}.source`),
      ];
    }),
  ];
}

function changedList(
  path: string,
  before: readonly number[] | undefined,
  after: readonly number[] | undefined,
): SettingChange[] {
  if (before === undefined && after === undefined) return [];
  const differing =
    before?.length === after?.length
      ? (after ?? []).filter((value, index) => value !== before?.[index]).length
      : undefined;
  if (differing === 0) return [];
  const say = (list: readonly number[] | undefined) =>
    list === undefined ? absent : `${list.length.toLocaleString('en')} numbers`;
  const others = differing === undefined ? '' : `, ${differing.toLocaleString('en')} of them others`;
  return [{ path, name: nameOfSetting(path), before: say(before), after: say(after) + others }];
}

function compared(before: Leaves, after: Leaves): SettingChange[] {
  const keys = [...new Set([...before.keys(), ...after.keys()])];
  return keys.flatMap((key) => {
    const [old, fresh] = [before.get(key), after.get(key)];
    const { path = '', name = '' } = fresh ?? old ?? {};
    if (Object.is(old?.value, fresh?.value)) return [];
    return [{ path, name, before: sayValue(path, old?.value), after: sayValue(path, fresh?.value) }];
  });
}
