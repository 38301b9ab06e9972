// What the benchmark of listening bundles, as the product ships it.
export {
  PinPlayer,
  predictedLines,
  programOf,
  rmsOfVoice,
  RoundReader,
  stepKernel,
} from '../../shared/listening/index.ts';
