import type { Definition, Source } from '../../../../shared/contract/index.ts';
import { significant } from '../numbers.ts';
import { nameOfField } from '../problems/field-names.ts';
import { sayInWords } from '../shape/source-words.ts';

/** A setting that two definitions do not share, in words. */
export interface Difference {
  readonly name: string;
  readonly mine: string;
  readonly theirs: string;
}

/** More than these are counted, not listed. */
const mostListed = 12;

/** What stands where one side has nothing. */
const absent = '–';

/** Says how two definitions differ, field by field, in the form's own words and order. */
export function differencesOf(
  mine: Definition,
  theirs: Definition,
): { differences: readonly Difference[]; others: number } {
  const all = [
    ...compared(leavesOf({ name: mine.name }), leavesOf({ name: theirs.name })),
    ...sourcesCompared(mine.source, theirs.source),
    ...compared(leavesOf({ level: mine.level }), leavesOf({ level: theirs.level })),
    ...compared(leavesOf({ table: mine.table }), leavesOf({ table: theirs.table })),
  ];
  return { differences: all.slice(0, mostListed), others: Math.max(0, all.length - mostListed) };
}

type Leaves = ReadonlyMap<string, unknown>;

function sourcesCompared(mine: Source, theirs: Source): Difference[] {
  if (mine.kind !== theirs.kind) {
    return [{ name: nameOfField('source'), mine: sayInWords(mine), theirs: sayInWords(theirs) }];
  }
  return compared(leavesOfSource(mine), leavesOfSource(theirs));
}

/** Partials go by their harmonic, wherever they stand in the list. */
function leavesOfSource(source: Source): Leaves {
  if (source.kind !== 'harmonics') return leavesOf({ source });
  const { partials, ...rest } = source;
  const leaves = new Map(leavesOf({ source: rest }));
  for (const { harmonic, amplitude, phaseDeg } of partials) {
    const seen = leaves.has(`Harmonic ${harmonic}, amplitude`) ? ' once more' : '';
    leaves.set(`Harmonic ${harmonic}${seen}, amplitude`, amplitude);
    leaves.set(`Harmonic ${harmonic}${seen}, phase`, `${significant(phaseDeg, 6)}°`);
  }
  return leaves;
}

function compared(mine: Leaves, theirs: Leaves): Difference[] {
  const paths = [...new Set([...mine.keys(), ...theirs.keys()])];
  return paths
    .filter((path) => !Object.is(mine.get(path), theirs.get(path)))
    .map((path) => ({
      name: nameOfField(path),
      mine: sayValue(path, mine.get(path)),
      theirs: sayValue(path, theirs.get(path)),
    }));
}

/** Every plain value in it, by its path: `source.points[3].y`. */
function leavesOf(value: unknown, path = '', into = new Map<string, unknown>()): Map<string, unknown> {
  if (Array.isArray(value)) {
    value.forEach((item, index) => leavesOf(item, `${path}[${index}]`, into));
  } else if (typeof value === 'object' && value !== null) {
    for (const [name, inner] of Object.entries(value))
      leavesOf(inner, path === '' ? name : `${path}.${name}`, into);
  } else if (value !== undefined) into.set(path, value);
  return into;
}

function sayValue(path: string, value: unknown): string {
  switch (typeof value) {
    case 'undefined':
      return absent;
    case 'boolean':
      return value ? 'yes' : 'no';
    case 'number':
      return significant(value, 6) + (path.endsWith('Deg') ? '°' : '');
    default:
      // Names of choices are written with hyphens; what people typed stays as it is.
      return path === 'name' ? String(value) : String(value).replaceAll('-', ' ');
  }
}
