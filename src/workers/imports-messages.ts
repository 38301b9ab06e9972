import type { DefinitionInput, Problem } from '../../shared/contract/index.ts';
import type {
  AnyFile,
  BetterTable,
  CodeArray,
  CsvOutcome,
  CsvReading,
  CutCycle,
  CycleBounds,
  FoundPeriod,
  HexWords,
  ImportDraft,
  Join,
  OldTableReport,
  WavHeader,
} from '../../shared/imports/index.ts';

/** One channel of a recording as it was opened. */
export interface OpenedRecording {
  readonly header: WavHeader;
  readonly samples: Float64Array;
  /** Null where nothing repeats; `why` says so then. */
  readonly found: FoundPeriod | null;
  readonly why: string | null;
  readonly bounds: CycleBounds;
}

/** A table out of some code: the definition that gives it back, its figures, and a better one where there is one. */
export interface TableAnswer {
  readonly definition: DefinitionInput;
  readonly report: OldTableReport;
  readonly better: BetterTable | null;
}

/** Part of an image: from an address within its first stretch on, so many bytes. */
export interface ImagePart {
  readonly words: HexWords;
  readonly address: number;
  readonly bytes: number;
}

/** What the worker does, by name. The recording that was opened last is kept there. */
export interface ImportJobs {
  readAny: (input: { bytes: Uint8Array; name: string }) => AnyFile;
  readColumns: (input: { text: string; reading: CsvReading }) => CsvOutcome;
  readImage: (input: { text: string; part: ImagePart }) => CodeArray;
  readTable: (input: { array: CodeArray; name: string }) => TableAnswer;
  openRecording: (input: { bytes: Uint8Array; channel: number }) => OpenedRecording;
  findAgain: (input: { bounds: CycleBounds }) => { found: FoundPeriod; bounds: CycleBounds };
  snap: (input: { bounds: CycleBounds }) => CycleBounds;
  cut: (input: { bounds: CycleBounds; length: number; join: Join }) => CutCycle;
  drafts: (input: { bytes: Uint8Array; name: string }) => ImportDraft[];
}

export interface ImportRequest {
  readonly id: number;
  readonly name: keyof ImportJobs;
  readonly input: unknown;
}

export type ImportReply = { readonly id: number } & (
  | { readonly kind: 'done'; readonly result: unknown }
  | { readonly kind: 'refused'; readonly problems: readonly [Problem, ...Problem[]] }
  | { readonly kind: 'failed'; readonly message: string }
);
