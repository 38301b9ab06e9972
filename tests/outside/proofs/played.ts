// What playback has to give, worked out from codes in big integers: by engine specification §5, not by our own code.

interface Rate {
  readonly clockHz: number;
  readonly cyclesPerWord: number;
  readonly milliHz: number;
}

/** The step word nearest to 2^bits · f / fs, halves up. */
function stepWord(bits: number, { clockHz, cyclesPerWord, milliHz }: Rate): bigint {
  const numerator = BigInt(milliHz) * 2n ** BigInt(bits) * BigInt(cyclesPerWord);
  const denominator = 1000n * BigInt(clockHz);
  return (2n * numerator + denominator) / (2n * denominator);
}

function entries(count: number, bits: number, rate: Rate, samples: number): number[] {
  const step = stepWord(bits, rate);
  const span = 2n ** BigInt(bits);
  return Array.from({ length: samples }, (_, n) =>
    Number((((BigInt(n) * step) % span) * BigInt(count)) / span),
  );
}

export const accumulated = (words: readonly number[], bits: number, rate: Rate, samples: number) =>
  entries(words.length, bits, rate, samples).map((entry) => words[entry]);

/** Halves of sums of two codes, rounded down. */
export function summed(
  codes: readonly number[],
  bits: number,
  first: Rate,
  second: Rate,
  samples: number,
): number[] {
  const others = accumulated(codes, bits, second, samples);
  return accumulated(codes, bits, first, samples).map((code, n) => Math.floor((code + others[n]) / 2));
}

/** Even steps from the idle code to the first and from the last back to it, halves up. */
export function playedOnce(words: readonly number[], idle: number, rampWords: number): number[] {
  const ramp = (from: number, to: number) =>
    Array.from({ length: rampWords }, (_, k) =>
      Math.floor(
        (2 * (from * (rampWords + 1) + (to - from) * (k + 1)) + rampWords + 1) / (2 * (rampWords + 1)),
      ),
    );
  return [...ramp(idle, words[0]), ...words, ...ramp(words[words.length - 1], idle), idle];
}
