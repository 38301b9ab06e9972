export { RatesRecesses } from './rates-recesses.tsx';
