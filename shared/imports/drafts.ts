import { limits, Refusal, type DefinitionInput } from '../contract/index.ts';
import type { CsvOutcome } from './csv/read-csv.ts';
import { readAny } from './read-any.ts';
import { cutCycle } from './recording/cut-cycle.ts';
import { findPeriod } from './recording/find-period.ts';
import { proposeBounds } from './recording/propose-bounds.ts';
import { readWav } from './recording/read-wav.ts';
import { refuseFile } from './refuse.ts';
import { definitionOfTable } from './table/definitions.ts';
import { oldTableOf } from './table/old-table-report.ts';

/** What a file becomes when nobody is asked about it. */
export interface ImportDraft {
  readonly definition: DefinitionInput;
  /** The tone of a recording. */
  readonly toneHz: number | undefined;
  /** How it came about, in one line. */
  readonly words: string;
}

/** Of a cycle cut without a look at it: enough values for any usual table, a tenth of it faded over. */
const unasked = { length: 1_024, join: { kind: 'crossfade', share: 0.1 } } as const;

/**
 * Drafts of one file among many: the steadiest cycle of a recording, a column of numbers, each array of a source.
 *
 * @throws {Refusal} where the file cannot be read, or something would have to be asked
 */
export function draftsOf(bytes: Uint8Array, fileName: string): ImportDraft[] {
  const file = readAny(bytes, fileName);
  const name = nameOfFile(fileName);
  switch (file.kind) {
    case 'recording':
      return [draftOfRecording(bytes, name)];
    case 'columns':
      return [draftOfColumn(file.outcome, name)];
    case 'code': {
      const { arrays, refused } = file.code;
      const left = refused.length === 0 ? '' : `; ${refused.length} more cannot be taken`;
      return arrays.map((array) => {
        const title =
          arrays.length === 1 && array.name === '' ? name : `${array.name || `line ${array.line}`}`;
        const table = oldTableOf(array);
        const words = `array of ${table.codes.length} entries, ${table.bits} bits${left}`;
        return { definition: definitionOfTable(title, table), toneHz: undefined, words };
      });
    }
  }
}

function draftOfRecording(bytes: Uint8Array, name: string): ImportDraft {
  const { samples, sampleRateHz } = readWav(bytes);
  const { periodSamples, frequencyHz } = findPeriod(samples, sampleRateHz);
  const { source } = cutCycle(samples, proposeBounds(samples, periodSamples), unasked.length, unasked.join);
  return {
    definition: { schema: 1, name, source, level: { removeMean: true } },
    toneHz: frequencyHz,
    words: `one cycle of a recording, ${frequencyHz.toFixed(1)} Hz`,
  };
}

function draftOfColumn(outcome: CsvOutcome, name: string): ImportDraft {
  if (outcome.kind === 'ask') {
    const { question } = outcome;
    refuseFile(
      question.about === 'column'
        ? 'several columns of numbers'
        : `${question.cell}, which reads in two ways,`,
      'an answer: open this file alone',
    );
  }
  return {
    definition: definitionOfValues(name, outcome.values),
    toneHz: undefined,
    words: `column of ${outcome.values.length} numbers`,
  };
}

/**
 * Numbers as one cycle, entry by entry.
 *
 * @throws {Refusal} where there are more than a `samples` source holds
 */
export function definitionOfValues(name: string, values: readonly number[]): DefinitionInput {
  const { min, max } = limits.samples;
  if (values.length < min || values.length > max) {
    throw new Refusal({
      path: 'file',
      value: `${values.length} numbers`,
      allowed: `${min} to ${max} numbers`,
    });
  }
  return {
    schema: 1,
    name,
    source: { kind: 'samples', values: [...values], resampling: 'bandlimited' },
    table: { length: values.length },
  };
}

/** `fog horn.wav` → `fog horn`, as long as a name may be. */
export function nameOfFile(fileName: string): string {
  const base = fileName
    .replace(/^.*[/\\]/, '')
    .replace(/\.\w{1,5}$/, '')
    .replace(/\p{Cs}/gu, '')
    .trim();
  const cut = base
    .slice(0, limits.nameLength.max)
    .replace(/[\ud800-\udbff]$/, '')
    .trim();
  return cut === '' ? 'brought in' : cut;
}
