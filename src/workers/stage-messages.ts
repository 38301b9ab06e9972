import type { Board, Definition, Ladder, ResistorBag, TrialSettings } from '../../shared/contract/index.ts';
import type {
  Assignment,
  BitsThatMatter,
  FittedTable,
  Histogram,
  Linearity,
  LadderReport,
  OpAmpAnswer,
  PlayedTable,
  SmallestR,
  StageWaveform,
  ToleranceForYield,
  TrialSummary,
} from '../../shared/output-stage/index.ts';

/** A table as it is played. */
export interface Played {
  readonly table: Definition['table'];
  readonly codes: Uint16Array;
  readonly cycle: Float64Array;
  readonly sampleRateHz: number;
  readonly toneHz: number;
}

/** What the worker of the output stage is asked. */
export type StageJob =
  | { readonly kind: 'levels'; readonly board: Board }
  | { readonly kind: 'playing'; readonly board: Board; readonly played: Played }
  | {
      readonly kind: 'trials';
      readonly ladder: Ladder;
      readonly settings: TrialSettings;
      readonly table: PlayedTable | null;
    }
  | {
      readonly kind: 'tolerance';
      readonly ladder: Ladder;
      readonly share: number;
      readonly settings: Pick<TrialSettings, 'distribution' | 'seed' | 'trials'>;
    }
  | {
      readonly kind: 'bits';
      readonly definition: Definition;
      readonly ladder: Ladder;
      readonly settings: TrialSettings;
      readonly filter: Board['stage']['filter'];
      readonly sampleRateHz: number;
    }
  | { readonly kind: 'fit'; readonly definition: Definition; readonly volts: readonly number[] }
  | { readonly kind: 'places'; readonly bag: ResistorBag };

/** What a board does by itself, whatever plays. */
export interface LevelsAnswer {
  readonly volts: Float64Array;
  /** `Vlow + span·code/2^b`. */
  readonly ideal: Float64Array;
  readonly linearity: Linearity;
  readonly mostOutputOhms: number;
  readonly ladder: LadderReport | null;
  /** With the output free and shorted to the low rail; null where the output is no ladder. */
  readonly smallest: { readonly free: SmallestR; readonly shorted: SmallestR } | null;
}

/** Lines of the output, the strongest ones, in rising order of frequency. */
export interface StageLines {
  readonly multiples: Int32Array;
  readonly frequenciesHz: Float64Array;
  /** Against a sine from rail to rail, in dB: as held at the pin, and behind the stage. */
  readonly heldDb: Float64Array;
  readonly outputDb: Float64Array;
}

/** What a board makes of a table. */
export interface PlayingAnswer {
  readonly waveform: StageWaveform;
  readonly pointsPerHold: number;
  readonly sampleRateHz: number;
  readonly tableLength: number;
  readonly lines: StageLines;
  /** Through the board’s levels, and by even ones. */
  readonly sinadDb: number | null;
  readonly snrDb: number | null;
  readonly codesSinadDb: number | null;
  readonly codesSnrDb: number | null;
  readonly meanSupplyAmps: number | null;
  /** Of the first image of the tone; null where the tone is not below half the sample rate. */
  readonly image: { readonly frequencyHz: number; readonly outputDb: number } | null;
  readonly opAmp: OpAmpAnswer | null;
  readonly glitch: {
    readonly from: number;
    readonly to: number;
    readonly through: number;
    readonly areaVs: number;
  } | null;
  readonly pwm: { readonly carrierHz: number; readonly rippleVolts: number } | null;
}

export interface TrialsAnswer {
  readonly summary: TrialSummary;
  readonly isDone: boolean;
  readonly maxDnl: Histogram;
  readonly maxInl: Histogram;
  readonly sinadDb: Histogram | null;
}

export type StageMessage =
  | ({ readonly kind: 'levels' } & LevelsAnswer)
  | ({ readonly kind: 'playing' } & PlayingAnswer)
  | ({ readonly kind: 'trials' } & TrialsAnswer)
  | ({ readonly kind: 'tolerance' } & ToleranceForYield)
  | ({ readonly kind: 'bits' } & BitsThatMatter)
  | ({ readonly kind: 'fit' } & FittedTable)
  | ({ readonly kind: 'places' } & Assignment)
  | { readonly kind: 'failed'; readonly message: string };
