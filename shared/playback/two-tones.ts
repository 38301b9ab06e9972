import { Refusal, type HarmonicsSource } from '../contract/index.ts';
import { mustBePositive, mustBeWhole } from './inputs.ts';
import { centsBetween, ratioApart } from './pitch.ts';

export interface TwoTones {
  readonly sampleRateHz: number;
  /** Two different frequencies below half the sample rate. */
  readonly tonesHz: readonly [number, number];
  /** Longest loop that may be used, 5…65536. */
  readonly largestLength: number;
  /** How far either tone may be off, in cents. */
  readonly withinCents: number;
}

/** A loop of N entries that holds K₁ cycles of one tone and K₂ of the other. */
export interface TwoTonePlan {
  readonly tableLength: number;
  readonly cycles: readonly [number, number];
  /** `K·fs/N`. */
  readonly actualHz: readonly [number, number];
  readonly errorCents: readonly [number, number];
  /** The larger of both errors. */
  readonly worstCents: number;
}

export interface TwoToneChoice {
  /** The loop with the least worst error; of equal ones the shortest. */
  readonly best: TwoTonePlan;
  /** The shortest loop whose errors keep the limit; `null` where none does. */
  readonly shortest: TwoTonePlan | null;
}

/**
 * Loops that hold two tones at once, every length up to the largest considered.
 *
 * @throws {Refusal} where an input is out of range, or no length holds both tones.
 */
export function planTwoTones({ sampleRateHz, tonesHz, largestLength, withinCents }: TwoTones): TwoToneChoice {
  mustBePositive('sampleRateHz', sampleRateHz);
  tonesHz.forEach((hz, i) => mustBePositive(`tonesHz[${i}]`, hz));
  mustBePositive('withinCents', withinCents);
  mustBeWhole('largestLength', largestLength, 5, 65_536);
  let best: { length: number; apart: number } | null = null;
  let shortest: number | null = null;
  const enough = 2 ** (withinCents / 1200);
  for (let length = 2; length <= largestLength; length += 1) {
    const apart = worstApart(length, sampleRateHz, tonesHz);
    if (apart <= enough && shortest === null) shortest = length;
    if (apart < (best?.apart ?? Infinity)) best = { length, apart };
  }
  if (best === null) {
    throw new Refusal({
      path: 'tonesHz',
      value: `${tonesHz[0]} and ${tonesHz[1]}`,
      allowed: `two frequencies below ${sampleRateHz / 2} that a loop of ${largestLength} entries can tell apart`,
    });
  }
  const planOf = (length: number) => twoTonePlan(length, sampleRateHz, tonesHz);
  return { best: planOf(best.length), shortest: shortest === null ? null : planOf(shortest) };
}

/** The larger ratio between a tone and what the loop gives; Infinity where the loop cannot hold both. */
function worstApart(length: number, sampleRateHz: number, [firstHz, secondHz]: TwoTones['tonesHz']): number {
  const first = cyclesFor(length, sampleRateHz, firstHz);
  const second = cyclesFor(length, sampleRateHz, secondHz);
  if (first === second || 2 * Math.max(first, second) >= length) return Infinity;
  return Math.max(
    ratioApart((first * sampleRateHz) / length, firstHz),
    ratioApart((second * sampleRateHz) / length, secondHz),
  );
}

/** The whole number of cycles, at least 1, whose frequency lies nearest in cents. */
function cyclesFor(length: number, sampleRateHz: number, wantedHz: number): number {
  const below = Math.floor((length * wantedHz) / sampleRateHz);
  if (below < 1) return 1;
  const apart = (cycles: number) => ratioApart((cycles * sampleRateHz) / length, wantedHz);
  return apart(below + 1) < apart(below) ? below + 1 : below;
}

function twoTonePlan(length: number, sampleRateHz: number, tonesHz: TwoTones['tonesHz']): TwoTonePlan {
  const [firstHz, secondHz] = tonesHz;
  const cycles = [
    cyclesFor(length, sampleRateHz, firstHz),
    cyclesFor(length, sampleRateHz, secondHz),
  ] as const;
  const actualHz = [(cycles[0] * sampleRateHz) / length, (cycles[1] * sampleRateHz) / length] as const;
  const errorCents = [centsBetween(actualHz[0], firstHz), centsBetween(actualHz[1], secondHz)] as const;
  return {
    tableLength: length,
    cycles,
    actualHz,
    errorCents,
    worstCents: Math.max(Math.abs(errorCents[0]), Math.abs(errorCents[1])),
  };
}

/**
 * The loop as a source: one cycle of the table is the whole loop, so that the tones are its harmonics K₁ and K₂.
 *
 * @param amplitudes of the two tones before the table is levelled
 */
export function twoToneSource(
  { cycles }: Pick<TwoTonePlan, 'cycles'>,
  amplitudes: readonly [number, number] = [1, 1],
): HarmonicsSource {
  return {
    kind: 'harmonics',
    offset: 0,
    partials: cycles.map((harmonic, i) => ({ harmonic, amplitude: amplitudes[i], phaseDeg: 0 })),
  };
}
