import type { ResponsePoint } from './device-response.ts';

/** A kind of device with a curve to begin with. */
export interface DeviceKind {
  readonly id: 'piezo' | 'handset' | 'cone';
  readonly name: string;
  /** What the curve stands for, and where it comes from. */
  readonly words: string;
  readonly points: readonly ResponsePoint[];
}

/**
 * Three curves to begin with. They are approximations and no device's data: the shapes that such parts commonly have
 * (common practice, no source). The handset's band, 300 to 3400 Hz, is telephony's (from memory).
 */
export const deviceKinds: readonly DeviceKind[] = [
  {
    id: 'piezo',
    name: 'Small piezo',
    words:
      'A piezo disc of 2 to 3 cm in its housing: next to nothing below 500 Hz, strongest where disc and housing resonate, here at 4 kHz. Common practice, no source.',
    points: [
      { hz: 100, db: -60 },
      { hz: 200, db: -48 },
      { hz: 500, db: -32 },
      { hz: 1_000, db: -20 },
      { hz: 2_000, db: -11 },
      { hz: 3_000, db: -6 },
      { hz: 4_000, db: 0 },
      { hz: 5_000, db: -6 },
      { hz: 7_000, db: -12 },
      { hz: 10_000, db: -16 },
      { hz: 15_000, db: -22 },
      { hz: 20_000, db: -30 },
    ],
  },
  {
    id: 'handset',
    name: 'Handset receiver',
    words:
      'The receiver of a telephone handset: level within 3 dB over the band of telephony, 300 to 3400 Hz (from memory), and falling on both sides. Common practice, no source.',
    points: [
      { hz: 50, db: -48 },
      { hz: 100, db: -32 },
      { hz: 200, db: -10 },
      { hz: 300, db: -3 },
      { hz: 500, db: -1 },
      { hz: 1_000, db: 0 },
      { hz: 2_000, db: 0 },
      { hz: 3_000, db: -1 },
      { hz: 3_400, db: -3 },
      { hz: 4_500, db: -12 },
      { hz: 7_000, db: -27 },
      { hz: 10_000, db: -39 },
    ],
  },
  {
    id: 'cone',
    name: 'Small cone',
    words:
      'A loudspeaker with a cone of 4 to 5 cm in a small box: falling by 12 dB an octave below its resonance, here 350 Hz, and slowly above 5 kHz. Common practice, no source.',
    points: [
      { hz: 50, db: -35 },
      { hz: 100, db: -23 },
      { hz: 200, db: -10 },
      { hz: 350, db: -1 },
      { hz: 500, db: 0 },
      { hz: 1_000, db: -1 },
      { hz: 3_000, db: 0 },
      { hz: 5_000, db: -2 },
      { hz: 8_000, db: -5 },
      { hz: 12_000, db: -9 },
      { hz: 20_000, db: -20 },
    ],
  },
];
