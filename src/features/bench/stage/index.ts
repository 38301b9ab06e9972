export { StageRecesses } from './stage-recesses.tsx';
