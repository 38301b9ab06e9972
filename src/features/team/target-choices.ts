import { targets } from '../../../shared/firmware/index.ts';

/** The exports to choose from; one that this version does not know stays as it is. */
export const targetChoices = (present: string) => {
  const known = targets.map(({ id, title }) => ({ value: id, label: title }));
  return known.some(({ value }) => value === present)
    ? known
    : [...known, { value: present, label: present }];
};
