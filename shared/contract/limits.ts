/** Bounds of the definition (engine specification §1, §2), shared by schemas, forms and messages. */
export const limits = {
  nameLength: { min: 1, max: 64 },
  tableLength: { min: 2, max: 65_536 },
  bits: { min: 1, max: 16 },
  cycles: { min: 1, max: 64 },
  harmonic: { min: 1, max: 32_768 },
  partials: { min: 1, max: 4_096 },
  points: { min: 2, max: 4_096 },
  splinePoints: { min: 3, max: 4_096 },
  samples: { min: 2, max: 65_536 },
  mixParts: { min: 1, max: 16 },
  mixDepth: 4,
  leafSources: 64,
  partialsInAll: 8_192,
  gamma: { min: 0.1, max: 10 },
  seed: { min: 0, max: 4_294_967_295 },
  /** Most problems that one refusal lists; a form or a log has no use for more. */
  problemsShown: 50,
  /** Different words that one search of the library may look for. */
  searchWords: 8,
  revisionsPerTable: 10_000,
  revisionsPerBoard: 1_000,
  /** Largest request body the server reads, in bytes. */
  requestBytes: 8 * 1024 * 1024,
} as const;
