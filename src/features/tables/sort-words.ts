import type { Sort } from './list-query.ts';

export const sortWords: Readonly<Record<Sort, string>> = {
  changed: 'Changed',
  title: 'Name',
  length: 'Length',
  bits: 'Bit depth',
  snr: 'SNR',
  bytes: 'Size',
};
