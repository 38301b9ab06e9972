import type { BoardInput, PortMapInput } from '../../../shared/contract/index.ts';

/** Bits 0…b−1 on the same pins of as many ports of eight as it takes. */
export const straightMap = (bits: number): PortMapInput => ({
  bits: Array.from({ length: bits }, (_, bit) => ({ port: 'AB'[bit >> 3], pin: bit & 7 })),
  ports: [{ name: 'A' }, ...(bits > 8 ? [{ name: 'B' }] : [])],
});

type LadderOutputInput = Extract<BoardInput['output'], { kind: 'ladder' }>;

/** A board with a ladder on a port; fields of its output and of its own may be set. */
export const boardWith = (
  output: Partial<LadderOutputInput> = {},
  fields: Partial<BoardInput> = {},
): BoardInput => ({
  schema: 1,
  name: 'Board',
  clock: { hz: 16e6 },
  output: {
    kind: 'ladder',
    bits: 8,
    R: 10_000,
    portMap: straightMap(output.bits ?? 8),
    ...output,
  },
  ...fields,
});
