export { BringIn } from './bring-in.tsx';
