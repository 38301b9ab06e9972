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

const keepWhole: Mend = { label: 'Store the whole table', apply: setTable({ fold: 'none' }) };

const clearLevels: Mend = {
  label: 'Clear the measured levels',
  apply: ({ table: { levels: _gone, ...table }, ...definition }) => ({ ...definition, table }),
};

const isTaken = (value: number, { min, max }: { min: number; max: number }) =>
  Number.isInteger(value) && value >= min && value <= max;

const inFours = (length: number) => Math.max(4, 4 * Math.round(length / 4));

/** The ways out of a problem that need no further thought, the likeliest first. */
export function mendsFor({ path, value }: Problem, { level, table }: Definition): Mend[] {
  switch (path) {
    case 'table.bits':
      return nearest('bits', table.bits, limits.bits);
    case 'table.length':
      return table.fold === 'quarter' && isTaken(table.length, limits.tableLength)
        ? [
            { label: `Use ${inFours(table.length)}`, apply: setTable({ length: inFours(table.length) }) },
            keepWhole,
          ]
        : nearest('length', table.length, limits.tableLength);
    case 'table.cycles':
      if (table.fold === 'quarter' && isTaken(table.cycles, limits.cycles))
        return [{ label: 'Use 1', apply: setTable({ cycles: 1 }) }, keepWhole];
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
          ? [{ label: 'Make the range bipolar', apply: setTable({ range: 'bipolar' }) }]
          : []),
      ];
    case 'table.sampleAt':
      return [{ label: 'Sample at the centre', apply: setTable({ sampleAt: 'centre' }) }, keepWhole];
    case 'table.rounding':
      return [
        { label: 'Round half up', apply: setTable({ rounding: 'half-up' }) },
        table.levels === undefined ? keepWhole : clearLevels,
      ];
    case 'table.dither':
      return [{ label: 'Use no dither', apply: setTable({ dither: 'none' }) }, clearLevels];
    case 'table.shaping':
      return [{ label: 'Use no shaping', apply: setTable({ shaping: 0 }) }, clearLevels];
    case 'table.seed':
      return nearest('seed', table.seed, limits.seed);
    case 'table.fold':
      return [
        keepWhole,
        ...(table.dither !== 'none' || table.shaping !== 0
          ? [
              {
                label: 'Use neither dither nor shaping',
                apply: setTable({ dither: 'none' as const, shaping: 0 as const }),
              },
            ]
          : []),
      ];
    case 'table.levels': {
      const bits = Math.log2(table.levels?.length ?? 0);
      return [
        clearLevels,
        ...(Number.isInteger(bits) && isTaken(bits, limits.bits) && bits !== table.bits
          ? [{ label: `Use ${bits} ${bits === 1 ? 'bit' : 'bits'}`, apply: setTable({ bits }) }]
          : []),
      ];
    }
    case 'level.level': {
      if (Number.isNaN(level.level)) return [];
      const held = level.level > 1 ? 1 : 0;
      return [{ label: `Use ${held}`, apply: setLevel({ level: held }) }];
    }
    case 'level.transfer':
      return [
        { label: 'Use no transfer curve', apply: setLevel({ transfer: 'none' }) },
        ...(table.range === 'bipolar'
          ? [{ label: 'Make the range unipolar', apply: setTable({ range: 'unipolar' }) }]
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
  field: 'bits' | 'length' | 'cycles' | 'seed',
  value: number,
  { min, max }: { min: number; max: number },
): Mend[] {
  if (Number.isNaN(value)) return [];
  const near = Math.min(max, Math.max(min, Math.round(value)));
  return [{ label: `Use ${near}`, apply: setTable({ [field]: near }) }];
}
