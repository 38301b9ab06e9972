import { strictWarnings } from '../support/compilers.ts';
import { inFolder, run } from '../support/programs.ts';
import { exportCases, mustPrint, type Exported } from './cases.ts';
import { each, type Proof } from './proof.ts';

/** All that the compilers warn of in conversions, too, as errors. */
export const everyWarning = [...strictWarnings, '-Wconversion', '-Wsign-conversion', '-Wshadow', '-Wundef'];
const cWarnings = [...everyWarning, '-Wstrict-prototypes', '-Wmissing-prototypes'];

const readers = ({ name, files, expected }: Exported) => {
  const hasReader = files.some(
    ({ text }) => text.includes(`${name}_word(`) || text.includes('_word(uint16_t'),
  );
  return expected.map(({ port }) => {
    const array = port === '' ? name : `${name}_${port}`;
    return { port: port || '-', read: hasReader ? `${array}_word((uint16_t)k)` : `${array}[k]` };
  });
};

/** A program in C, and in C++, that prints every entry of every case. */
export const printer = (cases: readonly Exported[]) => `
#include <stdio.h>
${cases.map(({ name }) => `#include "${name}.h"`).join('\n')}

int main(void)
{
    unsigned int k;
${cases
  .flatMap((each) =>
    readers(each).map(
      ({ port, read }) => `    printf("${each.name} ${port}");
    for (k = 0u; k < ${each.expected[0].words.length}u; ++k) { printf(" %ld", (long)${read}); }
    printf("\\n");`,
    ),
  )
  .join('\n')}
    return 0;
}
`;

const sourcesOf = (cases: readonly Exported[], ending: string) =>
  cases.flatMap(({ files }) => files.map(({ name }) => name)).filter((name) => name.endsWith(ending));

/** c99: two compilers, three dialects of C, and C++ through the same headers. */
export async function proveC99(): Promise<Proof[]> {
  const proofs: Proof[] = [];
  const settings: Record<string, string>[] = [
    {},
    { numberBase: 'hexadecimal', storage: 'ram', alignment: '64', lineEnding: 'crlf' },
  ];
  for (const extra of settings) {
    const cases = exportCases('c99', extra);
    const print = printer(cases);
    const files = [
      ...cases.flatMap(({ files: own }) => own),
      { name: 'print.c', text: print },
      { name: 'print.cpp', text: print },
    ];
    const sources = sourcesOf(cases, '.c');
    await inFolder(files, async (folder) => {
      for (const [compiler, standard] of [
        ['gcc', 'c99'],
        ['gcc', 'c17'],
        ['clang', 'c99'],
        ['clang', 'c11'],
      ]) {
        await run(compiler, [`-std=${standard}`, ...cWarnings, ...sources, 'print.c', '-o', 'print'], folder);
        mustPrint(await run('./print', [], folder), cases);
      }
      await run('gcc', ['-std=c99', '-c', ...sources], folder);
      const objects = sources.map((name) => name.replace(/c$/, 'o'));
      for (const [compiler, standard] of [
        ['g++', 'c++17'],
        ['clang++', 'c++20'],
      ]) {
        await run(
          compiler,
          [`-std=${standard}`, ...everyWarning, 'print.cpp', ...objects, '-o', 'print'],
          folder,
        );
        mustPrint(await run('./print', [], folder), cases);
      }
    });
    if (proofs.length === 0) {
      proofs.push(
        ...each(cases, 'gcc, clang', 'C99, C11, C17 without a warning; prints every entry'),
        ...each(cases, 'g++, clang++', 'C++17, C++20 through the same header'),
      );
    }
  }
  return proofs;
}

/** cpp17: two compilers, two dialects, entries checked while compiling as well as while running. */
export async function proveCpp17(): Promise<Proof[]> {
  const cases = exportCases('cpp17', { alignment: '32' });
  const print = `#include <cstdio>
${cases.map(({ name }) => `#include "${name}.hpp"`).join('\n')}
${cases
  .flatMap(({ name, expected }) =>
    expected.map(({ port, words }) => {
      const last = words.length - 1;
      return `static_assert(${name}::word${port && `_${port}`}(${last}U) == ${words[last]}, "last entry");`;
    }),
  )
  .join('\n')}
int main()
{
${cases
  .flatMap(({ name, expected }) =>
    expected.map(
      ({ port }) => `    std::printf("${name} ${port || '-'}");
    for (std::size_t k = 0U; k < ${name}::length; ++k) { std::printf(" %ld", static_cast<long>(${name}::word${port && `_${port}`}(k))); }
    std::printf("\\n");`,
    ),
  )
  .join('\n')}
    return 0;
}
`;
  const files = [...cases.flatMap(({ files: own }) => own), { name: 'print.cpp', text: print }];
  return inFolder(files, async (folder) => {
    for (const [compiler, standard] of [
      ['g++', 'c++17'],
      ['g++', 'c++20'],
      ['clang++', 'c++17'],
      ['clang++', 'c++20'],
    ]) {
      await run(compiler, [`-std=${standard}`, ...everyWarning, 'print.cpp', '-o', 'print'], folder);
      mustPrint(await run('./print', [], folder), cases);
    }
    return each(cases, 'g++, clang++', 'C++17, C++20 without a warning; entries at compile time and running');
  });
}

/** asm: this machine's assembler and two cross assemblers, whose bytes are compared; C reads it through the header. */
export async function proveAsm(): Promise<Proof[]> {
  const cases = exportCases('asm', { numberBase: 'hexadecimal' });
  const files = [...cases.flatMap(({ files: own }) => own), { name: 'print.c', text: printer(cases) }];
  const sources = sourcesOf(cases, '.s');
  return inFolder(files, async (folder) => {
    const objects: string[] = [];
    for (const source of sources) {
      const bytes: string[] = [];
      for (const tools of ['', 'arm-none-eabi-', 'riscv64-unknown-elf-']) {
        await run(`${tools}as`, ['--fatal-warnings', source, '-o', `${tools}${source}.o`], folder);
        await run(
          `${tools}objcopy`,
          ['-O', 'binary', '--only-section=.rodata.*', `${tools}${source}.o`, 'bytes.bin'],
          folder,
        );
        bytes.push(await run('od', ['-An', '-v', '-tx1', 'bytes.bin'], folder));
      }
      if (bytes[0].trim() === '' || new Set(bytes).size !== 1) throw new Error(`${source}: bytes differ.`);
      objects.push(`${source}.o`);
    }
    await run('gcc', ['-std=c99', ...cWarnings, 'print.c', ...objects, '-o', 'print'], folder);
    mustPrint(await run('./print', [], folder), cases);
    return each(
      cases,
      'GNU as for this machine, Arm and RISC-V; gcc',
      'same bytes by all three; prints every entry',
    );
  });
}
