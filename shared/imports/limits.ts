/** Bounds of what is brought in. */
export const importLimits = {
  /** One file, in bytes. */
  fileBytes: 8 * 1024 * 1024,
  /** Longest recording that is read, in samples of one channel: 43 s at 96 kHz. */
  recordingSamples: 2 ** 22,
  /** Arrays that one source file may hold. */
  arrays: 1_000,
  /** Entries of one array before it is cut down to a table: an image of a whole program memory is looked through. */
  imageBytes: 2 ** 24,
  /** Files of one folder. */
  files: 500,
} as const;
