import { limits } from './limits.ts';

/** Bounds of ladders and boards (engine specification §6), shared by schemas, forms and messages. */
export const outputLimits = {
  bits: limits.bits,
  ohms: { min: 1e-9, max: 1e12 },
  volts: { min: -1000, max: 1000 },
  /** Least distance of the rails, in V. */
  leastSpanVolts: 1e-3,
  amps: { min: 1e-9, max: 1000 },
  farads: { min: 0, max: 1 },
  hertz: { min: 1e-3, max: 1e12 },
  slewRateVPerS: { min: 1, max: 1e12 },
  /** Either way: rising edges later (above 0) or earlier (below 0) than falling ones, in s. */
  edgeSkewS: { min: -1e-3, max: 1e-3 },
  clockTolerancePpm: { min: 0, max: 500_000 },
  prescaler: { min: 1, max: 65_536 },
  prescalers: { min: 1, max: 32 },
  compareBits: { min: 4, max: 32 },
  flashBytes: { min: 1, max: 2 ** 30 },
  bagResistors: 1_000,
  trials: { min: 1, max: 1_000_000 },
  ports: { min: 1, max: 8 },
  portWidth: { min: 1, max: 32 },
  /**
   * Resistors drawn normally with a tolerance of 3σ stay above 0 Ω up to here: the farthest deviate of 32 bits is
   * √(2·ln 2³³) = 6.76σ.
   */
  normalTolerancePercent: 44,
} as const;
