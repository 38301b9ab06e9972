import type { DefinitionInput, Revision, Role } from '../../shared/contract/index.ts';
import { answeringTone, fogSignal, lampFade, lowBatteryChirp, selfTestSine } from './definitions.ts';

export interface DemoRevision {
  readonly by: Role;
  readonly note: string;
  readonly definition: DefinitionInput;
}

export interface DemoTable {
  readonly title: string;
  readonly tags: readonly string[];
  readonly playback: NonNullable<Revision['playback']>;
  readonly revisions: readonly DemoRevision[];
}

const loop = (toneHz: number) => ({ mode: 'loop', by: 'tone', toneHz, sampleRateHz: 32_000 }) as const;
const once = (sampleRateHz: number) =>
  ({ mode: 'once', by: 'sampleRate', toneHz: 440, sampleRateHz }) as const;

/** The made-up team's library: sounds and lights of harbour buoys. */
export const demoTables: readonly DemoTable[] = [
  {
    title: 'Self-test sine',
    tags: ['self-test', 'sine'],
    playback: loop(1000),
    revisions: [
      { by: 'author', note: 'For the output stage of the self-test.', definition: selfTestSine.first },
      {
        by: 'reviewer',
        note: 'Sampled at the centres: no entry repeats at the seam. 12 bits.',
        definition: selfTestSine.centred,
      },
    ],
  },
  {
    title: 'Lamp fade',
    tags: ['lamp', 'unipolar'],
    playback: { mode: 'loop', by: 'tone', toneHz: 0.5, sampleRateHz: 128 },
    revisions: [
      { by: 'author', note: 'Up and down once in a table.', definition: lampFade.plain },
      { by: 'admin', note: 'Even to the eye: lightness turned into luminance.', definition: lampFade.even },
    ],
  },
  {
    title: 'Low-battery chirp',
    tags: ['alert', 'chirp'],
    playback: once(8000),
    revisions: [
      { by: 'author', note: 'Rising, once through.', definition: lowBatteryChirp.long },
      {
        by: 'author',
        note: 'Half as long, 6 bits: fits the small controller.',
        definition: lowBatteryChirp.short,
      },
    ],
  },
  {
    title: 'Fog signal, answering tone',
    tags: ['fog', 'tone'],
    playback: loop(330),
    revisions: [
      {
        by: 'author',
        note: 'Odd partials only, to be told from the main tone.',
        definition: answeringTone.first,
      },
      { by: 'reviewer', note: '10 bits for the new output stage.', definition: answeringTone.finer },
    ],
  },
  {
    title: 'Fog signal, main tone',
    tags: ['fog', 'tone'],
    playback: loop(220),
    revisions: [
      { by: 'author', note: 'Three partials.', definition: fogSignal.first },
      { by: 'author', note: 'Five partials, 256 entries: carries better.', definition: fogSignal.brighter },
      {
        by: 'reviewer',
        note:
          'Level 0.9 keeps clear of the limiter. Loudness and character are for the applicable standard and a ' +
          'qualified engineer to decide.',
        definition: fogSignal.quieter,
      },
    ],
  },
];
