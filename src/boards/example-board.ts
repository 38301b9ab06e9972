import { parseBoard, type Board, type BoardInput } from '../../shared/contract/index.ts';

/**
 * A ladder of as many bits on port B. Figures chosen for the example, no source: what pins carry and how they drive
 * stands in the data sheet of the controller in use.
 */
export const exampleBoardInput = (bits = 8): BoardInput => ({
  schema: 1,
  name: 'Example board',
  clock: { hz: 8e6, tolerancePpm: 50 },
  timer: { prescalers: [1, 8, 64, 256, 1024], compareBits: 16 },
  flashBytes: 8192,
  supply: { vHigh: 5 },
  currents: { pinAmps: 0.02, totalAmps: 0.1 },
  output: {
    kind: 'ladder',
    bits,
    R: 10_000,
    rHigh: 30,
    rLow: 25,
    tolerancePercent: 1,
    portMap: {
      bits: Array.from({ length: bits }, (_, bit) => ({ port: bit < 8 ? 'B' : 'C', pin: bit % 8 })),
      ports: [{ name: 'B' }, ...(bits > 8 ? [{ name: 'C' }] : [])],
    },
  },
  stage: {
    outputCapacitanceF: 22e-12,
    opAmp: { slewRateVPerS: 500_000, gainBandwidthHz: 1e6 },
    filter: { kind: 'rc', cutoffHz: 8000 },
    edgeSkewS: 3e-9,
  },
});

export const exampleBoard = (bits?: number): Board => parseBoard(exampleBoardInput(bits));
