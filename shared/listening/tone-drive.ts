import { Refusal } from '../contract/index.ts';
import { centsBetween } from '../playback/index.ts';

/** How a part makes a tone of K cycles in N entries: by what it can set while it plays. */
export type ToneDrive =
  /** Any sample rate: `fs = tone·N/K`, exactly. */
  | { readonly kind: 'rate'; readonly tableLength: number; readonly cycles: number }
  /** A timer's compare register of 1…32 bits: `fs = fclk/(prescaler·(compare + 1))`. */
  | {
      readonly kind: 'timer';
      readonly clockHz: number;
      readonly prescaler: number;
      readonly compareBits: number;
      readonly tableLength: number;
      readonly cycles: number;
    }
  /** A step word at one sample rate: `tone = K·W·fs/2^M`. */
  | {
      readonly kind: 'accumulator';
      readonly sampleRateHz: number;
      readonly accumulatorBits: number;
      readonly cycles: number;
    };

/** What sets a tone in a score. */
export type ToneSetting = { readonly toneHz: number } | { readonly stepWord: number };

export interface PlayedTone {
  readonly wantedHz: number;
  /** What the pin gives. */
  readonly playedHz: number;
  /** `1200·log2(played/wanted)`. */
  readonly errorCents: number;
  /** Step word or compare value; `null` where any rate can be had. */
  readonly word: number | null;
  /** Rate of entries. */
  readonly sampleRateHz: number;
  readonly setting: ToneSetting;
}

/** The whole numbers that a drive goes by; a free rate takes hertz as they are. */
export interface Register {
  /** Nearest to a frequency; at the ends of the register, that end. */
  wordFor(hz: number): number;
  hzOf(word: number): number;
}

export function registerOf(drive: ToneDrive): Register {
  switch (drive.kind) {
    case 'rate':
      return { wordFor: (hz) => hz, hzOf: (hz) => hz };
    case 'timer': {
      const { clockHz, prescaler, compareBits, tableLength, cycles } = drive;
      const unit = (clockHz * cycles) / (prescaler * tableLength);
      const most = 2 ** compareBits;
      return {
        wordFor(hz) {
          const ticks = unit / hz;
          const below = Math.floor(ticks);
          if (below < 1) return 0;
          if (below >= most) return most - 1;
          // Nearest in cents: the border between two periods is their geometric mean.
          return ticks * ticks > below * (below + 1) ? below : below - 1;
        },
        hzOf: (compare) => (clockHz * cycles) / (prescaler * (compare + 1) * tableLength),
      };
    }
    case 'accumulator': {
      const { accumulatorBits, cycles, sampleRateHz } = drive;
      const stepHz = sampleRateHz / 2 ** accumulatorBits;
      const highest = 2 ** (accumulatorBits - 1) - 1;
      return {
        wordFor: (hz) => Math.min(highest, Math.max(1, Math.round(hz / cycles / stepHz))),
        hzOf: (word) => word * stepHz * cycles,
      };
    }
  }
}

/**
 * The tone that a drive makes of a wanted one: by the nearest whole number of its register.
 *
 * @throws {Refusal} where the register does not reach it, to half a step, or it is not below half the sample rate.
 */
export function planTone(drive: ToneDrive, wantedHz: number): PlayedTone {
  const [lowest, highest] = toneReachHz(drive);
  if (!(wantedHz >= lowest && wantedHz < highest)) {
    throw new Refusal({
      path: 'wantedHz',
      value: `${shown(wantedHz)} Hz`,
      allowed: `a frequency from ${shown(lowest)} Hz up to, not including, ${shown(highest)} Hz`,
    });
  }
  const register = registerOf(drive);
  const word = register.wordFor(wantedHz);
  const playedHz = register.hzOf(word);
  return {
    wantedHz,
    playedHz,
    errorCents: centsBetween(playedHz, wantedHz),
    word: drive.kind === 'rate' ? null : word,
    sampleRateHz:
      drive.kind === 'accumulator' ? drive.sampleRateHz : (playedHz * drive.tableLength) / drive.cycles,
    setting: settingOf(drive, word, playedHz),
  };
}

export function settingOf({ kind }: ToneDrive, word: number, hz: number): ToneSetting {
  return kind === 'accumulator' ? { stepWord: word } : { toneHz: hz };
}

/** Frequencies that a drive reaches, in Hz: from the first up to, not including, the second. */
export function toneReachHz(drive: ToneDrive): readonly [lowest: number, highest: number] {
  switch (drive.kind) {
    case 'rate':
      return [Number.MIN_VALUE, Infinity];
    case 'timer': {
      const { clockHz, prescaler, compareBits, tableLength, cycles } = drive;
      const unit = (clockHz * cycles) / (prescaler * tableLength);
      const longest = 2 ** compareBits;
      // Half a step beyond the ends, in cents; above the shortest period half of the octave that lies below it.
      return [unit / Math.sqrt(longest * (longest + 1)), unit * Math.SQRT2];
    }
    case 'accumulator': {
      const { accumulatorBits, cycles, sampleRateHz } = drive;
      const stepHz = (sampleRateHz / 2 ** accumulatorBits) * cycles;
      return [stepHz / 2, Math.min(sampleRateHz / 2, stepHz * (2 ** (accumulatorBits - 1) - 0.5))];
    }
  }
}

const shown = (hz: number) => (hz > 0 && hz < 1e-300 ? '0' : String(Number(hz.toPrecision(7))));
