import type { Definition, Source } from '../../shared/contract/index.ts';
import { formatQuantity } from '../../shared/quantities/index.ts';
import { nameOfSetting } from './names.ts';

export interface Leaf {
  readonly path: string;
  readonly name: string;
  readonly value: unknown;
}

/** Plain values of a part of a definition, by a key that stays the same where the value moves within a list. */
export type Leaves = Map<string, Leaf>;

/** Lists of samples and of measured levels are told as a whole: how many there are, and how many differ. */
const isLongList = (path: string): boolean => /\.(values|levels)$/.test(path);

/** Every plain value in it, by its path: `source.points[3].y`. */
export function leavesOf(value: unknown, path = '', into: Leaves = new Map()): Leaves {
  if (isLongList(path)) return into;
  if (Array.isArray(value)) value.forEach((item, index) => leavesOf(item, `${path}[${index}]`, into));
  else if (typeof value === 'object' && value !== null) {
    for (const [name, inner] of Object.entries(value))
      leavesOf(inner, path === '' ? name : `${path}.${name}`, into);
  } else if (value !== undefined) into.set(path, { path, name: nameOfSetting(path), value });
  return into;
}

/** A curve and its exponent are one setting here. */
export function leavesOfLevel({ level }: Definition): Leaves {
  const { transfer } = level;
  return leavesOf({
    level: { ...level, transfer: typeof transfer === 'object' ? `gamma ${transfer.gamma}` : transfer },
  });
}

/** Partials go by their harmonic, wherever they stand in the list. */
export function leavesOfSource(source: Source, path: string): Leaves {
  if (source.kind !== 'harmonics') return leavesOf(source, path);
  const { partials, ...rest } = source;
  const leaves = leavesOf(rest, path);
  const lead = /^(source\.parts\[\d+\]\.)/.test(path) ? nameOfSetting(path).replace(/Shape$/, '') : '';
  partials.forEach(({ harmonic, amplitude, phaseDeg }, index) => {
    const at = `${path}.partials[${index}]`;
    let again = '';
    while (leaves.has(`${harmonic} amplitude${again}`)) again += ' once more';
    const name = `${lead}Harmonic ${harmonic}${again}`;
    leaves.set(`${harmonic} amplitude${again}`, {
      path: `${at}.amplitude`,
      name: `${name}, amplitude`,
      value: amplitude,
    });
    leaves.set(`${harmonic} phase${again}`, {
      path: `${at}.phaseDeg`,
      name: `${name}, phase`,
      value: `${formatQuantity(phaseDeg, '', { significant: 6 })}°`,
    });
  });
  return leaves;
}
