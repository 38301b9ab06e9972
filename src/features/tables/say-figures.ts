/** `256 × 8 bits`: entries of so many bits. */
export const saySize = ({ length, bits }: { length: number; bits: number }): string =>
  `${length.toLocaleString('en')} × ${bits} ${bits === 1 ? 'bit' : 'bits'}`;

/** `49.8 dB`; a dash where there is none: the codes give the wave exactly, or it does not move. */
export const saySnr = (snrDb: number | null): string => (snrDb === null ? '–' : `${snrDb.toFixed(1)} dB`);

export const sayBytes = (bytes: number): string => `${bytes.toLocaleString('en')} B`;
