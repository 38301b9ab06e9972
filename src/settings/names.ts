/** What a setting is called, by its path in the definition. */
const names: Readonly<Record<string, string>> = {
  name: 'Name of the wave',
  source: 'Shape',
  'source.offset': 'Offset',
  'source.partials': 'Partials',
  'source.points': 'Points',
  'source.interpolation': 'Interpolation',
  'source.bandlimit': 'Held to the table’s band',
  'source.values': 'Samples',
  'source.resampling': 'Resampling',
  'source.operation': 'Mixed as',
  level: 'Level',
  'level.removeMean': 'Remove the mean',
  'level.normalise': 'Normalise',
  'level.level': 'Level',
  'level.transfer': 'Transfer curve',
  'level.transfer.gamma': 'Gamma',
  'table.length': 'Table length',
  'table.bits': 'Bit depth',
  'table.cycles': 'Cycles in the table',
  'table.startPhaseDeg': 'Start phase',
  'table.sampleAt': 'Sampled at the',
  'table.range': 'Range',
  'table.scale': 'Scale',
  'table.rounding': 'Rounding',
  'table.dither': 'Dither',
  'table.seed': 'Seed',
  'table.shaping': 'Noise shaping',
  'table.coding': 'Coding',
  'table.complement': 'Inverted codes',
  'table.fold': 'Stored',
  'table.levels': 'Measured levels',
};

const partNames: Readonly<Record<string, string>> = {
  harmonic: 'harmonic number',
  amplitude: 'amplitude',
  phaseDeg: 'phase',
  x: 'place in the cycle',
  y: 'value',
  gain: 'gain',
};

const itemNames: Readonly<Record<string, string>> = {
  partials: 'Partial',
  points: 'Point',
  values: 'Sample',
  parts: 'Part',
  levels: 'Level of code',
};

/**
 * Names the setting at a path in words: `source.partials[2].amplitude` is `Partial 3, amplitude`, and what stands in a
 * part of a mix is led by that part: `Part 2: Offset`. A path that is not known stays as it is.
 */
export function nameOfSetting(path: string): string {
  const inMix = /^source\.parts\[(\d+)\]\.(source\b.*)$/.exec(path);
  if (inMix !== null) return `Part ${Number(inMix[1]) + 1}: ${nameOfSetting(inMix[2])}`;
  const inList = /^(?:source|table)\.(partials|points|values|parts|levels)\[(\d+)\](?:\.(\w+))?$/.exec(path);
  if (inList === null) return names[path] ?? path;
  const [, list, index, part] = inList;
  // Codes are counted from 0, everything else as people count.
  const item = `${itemNames[list]} ${list === 'levels' ? index : Number(index) + 1}`;
  return part === undefined ? item : `${item}, ${partNames[part] ?? part}`;
}
