import { icons } from '../../../components/index.ts';

/** The chevron, turned to point back and on. */
export const turnIcons = {
  back: () => <icons.chevron style={{ rotate: '90deg' }} />,
  on: () => <icons.chevron style={{ rotate: '-90deg' }} />,
};
