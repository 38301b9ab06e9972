/** Every address of the client, in one place. */
export const paths = {
  bench: '/',
  /** The wave stands in the fragment, which browsers keep to themselves. */
  sharedWave: '/wave',
} as const;
