import type { Source } from '../../shared/contract/index.ts';

const count = (number: number, one: string, many: string) =>
  `${number.toLocaleString('en')} ${number === 1 ? one : many}`;

/** Says in a few words what a wave is made of, whatever its kind. */
export function sayInWords(source: Source): string {
  switch (source.kind) {
    case 'harmonics':
      return count(source.partials.length, 'partial', 'partials');
    case 'points':
      return `${count(source.points.length, 'point', 'points')}, ${source.interpolation}`;
    case 'samples':
      return `${count(source.values.length, 'sample', 'samples')}, resampled by ${resampling[source.resampling]}`;
    case 'mix': {
      const parts = source.parts.map(
        ({ gain, source: part }) =>
          `${gain === 1 ? '' : `${gain} × `}${part.kind === 'mix' ? `(${sayInWords(part)})` : sayInWords(part)}`,
      );
      return `${source.operation === 'sum' ? 'the sum of' : 'the product of'} ${parts.join('; ')}`;
    }
  }
}

const resampling = {
  bandlimited: 'its band-limited curve',
  linear: 'straight lines',
  hold: 'holding each one',
} as const;
