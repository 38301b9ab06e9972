export { FindSmallest } from './find-smallest.tsx';
