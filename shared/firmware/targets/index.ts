import type { Target } from '../target.ts';
import { avr } from './avr.ts';
import { c99 } from './c99.ts';

/** Every export there is, in the order of lists. A new one: its descriptor here, its folder under `templates/`. */
export const targets: readonly Target[] = [c99, avr];
