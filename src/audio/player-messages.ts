import type { Pass, PinProgram, RoundGrid, Score } from '../../shared/listening/index.ts';

/** One round of a wave on a grid, free of folding in loops of up to a rate. */
export interface PitchGrid extends RoundGrid {
  /** Rounds a second, the highest for which it is meant. */
  readonly upToHz: number;
}

/** How rounds a second follow from what a score says. */
export type Pitch =
  | { readonly by: 'tone'; readonly loopHz: number; readonly cycles: number }
  /** `loopHz = W·hzPerStep`; of a voice with a drive of its own W is the scored one times `perScored`. */
  | {
      readonly by: 'stepWord';
      readonly stepWord: number;
      readonly highestWord: number;
      readonly perScored: number;
      readonly hzPerStep: number;
    };

/** How one voice is played; its gain and what follows the converter are in it already. */
export type VoiceProgram =
  /** Read from grids, one a pitch. */
  | { readonly kind: 'round'; readonly pitch: Pitch; readonly grids: readonly PitchGrid[] }
  /** Entry by entry, as firmware drives a pin. */
  | { readonly kind: 'pin'; readonly pitch: Pitch; readonly pin: PinProgram }
  /** Frames made beforehand. */
  | { readonly kind: 'pass'; readonly pass: Pass };

/** A voice, and how many cycles of the wave its round holds (K). */
export type VoicePart = VoiceProgram & { readonly cycles: number };

/** A sound made ready for the audio thread at one rate of the context. */
export interface SoundProgram {
  readonly voices: Readonly<Record<string, VoicePart>>;
  /** How long one pass lasts; absent where it goes round. */
  readonly passSeconds?: number;
}

/** What the audio thread is told. All of it takes effect with the next quantum. */
export type PlayerMessage =
  | {
      readonly kind: 'start';
      readonly program: SoundProgram;
      readonly hearing: string;
      readonly score: Score | null;
      /** Told again when one pass has ended. */
      readonly request: number;
    }
  | { readonly kind: 'change'; readonly program: SoundProgram }
  | { readonly kind: 'hear'; readonly hearing: string }
  | {
      readonly kind: 'perform';
      readonly score: Score | null;
      /** Grids of the pitches that are new. */
      readonly grids: Readonly<Record<string, readonly PitchGrid[]>>;
    }
  | { readonly kind: 'stop' };

/** What the audio thread tells: one pass is over. */
export interface PlayerReport {
  readonly kind: 'ended';
  readonly request: number;
}
