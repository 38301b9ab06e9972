/** What a setting is called, by its path in the definition. */
const names: Readonly<Record<string, string>> = {
  name: 'Name of the wave',
  source: 'Shape',
  'source.offset': 'Offset',
  'source.partials': 'Partials',
  'source.points': 'Points',
  'source.interpolation': 'Interpolation',
  'source.bandlimit': 'Band-limiting',
  'source.values': 'Samples',
  'source.resampling': 'Resampling',
  'source.operation': 'Operation',
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
  'table.sampleAt': 'Sampled at',
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

const listed: Readonly<Record<string, string>> = { partials: 'Partial', points: 'Point', values: 'Sample' };

/**
 * Names the setting at a path in words: `source.partials[2].amplitude` is `Partial 3, amplitude`, and in the
 * second part of a mix `Part 2: Partial 3, amplitude`.
 */
export function nameOfSetting(path: string): string {
  const inMix = /^source\.parts\[(\d+)\](?:\.(source\b.*|\w+))?$/.exec(path);
  if (inMix !== null) {
    const [, index, inner] = inMix;
    const part = `Part ${Number(index) + 1}`;
    if (inner === undefined || inner === 'source') return part;
    return inner.startsWith('source.')
      ? `${part}: ${nameOfSetting(inner)}`
      : `${part}, ${partNames[inner] ?? inner}`;
  }
  const inList = /^source\.(partials|points|values)\[(\d+)\](?:\.(\w+))?$/.exec(path);
  if (inList !== null) {
    const [, list, index, part] = inList;
    const item = `${listed[list]} ${Number(index) + 1}`;
    return part === undefined ? item : `${item}, ${partNames[part] ?? part}`;
  }
  const level = /^table\.levels\[(\d+)\]$/.exec(path);
  if (level !== null) return `Measured level of code ${level[1]}`;
  return names[path] ?? path;
}
