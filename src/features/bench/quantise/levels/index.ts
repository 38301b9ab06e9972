export { LevelsFields } from './levels-fields.tsx';
