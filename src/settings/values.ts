import { formatQuantity } from '../../shared/quantities/index.ts';

/** What the choices of a setting are called. */
const choices: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  'source.interpolation': { step: 'steps', linear: 'straight lines', monotone: 'monotone', spline: 'spline' },
  'source.resampling': { bandlimited: 'band-limited', linear: 'straight lines', hold: 'held' },
  'source.operation': { sum: 'a sum', product: 'a product' },
  'level.normalise': { peak: 'to the peak', span: 'to the whole span', none: 'not at all' },
  'level.transfer': { none: 'none', 'cie-lightness': 'CIE lightness' },
  'table.sampleAt': { start: 'step’s start', centre: 'step’s centre' },
  'table.range': { bipolar: 'bipolar', unipolar: 'unipolar' },
  'table.scale': { 'full-span': 'full span', 'mid-tread': 'mid-tread' },
  'table.rounding': { 'half-up': 'half up', 'half-even': 'half to even', down: 'down' },
  'table.dither': { none: 'none', rectangular: 'rectangular', triangular: 'triangular' },
  'table.shaping': { 0: 'none', 1: 'order 1', 2: 'order 2' },
  'table.coding': { 'offset-binary': 'offset binary', 'twos-complement': 'two’s complement' },
  'table.fold': { none: 'the whole table', quarter: 'the first quarter' },
};

const units: Readonly<Record<string, string>> = {
  'source.offset': 'of full scale',
  'level.level': 'of full scale',
  'table.bits': 'bits',
  'table.length': 'entries',
  'table.startPhaseDeg': '°',
};

/** What is said where one side has nothing. */
export const absent = '–';

const noNumber = /\[\d+\]/g;

/** Says the value of a setting in words, with its unit. Paths within a mix are said as those of a whole shape. */
export function sayValue(path: string, value: unknown): string {
  if (value === undefined) return absent;
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  const own = path.replace(/^(source\.parts\[\d+\]\.)+/, '').replace(noNumber, '');
  const choice = choices[own]?.[String(value)];
  if (choice !== undefined) return choice;
  if (typeof value !== 'number') return String(value);
  const said = Number.isInteger(value) ? whole(value) : formatQuantity(value, '', { significant: 6 });
  const unit = units[own] ?? (own.endsWith('Deg') ? '°' : '');
  if (unit === '' || unit === '°') return said + unit;
  const single = value === 1 ? ({ bits: 'bit', entries: 'entry' }[unit] ?? unit) : unit;
  return `${said} ${single}`;
}

const whole = (value: number) => value.toLocaleString('en').replace('-', '−');
