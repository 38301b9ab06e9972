/** Options in the groups that a form shows, in order; a target has some of each. */
export const optionGroups: readonly { readonly title: string; readonly options: readonly string[] }[] = [
  { title: 'Names', options: ['arrayName', 'arrayPrefix', 'licenceLine'] },
  { title: 'Numbers and lines', options: ['numberBase', 'columns', 'lineEnding'] },
  {
    title: 'Storage',
    options: ['storage', 'alignment', 'packed', 'endianness', 'address', 'repeats', 'sampleRateHz'],
  },
  {
    title: 'Pins',
    options: ['port', 'highPort', 'portMap', 'reservedPins', 'reservedBy', 'portAddress'],
  },
  { title: 'Pulses', options: ['pulses'] },
  {
    title: 'Playback',
    options: [
      'playback',
      'unroll',
      'clockHz',
      'prescaler',
      'compare',
      'countsPerWord',
      'accumulatorBits',
      'toneMilliHz',
      'secondToneMilliHz',
      'idleCode',
      'rampWords',
      'dmaBits',
      'timeAddress',
      'compareAddress',
    ],
  },
];

const timed = ['timer', 'timer-accumulator', 'two-accumulators', 'once'];
const withPhase = ['accumulator', 'timer-accumulator', 'two-accumulators'];

/** Options that mean something only while another one is set so. */
const needs: Readonly<Record<string, { readonly option: string; readonly values: readonly string[] }>> = {
  unroll: { option: 'playback', values: ['loop'] },
  clockHz: { option: 'playback', values: [...timed, 'accumulator'] },
  prescaler: { option: 'playback', values: timed },
  compare: { option: 'playback', values: timed },
  countsPerWord: { option: 'playback', values: timed },
  accumulatorBits: { option: 'playback', values: withPhase },
  toneMilliHz: { option: 'playback', values: withPhase },
  secondToneMilliHz: { option: 'playback', values: ['two-accumulators'] },
  idleCode: { option: 'playback', values: ['once'] },
  rampWords: { option: 'playback', values: ['once'] },
  dmaBits: { option: 'playback', values: ['dma'] },
  timeAddress: { option: 'playback', values: timed },
  compareAddress: { option: 'playback', values: timed },
  portAddress: { option: 'playback', values: ['loop', ...timed] },
};

/** Whether an option means something while the others are set as they are; what it is set to is kept all the same. */
export function optionApplies(name: string, valueOf: (option: string) => string): boolean {
  const hasMap = valueOf('portMap') !== '';
  if (name === 'port' || name === 'highPort') return !hasMap;
  if (name === 'reservedPins' || name === 'reservedBy') return hasMap;
  const need = needs[name];
  return need === undefined || need.values.includes(valueOf(need.option));
}
