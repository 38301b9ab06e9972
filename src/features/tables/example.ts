import { parseDefinition } from '../../../shared/contract/index.ts';

/** A first table for a team that has none: one sine, symmetrical about zero, for checking an output. */
export const workingExample = () => ({
  title: 'Self-test sine',
  tags: ['example'],
  note: 'One sine for checking an output, symmetrical about zero.',
  definition: parseDefinition({
    schema: 1,
    name: 'Self-test sine',
    source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
    table: { length: 128, bits: 10, sampleAt: 'centre', rounding: 'half-even' },
  }),
  playback: { mode: 'loop' as const, by: 'tone' as const, toneHz: 1_000, sampleRateHz: 128_000 },
});
