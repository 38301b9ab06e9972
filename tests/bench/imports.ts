import type * as imports from '../../shared/imports/index.ts';
import { bundleModule } from './bundle-module.ts';
import { judge, median } from './judge.ts';
import { randomFrom } from './random.ts';

type Imports = typeof imports;

const turns = 9;
/** Turns that only warm the code up. */
const coldTurns = 2;

/** Parsers and the search for a period, on inputs of a size that people bring; bundled as they are shipped. */
export async function measureImports(): Promise<boolean> {
  const bundle = await bundleModule(new URL('../../shared/imports/index.ts', import.meta.url), 'imports');
  const { findPeriod, readCode, readCsv } = (await import(bundle)) as Imports;

  const random = randomFrom('imports');
  const sampleRateHz = 48_000;
  const recording = Float64Array.from({ length: 10 * sampleRateHz }, (_, i) => {
    const angle = (2 * Math.PI * 220.3 * i) / sampleRateHz;
    return Math.sin(angle) + 0.5 * Math.sin(2 * angle) + 0.3 * Math.sin(3 * angle) + 0.1 * (random() - 0.5);
  });
  const bytes = () => Math.floor(random() * 256);
  const source = repeated(
    (k) =>
      `/* table ${k} */\nconst uint8_t table_${k}[] = {\n${rows(() => `0x${bytes().toString(16)}`)}\n};\n`,
  );
  const oneLine = `const uint8_t t[] = {${repeated(() => `${bytes()},`)}};`;
  const assembly = repeated((k) => `table_${k}:\n${rows(bytes, '        .byte ')}\n`);
  const columns = repeated((k) => `${k};${(random() * 2 - 1).toFixed(6)}\n`);

  return [
    judgeWork('period of 10 s at 48 kHz', () => findPeriod(recording, sampleRateHz)),
    judgeWork('1 MB of C source, many arrays', () => readCode(source)),
    judgeWork('1 MB of C source, one line', () => readCode(oneLine)),
    judgeWork('1 MB of assembly source', () => readCode(assembly)),
    judgeWork('1 MB of columns', () => readCsv(columns, { delimiter: ';', column: 1 })),
  ].every(Boolean);
}

function judgeWork(what: string, work: () => unknown): boolean {
  const times = Array.from({ length: turns }, () => {
    const start = performance.now();
    work();
    return performance.now() - start;
  });
  return judge(what, median(times.slice(coldTurns)), 200, ' ms');
}

/** A megabyte of it. */
function repeated(piece: (k: number) => string): string {
  const pieces: string[] = [];
  for (let size = 0, k = 0; size < 1_000_000; k += 1) {
    const next = piece(k);
    pieces.push(next);
    size += next.length;
  }
  return pieces.join('');
}

/** Sixteen rows of sixteen numbers. */
const rows = (number: () => number | string, lead = '  ') =>
  Array.from({ length: 16 }, () => lead + Array.from({ length: 16 }, number).join(', ')).join(
    lead === '  ' ? ',\n' : '\n',
  );
