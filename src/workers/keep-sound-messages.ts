import type { RenderOrder } from '../../shared/listening/render-sound.ts';
import type { WavDepth } from '../../shared/listening/wav-scale.ts';

/** A sound to be kept as a file. */
export interface KeepJob {
  readonly order: RenderOrder;
  readonly depth: WavDepth;
  /** The file's full scale is the table's, or the strongest frame is put at `keptPeakDbfs`. */
  readonly level: 'full-scale' | 'peak';
  readonly ditherSeed: number | null;
}

/** Where the peak comes to lie if the file goes by it. */
export const keptPeakDbfs = -1;

export type KeepMessage =
  /** Share that is done, 0…1. */
  | { readonly kind: 'progress'; readonly share: number }
  | {
      readonly kind: 'done';
      readonly file: Uint8Array<ArrayBuffer>;
      /** In the file, as other programs read it. */
      readonly peakDbfs: number;
      readonly rmsDbfs: number;
      /** Of the table. */
      readonly fullScaleDbfs: number;
    }
  /** Whole numbers cannot hold it: nothing was written. */
  | { readonly kind: 'clips'; readonly peakDbfs: number }
  | { readonly kind: 'failed'; readonly message: string };
