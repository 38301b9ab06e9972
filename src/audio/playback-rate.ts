/** How a table is stepped through: N entries that hold K cycles of the wave. */
export interface TableShape {
  readonly tableLength: number;
  readonly tableCycles: number;
}

/** Sample rate in hertz at which a loop gives a tone: `fs = tone·N/K` (engine specification §5). */
export function sampleRateOfTone(toneHz: number, { tableLength, tableCycles }: TableShape): number {
  return (toneHz * tableLength) / tableCycles;
}

/** Tone in hertz of a loop played at a sample rate: `tone = K·fs/N` (engine specification §5). */
export function toneOfSampleRate(sampleRateHz: number, { tableLength, tableCycles }: TableShape): number {
  return (sampleRateHz * tableCycles) / tableLength;
}
