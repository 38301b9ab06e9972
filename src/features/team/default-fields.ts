import type { TeamDefaults } from '../../../shared/contract/index.ts';

export interface DefaultField {
  readonly name: keyof TeamDefaults;
  readonly label: string;
  readonly say: (defaults: TeamDefaults) => string;
}

/** The team's defaults in the order and the words of the form. */
export const defaultFields: readonly DefaultField[] = [
  {
    name: 'length',
    label: 'Table length',
    say: ({ length }) => `${length.toLocaleString('en')} ${length === 1 ? 'entry' : 'entries'}`,
  },
  { name: 'bits', label: 'Bit depth', say: ({ bits }) => `${bits} ${bits === 1 ? 'bit' : 'bits'}` },
  { name: 'target', label: 'Export target', say: ({ target }) => target },
  { name: 'arrayPrefix', label: 'Prefix of array names', say: ({ arrayPrefix }) => arrayPrefix || 'none' },
  { name: 'licenceLine', label: 'Licence line', say: ({ licenceLine }) => licenceLine || 'none' },
];
