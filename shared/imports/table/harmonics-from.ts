import type { HarmonicsSource, Partial } from '../../contract/index.ts';
import { phasesDegOf, type Lines } from '../../dft/index.ts';

/**
 * Lines of a table of `length` values as a `harmonics` source: those of harmonics below N/2 that `keeps` names, but
 * for ones a millionth of the strongest or less.
 */
export function harmonicsFrom(
  lines: Lines,
  length: number,
  keeps: (harmonic: number) => boolean,
): HarmonicsSource {
  const { re, im } = lines;
  const phases = phasesDegOf(lines);
  const partials: Partial[] = [];
  let strongest = 0;
  for (let harmonic = 1; 2 * harmonic < length; harmonic += 1) {
    if (!keeps(harmonic)) continue;
    const amplitude = (2 * Math.hypot(re[harmonic], im[harmonic])) / length;
    strongest = Math.max(strongest, amplitude);
    partials.push({ harmonic, amplitude, phaseDeg: phases[harmonic] });
  }
  const heard = partials.filter(({ amplitude }) => amplitude > strongest * 1e-6);
  const silent = { harmonic: 1, amplitude: 0, phaseDeg: 0 };
  return { kind: 'harmonics', offset: re[0] / length, partials: heard.length > 0 ? heard : [silent] };
}
