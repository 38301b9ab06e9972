import { rcCutoffHz, type StageParts } from '../output-stage/filter.ts';
import type { Response } from './lines.ts';

/** Poles `s = re + i·im` in rad/s, both of a pair listed. The stage is `Π p/(p − s)`: no zeros, gain 1 at 0 Hz. */
export interface Pole {
  readonly re: number;
  readonly im: number;
}

/**
 * Poles of what stands behind the converter: resistance and capacitance of its output, the op-amp as a follower of one
 * pole at its gain-bandwidth product, and an RC or second-order Butterworth low-pass (S. Butterworth 1930).
 */
export function stagePoles({ outputOhms, capacitanceF, opAmp, filter }: StageParts): Pole[] {
  const poles: Pole[] = [];
  if (outputOhms * capacitanceF > 0) poles.push(realPole(rcCutoffHz(outputOhms, capacitanceF)));
  if (opAmp !== undefined) poles.push(realPole(opAmp.gainBandwidthHz));
  if (filter.kind === 'rc') poles.push(realPole(filter.cutoffHz));
  if (filter.kind === 'butterworth') {
    const side = 2 * Math.PI * filter.cutoffHz * Math.SQRT1_2;
    poles.push({ re: -side, im: side }, { re: -side, im: -side });
  }
  return poles;
}

const realPole = (cutoffHz: number): Pole => ({ re: -2 * Math.PI * cutoffHz, im: 0 });

/**
 * Complex gain of the stage, the hold left out; its magnitude is `stageGain`'s of the output stage. Signals are taken
 * as too small for the op-amp's slew rate to matter.
 */
export function stageResponse(parts: StageParts): Response {
  const poles = stagePoles(parts);
  return (hz, out) => {
    const omega = 2 * Math.PI * hz;
    let re = 1;
    let im = 0;
    // Times −p/(iω − p), as a product over all poles p: for a pair the imaginary parts of the numerators cancel.
    for (const pole of poles) {
      const numeratorRe = -pole.re;
      const numeratorIm = -pole.im;
      const belowRe = -pole.re;
      const belowIm = omega - pole.im;
      const size = belowRe * belowRe + belowIm * belowIm;
      const factorRe = (numeratorRe * belowRe + numeratorIm * belowIm) / size;
      const factorIm = (numeratorIm * belowRe - numeratorRe * belowIm) / size;
      const nextRe = re * factorRe - im * factorIm;
      im = re * factorIm + im * factorRe;
      re = nextRe;
    }
    out[0] = re;
    out[1] = im;
  };
}
