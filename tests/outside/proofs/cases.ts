import type { BuiltTable } from '../../../shared/build-table.ts';
import type { DefinitionInput, GeneratedFile } from '../../../shared/contract/index.ts';
import { targets } from '../../../shared/firmware/index.ts';
import { exported, sine, tone } from '../support/tables.ts';

/** What every target is proven on. */
export interface Case {
  readonly title: string;
  readonly definition: DefinitionInput;
  readonly options: Readonly<Record<string, string>>;
  /** The places that the map's bits have, bit 0 first; absent without a map. */
  readonly places?: readonly string[];
  /** Whether only a reader of the target's own gives every entry. */
  readonly needsReader?: boolean;
}

const portMap = 'B.0 B.1 B.3 B.4 B.5 B.6 D.3 D.2 D.1 D.0';

export const tableCases = {
  plain: { title: '256 × 8', definition: tone({}), options: {} },
  signed: {
    title: '100 × 12 in two’s complement',
    definition: tone({ length: 100, bits: 12, coding: 'twos-complement' }),
    options: {},
  },
  long: { title: '1024 × 16', definition: tone({ length: 1024, bits: 16 }), options: {} },
  fold: {
    title: 'first quarter of 256 × 8',
    definition: sine({ sampleAt: 'centre', fold: 'quarter' }),
    options: {},
  },
  packed12: {
    title: '101 × 12 in two’s complement, packed',
    definition: tone({ length: 101, bits: 12, coding: 'twos-complement' }),
    options: { packed: 'yes' },
  },
  packed4: {
    title: 'first quarter of 64 × 4 in two’s complement, packed',
    definition: sine({
      length: 64,
      bits: 4,
      sampleAt: 'centre',
      fold: 'quarter',
      coding: 'twos-complement',
    }),
    options: { packed: 'yes' },
  },
  mapped: {
    title: '64 × 10 over two ports, two pins reserved',
    definition: tone({ length: 64, bits: 10 }),
    options: { portMap, reservedPins: 'B.2=high D.7=low' },
    places: portMap.split(' '),
  },
  mappedFold: {
    title: 'first quarter of 64 × 10 over two ports, two pins reserved',
    definition: sine({ length: 64, bits: 10, sampleAt: 'centre', fold: 'quarter' }),
    options: { portMap, reservedPins: 'B.2=high D.7=low' },
    places: portMap.split(' '),
    needsReader: true,
  },
} satisfies Record<string, Case>;

/** Targets that are data alone: what a reader does of a wave is left to whoever reads them. */
const dataTargets = new Set(['verilog-memh', 'intel-hex', 'binary', 'csv', 'json']);

export type CaseId = keyof typeof tableCases;
export const caseIds = Object.keys(tableCases) as CaseId[];

/** One case as a target has it, with an array's name of its own, so that all cases go into one program. */
export interface Exported {
  readonly id: CaseId;
  readonly title: string;
  readonly name: string;
  readonly table: BuiltTable;
  readonly files: readonly GeneratedFile[];
  /** What has to come out for each entry of the wave: of the one array, or of each port. */
  readonly expected: readonly { readonly port: string; readonly words: readonly number[] }[];
}

/** Exports the cases that a target has the options for. */
export function exportCases(target: string, extra: Readonly<Record<string, string>> = {}): Exported[] {
  const { shape } = targets.find(({ id }) => id === target)?.options ?? { shape: {} };
  return caseIds
    .filter((id) => {
      const { options, needsReader = false }: Case = tableCases[id];
      const isTaken = Object.keys(options).every((option) => option in shape);
      return isTaken && !(needsReader && dataTargets.has(target));
    })
    .map((id) => {
      const { title, definition, options, ...rest }: Case = tableCases[id];
      const name = `wave_${id.toLowerCase()}`;
      const { table, files } = exported(definition, target, { arrayName: name, ...options, ...extra });
      return { id, title, name, table, files, expected: expectedOf(table, rest.places) };
    });
}

/** Words of every entry, from the codes: by the definition of the stored word (engine specification §3.6), not by ours. */
export function expectedOf(
  { codes, definition: { table } }: BuiltTable,
  places?: readonly string[],
): Exported['expected'] {
  const top = 2 ** table.bits - 1;
  const words = Array.from(codes, (code) => {
    const shown = table.complement ? top - code : code;
    return table.coding === 'twos-complement' ? shown - (top + 1) / 2 : shown;
  });
  if (places === undefined) return [{ port: '', words }];
  // The one reserved pin that rests high is B.2.
  const rest = (port: string) => (port === 'B' ? 2 ** 2 : 0);
  return portsOf(places).map((port) => ({
    port: port.toLowerCase(),
    words: words.map((word) => shownOn(port, places, word) + rest(port)),
  }));
}

/** Names of the ports that places are on, in order. */
export const portsOf = (places: readonly string[]) =>
  [...new Set(places.map((place) => place.split('.')[0]))].sort();

/** What the pins of one port show of a word whose bits have these places, bit 0 first; every other pin is 0. */
export function shownOn(port: string, places: readonly string[], word: number): number {
  const pattern = word < 0 ? word + 2 ** places.length : word;
  return places.reduce((sum, place, bit) => {
    const [name, pin] = place.split('.');
    return name === port && Math.floor(pattern / 2 ** bit) % 2 === 1 ? sum + 2 ** Number(pin) : sum;
  }, 0);
}

/** What a program printed: a line `NAME PORT WORD WORD …` for each array. @throws where a word differs */
export function mustPrint(text: string, cases: readonly Exported[]): void {
  const lines = new Map(
    text
      .trim()
      .split('\n')
      .map((line) => {
        const [name, port, ...words] = line.trim().split(' ');
        return [`${name} ${port}`, words.map(Number)] as const;
      }),
  );
  for (const { name, title, expected } of cases) {
    for (const { port, words } of expected) mustEqual(lines.get(`${name} ${port || '-'}`), words, title);
  }
}

export function mustEqual(
  found: readonly number[] | undefined,
  wanted: readonly number[],
  what: string,
): void {
  const at = wanted.findIndex((word, k) => found?.[k] !== word);
  if (found !== undefined && at < 0 && found.length === wanted.length) return;
  const where =
    at < 0 ? `${found?.length} words for ${wanted.length}` : `entry ${at}: ${found?.[at]} for ${wanted[at]}`;
  throw new Error(`${what}: ${where}.`);
}
