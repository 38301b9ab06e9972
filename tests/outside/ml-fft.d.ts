declare module 'ml-fft' {
  /** Radix-2 transform in place, e^(−i…), unscaled; `init` sets the size for all calls that follow. */
  export const FFT: {
    init(size: number): void;
    fft(re: Float64Array, im: Float64Array): void;
  };
}
