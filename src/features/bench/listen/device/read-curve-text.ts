import { Refusal, sayProblem } from '../../../../../shared/contract/index.ts';
import {
  readResponseCsv,
  type CsvReading,
  type ResponseOutcome,
} from '../../../../../shared/imports/index.ts';

/** What a text says, or what is wrong with it, by line and column. */
export function readCurveText(
  text: string,
  reading: CsvReading,
): ResponseOutcome | { readonly kind: 'faults'; readonly faults: readonly string[] } {
  try {
    return readResponseCsv(text, reading);
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    return {
      kind: 'faults',
      faults: error.problems.map((problem) => {
        const said = sayProblem(problem);
        return `${said[0].toUpperCase()}${said.slice(1)}.`;
      }),
    };
  }
}
