import type { BoardInput, Role } from '../../shared/contract/index.ts';

export interface DemoBoard {
  readonly revisions: readonly { readonly by: Role; readonly note: string; readonly board: BoardInput }[];
}

const small: BoardInput = {
  schema: 1,
  name: 'Small controller, 6-bit ladder',
  clock: { hz: 8e6, tolerancePpm: 20_000 },
  timer: { prescalers: [1, 8, 64, 256, 1024], compareBits: 8 },
  flashBytes: 1024,
  supply: { vHigh: 3.3 },
  currents: { pinAmps: 0.01, totalAmps: 0.06 },
  output: {
    kind: 'ladder',
    bits: 6,
    R: 10_000,
    rHigh: 60,
    rLow: 45,
    tolerancePercent: 5,
    portMap: {
      bits: [0, 1, 2, 3, 4, 5].map((pin) => ({ port: 'B', pin })),
      // The lamp is on while its pin is low; the other is the watch contact's.
      ports: [{ name: 'B', reserved: [{ pin: 6, rest: 'high' }, { pin: 7 }] }],
    },
  },
  stage: { outputCapacitanceF: 22e-12, load: 100_000, edgeSkewS: 3e-9 },
};

const converter: BoardInput = {
  schema: 1,
  name: 'Buoy controller, 12-bit converter',
  clock: { hz: 48e6, tolerancePpm: 30 },
  timer: { prescalers: [1, 2, 4, 8, 16], compareBits: 16 },
  flashBytes: 16_384,
  supply: { vHigh: 3 },
  output: { kind: 'on-chip', bits: 12, registerBits: 16, alignment: 'right' },
  stage: {
    opAmp: { slewRateVPerS: 500_000, gainBandwidthHz: 1e6 },
    filter: { kind: 'butterworth', cutoffHz: 4000 },
  },
};

/**
 * What the made-up team's tables play on. Figures chosen for this demonstration, no source: what pins carry and how they
 * drive stands in the data sheet of the controller in use.
 */
export const demoBoards: readonly DemoBoard[] = [
  {
    revisions: [
      { by: 'author', note: 'As built for the first buoys.', board: small },
      {
        by: 'author',
        note: 'Resistors of 1 %: at 5 % two builds in ten missed a step.',
        board: { ...small, output: { ...small.output, tolerancePercent: 1 } as BoardInput['output'] },
      },
    ],
  },
  { revisions: [{ by: 'admin', note: 'For the self-test and the new buoys.', board: converter }] },
];
