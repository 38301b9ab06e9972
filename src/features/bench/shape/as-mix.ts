import type { MixSource, Source } from '../../../../shared/contract/index.ts';

/** A mix of one part, which sounds as the part does. */
export function asMix(source: Source): MixSource {
  return { kind: 'mix', operation: 'sum', parts: [{ gain: 1, source }] };
}
