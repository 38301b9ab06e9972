export { fade, fadeShapes, fadeWays, type Fade, type FadeOptions } from './fade.ts';
export { lightnessOf } from './lightness.ts';
export { pulseTrain, type PulseTrain, type PulseTrainOptions } from './pulse-train.ts';
