/** A sine found in what sounds. */
export interface SoundingLine {
  readonly hz: number;
  /** Amplitude; full scale of the output is 1. */
  readonly amplitude: number;
}

/** Mean square of the analyser's Blackman window (α = 0.16, Web Audio API 1.1): `0.42² + 0.5²/2 + 0.08²/2`. */
const windowPower = 0.42 ** 2 + 0.5 ** 2 / 2 + 0.08 ** 2 / 2;
/** Half-width of the window's main lobe in bins: all but 10⁻⁵ of a line's power lies within. */
const lobe = 3;
/** The window's side lobes lie 58 dB below their line; nothing that low beside a strong line is told from them. */
const floorBelowStrongest = 10 ** (-55 / 10);

/**
 * Finds the strongest sines in a magnitude spectrum of the Blackman window. A line's amplitude comes from the summed
 * power of its main lobe, `A = 2·√(Σ|X|²/mean(w²))`, and its frequency from the lobe's centre of power: neither depends
 * on where it lies between two bins. Lines need six bins between them.
 *
 * @param levelsDb level of each bin, 0 … fftSize/2 − 1, in dB as AnalyserNode gives them
 * @param binHz width of a bin
 * @param power scratch of at least `levelsDb.length` numbers; its contents are lost
 * @returns at most `count` lines, strongest first
 */
export function strongestLines(
  levelsDb: Float32Array,
  binHz: number,
  count: number,
  power: Float64Array,
): SoundingLine[] {
  const bins = levelsDb.length;
  for (let k = 0; k < bins; k += 1) power[k] = 10 ** (levelsDb[k] / 10);
  const lines: SoundingLine[] = [];
  let strongest = 0;
  while (lines.length < count) {
    let peak = -1;
    for (let k = lobe; k < bins - lobe; k += 1) {
      const isHighest = power[k] > 0 && power[k] >= power[k - 1] && power[k] >= power[k + 1];
      if (isHighest && (peak < 0 || power[k] > power[peak])) peak = k;
    }
    if (peak < 0 || power[peak] < strongest * floorBelowStrongest) break;
    strongest = Math.max(strongest, power[peak]);
    let sum = 0;
    let moment = 0;
    for (let k = peak - lobe; k <= peak + lobe; k += 1) {
      sum += power[k];
      moment += k * power[k];
      power[k] = 0;
    }
    lines.push({ hz: (moment / sum) * binHz, amplitude: 2 * Math.sqrt(sum / windowPower) });
  }
  return lines;
}
