declare module 'fft.js' {
  /** Radix-4 FFT of a power-of-two size; complex arrays are interleaved re, im. */
  export default class FFT {
    constructor(size: number);
    readonly size: number;
    /** Forward transform, e^(−i…), unscaled. `out` and `data` must differ. */
    transform(out: Float64Array, data: Float64Array): void;
  }
}
