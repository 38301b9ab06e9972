import type { GeneratedFile } from '../../../shared/contract/index.ts';
import { mustEqual } from './cases.ts';
import { edgesInPython, exportedWith, type PatternCase } from './pattern-cases.ts';
import type { Proof } from './proof.ts';

// What programs print of a pattern's reader, millisecond by millisecond, held against a Python program.

export interface Program extends PatternCase {
  readonly name: string;
  readonly files: readonly GeneratedFile[];
  /** Milliseconds at which the answer changes. */
  readonly edges: readonly number[];
}

export function programs(target: string, cases: readonly PatternCase[]): Program[] {
  const edges = edgesInPython(cases);
  return cases.map((one, k) => {
    const name = `signal_${k}`;
    return { ...one, name, files: exportedWith(one.pattern, target, name), edges: edges[k] };
  });
}

/** What a program prints of one pattern: its macros, its steps, answers before the start, then edges, twice. */
export const wantedLine = ({ pattern: { steps, endless }, edges }: Program) => [
  steps.length,
  steps.reduce((sum, { onMs, offMs, repeats }) => sum + (onMs + offMs) * repeats, 0),
  Number(endless),
  ...steps.flatMap(({ onMs, offMs, repeats }) => [onMs, offMs, repeats]),
  0,
  ...edges,
  ...edges,
];

/** C for one pattern: `text` prints a number behind a space. Started anew half-way, it plays from the beginning. */
export const printing = ({ name, ticks }: Program, number: (value: string) => string) => {
  const macro = name.toUpperCase();
  return `static void run_${name}(void)
{
    unsigned long k;
    unsigned int turn;
    unsigned int sum = 0u;
    unsigned int before;
    ${number(`${macro}_PULSES_COUNT`)}
    ${number(`${macro}_PULSES_TOTAL_MS`)}
    ${number(`${macro}_PULSES_ENDLESS`)}
    for (k = 0u; k < ${macro}_PULSES_COUNT; ++k) {
        ${number(`${name}_pulses[k].on_ms`)}
        ${number(`${name}_pulses[k].off_ms`)}
        ${number(`${name}_pulses[k].repeats`)}
    }
    for (k = 0u; k < 9u; ++k) { sum += ${name}_pulses_tick(); }
    ${number('sum')}
    for (turn = 0u; turn < 2u; ++turn) {
        ${name}_pulses_start();
        for (k = 0u; k < ${Math.ceil(ticks / 2)}u; ++k) { (void)${name}_pulses_tick(); }
        ${name}_pulses_start();
        before = 0u;
        for (k = 0u; k < ${ticks}u; ++k) {
            const unsigned int now = ${name}_pulses_tick();
            if (now != before) { ${number('k')} }
            before = now;
        }
    }
}
`;
};

export function mustPrintEdges(text: string, all: readonly Program[], tool: string): void {
  const lines = text.trim().split('\n');
  all.forEach((program, k) =>
    mustEqual(
      lines[k]?.trim().split(/\s+/).map(Number),
      wantedLine(program),
      `${tool}, pulses, ${program.title}`,
    ),
  );
}

export const proofsOf = (all: readonly PatternCase[], tool: string, proven: string): Proof[] => {
  const random = all.filter(({ title }) => title.startsWith('random'));
  const named = all.filter((one) => !random.includes(one)).map(({ title }) => title);
  return [...named, ...(random.length > 0 ? [`${random.length} random patterns`] : [])].map((title) => ({
    case: `pulses, ${title}`,
    tool,
    proven,
  }));
};

export const everyEdge = 'every edge by the millisecond, again after a new start';
