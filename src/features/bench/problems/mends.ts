import { limits, type Definition, type Problem } from '../../../../shared/contract/index.ts';

/** One press that puts a problem right, offered and never taken by itself. */
export interface Mend {
  readonly label: string;
  apply(definition: Definition): Definition;
}

const setTable =
  (part: Partial<Definition['table']>) =>
  (definition: Definition): Definition => ({ ...definition, table: { ...definition.table, ...part } });

const setLevel =
  (part: Partial<Definition['level']>) =>
  (definition: Definition): Definition => ({ ...definition, level: { ...definition.level, ...part } });

/** The ways out of a problem that need no further thought, the likeliest first. */
export function mendsFor({ path, value }: Problem, { level, table }: Definition): Mend[] {
  switch (path) {
    case 'table.bits':
      return nearest('bits', table.bits, limits.bits);
    case 'table.length':
      return nearest('length', table.length, limits.tableLength);
    case 'table.cycles':
      return nearest('cycles', table.cycles, {
        min: 1,
        max: Math.min(limits.cycles.max, Math.max(1, Math.ceil(table.length / 2) - 1)),
      });
    case 'table.startPhaseDeg': {
      if (!Number.isFinite(table.startPhaseDeg)) return [];
      const turned = ((table.startPhaseDeg % 360) + 360) % 360;
      return [{ label: `Use ${turned}°`, apply: setTable({ startPhaseDeg: turned }) }];
    }
    case 'table.scale':
      return [
        { label: 'Use full span', apply: setTable({ scale: 'full-span' }) },
        ...(table.range === 'unipolar'
          ? [{ label: 'Go back to bipolar', apply: setTable({ range: 'bipolar' }) }]
          : []),
      ];
    case 'level.level': {
      if (Number.isNaN(level.level)) return [];
      const held = level.level > 1 ? 1 : 0;
      return [{ label: `Use ${held}`, apply: setLevel({ level: held }) }];
    }
    case 'level.transfer':
      return [
        { label: 'Use no transfer curve', apply: setLevel({ transfer: 'none' }) },
        ...(table.range === 'bipolar'
          ? [{ label: 'Go back to unipolar', apply: setTable({ range: 'unipolar' }) }]
          : []),
      ];
    case 'source':
      return level.normalise !== 'none' && /^a (zero|constant) signal$/.test(value)
        ? [{ label: 'Do not normalise', apply: setLevel({ normalise: 'none' }) }]
        : [];
    default:
      return [];
  }
}

function nearest(
  field: 'bits' | 'length' | 'cycles',
  value: number,
  { min, max }: { min: number; max: number },
): Mend[] {
  if (Number.isNaN(value)) return [];
  const near = Math.min(max, Math.max(min, Math.round(value)));
  return [{ label: `Use ${near}`, apply: setTable({ [field]: near }) }];
}
