import type { DefinitionInput, Revision, Role, Verdict } from '../../shared/contract/index.ts';
import { answeringTone, fogSignal, lampFade, lowBatteryChirp, selfTestSine } from './definitions.ts';

export interface DemoRevision {
  readonly by: Role;
  readonly note: string;
  readonly definition: DefinitionInput;
  readonly comments?: readonly DemoComment[];
  readonly review?: DemoReview;
}

export interface DemoComment {
  readonly by: Role;
  readonly text: string;
  readonly path: string | null;
}

/** What became of a revision that was submitted, as far as it came. */
export interface DemoReview {
  readonly submitted: { readonly by: Role; readonly message: string };
  readonly decided?: { readonly by: Role; readonly verdict: Verdict; readonly note: string };
  readonly withdrawn?: { readonly by: Role; readonly reason: string };
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
      {
        by: 'author',
        note: 'For the output stage of the self-test.',
        definition: selfTestSine.first,
        review: {
          submitted: { by: 'author', message: 'A plain sine. Are 64 entries enough for the self-test?' },
          decided: {
            by: 'reviewer',
            verdict: 'returned',
            note:
              'The length is fine. The self-test reads a 12-bit converter: 8 bits would hide its lower steps. Sampled ' +
              'at the centres, both halves would be mirror images.',
          },
        },
      },
      {
        by: 'reviewer',
        note: 'Sampled at the centres: no entry repeats at the seam. 12 bits.',
        definition: selfTestSine.centred,
        review: {
          submitted: { by: 'reviewer', message: 'With what I asked for in revision 1.' },
          decided: { by: 'admin', verdict: 'vetted', note: '' },
        },
      },
    ],
  },
  {
    title: 'Lamp fade',
    tags: ['lamp', 'unipolar'],
    playback: { mode: 'loop', by: 'tone', toneHz: 0.5, sampleRateHz: 128 },
    revisions: [
      { by: 'author', note: 'Up and down once in a table.', definition: lampFade.plain },
      {
        by: 'admin',
        note: 'Even to the eye: lightness turned into luminance.',
        definition: lampFade.even,
        comments: [
          { by: 'author', text: 'Is 0 really dark with this driver?', path: 'table.range' },
          { by: 'admin', text: 'It is, measured at the lamp.', path: 'table.range' },
        ],
        review: {
          submitted: { by: 'author', message: 'Looks even from a distance. Please see to the dark end.' },
          decided: { by: 'reviewer', verdict: 'vetted', note: 'Even down to the darkest steps.' },
          withdrawn: {
            by: 'reviewer',
            reason: 'The new lamp driver has a threshold: the lowest steps stay dark, and the fade jumps on.',
          },
        },
      },
    ],
  },
  {
    title: 'Low-battery chirp',
    tags: ['alarm', 'chirp'],
    playback: once(8000),
    revisions: [
      { by: 'author', note: 'Rising, once through.', definition: lowBatteryChirp.long },
      {
        by: 'author',
        note: 'Half as long, 6 bits: fits the small controller.',
        definition: lowBatteryChirp.short,
        comments: [
          { by: 'reviewer', text: 'Would 7 bits still fit?', path: 'table.bits' },
          { by: 'author', text: 'No: two bits of the port are taken by the lamp.', path: 'table.bits' },
        ],
        review: {
          submitted: {
            by: 'author',
            message: 'One limit for alarms fails by 3 dB. The buzzer hides it; can we let it pass?',
          },
        },
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
      {
        by: 'reviewer',
        note: '10 bits for the new output stage.',
        definition: answeringTone.finer,
        review: {
          submitted: { by: 'author', message: 'Two bytes an entry from here on. Sound as before?' },
          decided: {
            by: 'admin',
            verdict: 'returned',
            note: 'The buoys in the water keep the 8-bit stage until next year. Please leave this tone at 8 bits.',
          },
        },
      },
    ],
  },
  {
    title: 'Fog signal, main tone',
    tags: ['fog', 'tone'],
    playback: loop(220),
    revisions: [
      { by: 'author', note: 'Three partials.', definition: fogSignal.first },
      {
        by: 'author',
        note: 'Five partials, 256 entries: carries better.',
        definition: fogSignal.brighter,
        review: {
          submitted: { by: 'author', message: 'Brighter. Please listen on the buoy, not at the desk.' },
          decided: { by: 'reviewer', verdict: 'vetted', note: 'Heard from the pier: clear, no rattle.' },
        },
      },
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
