import { inFolder, run } from '../support/programs.ts';
import { everyWarning } from './c-programs.ts';
import { longCase, patternCases, randomCases } from './pattern-cases.ts';
import { everyEdge, mustPrintEdges, printing, programs, proofsOf } from './pattern-edges.ts';
import type { Proof } from './proof.ts';

const strictC = [...everyWarning, '-Wstrict-prototypes', '-Wmissing-prototypes'];
const randomCount = 5;

/** c99: two compilers in three dialects, and C++ through the header. */
export async function provePulsesInC99(): Promise<Proof[]> {
  const all = programs('c99', [...patternCases, longCase, ...randomCases(randomCount)]);
  const main = `#include <stdio.h>
${all.map(({ name }) => `#include "${name}_pulses.h"`).join('\n')}
${all.map((one) => printing(one, (value) => `printf(" %lu", (unsigned long)${value});`)).join('\n')}
int main(void)
{
${all.map(({ name }) => `    run_${name}();\n    printf("\\n");`).join('\n')}
    return 0;
}
`;
  const files = [
    ...all.flatMap((one) => one.files),
    { name: 'main.c', text: main },
    { name: 'main.cpp', text: main },
  ];
  const sources = all.map(({ name }) => `${name}_pulses.c`);
  return inFolder(files, async (folder) => {
    const proveBy = async (compiler: string, standard: string, given: readonly string[]) => {
      const program = `main-${compiler}-${standard}`;
      await run(compiler, [`-std=${standard}`, ...given, '-o', program], folder);
      mustPrintEdges(await run(`./${program}`, [], folder), all, `${compiler} ${standard}`);
    };
    await run('gcc', ['-std=c99', '-c', ...sources], folder);
    const objects = sources.map((name) => name.replace(/c$/, 'o'));
    const inC = [...strictC, ...sources, 'main.c'];
    const inCpp = [...everyWarning, 'main.cpp', ...objects];
    await Promise.all([
      proveBy('gcc', 'c99', inC),
      proveBy('gcc', 'c17', inC),
      proveBy('clang', 'c99', inC),
      proveBy('clang', 'c11', inC),
      proveBy('g++', 'c++17', inCpp),
      proveBy('clang++', 'c++17', inCpp),
    ]);
    return proofsOf(all, 'gcc, clang, g++, clang++; Python', everyEdge);
  });
}

/** cpp17: while running, and of the short ones the first edges while compiling. */
export async function provePulsesInCpp17(): Promise<Proof[]> {
  const all = programs('cpp17', [...patternCases, ...randomCases(randomCount)]);
  const main = `#include <cstdio>
${all.map(({ name }) => `#include "${name}_pulses.hpp"`).join('\n')}
template <typename Player>
static constexpr auto sounds_at(unsigned long at) -> bool
{
    Player player{};
    player.start();
    for (unsigned long k = 0U; k < at; ++k) { static_cast<void>(player.tick()); }
    return player.tick();
}
template <typename Player>
static void print_edges(unsigned long ticks)
{
    Player player{};
    unsigned int sum{0U};
    for (int k = 0; k < 9; ++k) { sum += player.tick() ? 1U : 0U; }
    std::printf(" %u", sum);
    for (int turn = 0; turn < 2; ++turn) {
        bool before{false};
        player.start();
        for (unsigned long k = 0U; k < ticks; ++k) {
            const bool now{player.tick()};
            if (now != before) { std::printf(" %lu", k); }
            before = now;
        }
    }
}
${all
  .flatMap(({ name, edges }) =>
    edges
      .slice(0, 6)
      .map(
        (edge, k) =>
          `static_assert(sounds_at<${name}::pulse_player>(${edge}UL) == ${String(k % 2 === 0)}, "edge");`,
      ),
  )
  .join('\n')}
int main()
{
${all
  .map(
    ({
      name,
      ticks,
    }) => `    std::printf("%lu %lu %d", static_cast<unsigned long>(${name}::pulses.size()), static_cast<unsigned long>(${name}::pulses_total_ms), ${name}::pulses_endless ? 1 : 0);
    for (const auto &one : ${name}::pulses) { std::printf(" %u %u %u", unsigned{one.on_ms}, unsigned{one.off_ms}, unsigned{one.repeats}); }
    print_edges<${name}::pulse_player>(${ticks}UL);
    std::printf("\\n");`,
  )
  .join('\n')}
    return 0;
}
`;
  const files = [...all.flatMap((one) => one.files), { name: 'main.cpp', text: main }];
  return inFolder(files, async (folder) => {
    for (const compiler of ['g++', 'clang++']) {
      await run(compiler, ['-std=c++17', ...everyWarning, 'main.cpp', '-o', 'main'], folder);
      mustPrintEdges(await run('./main', [], folder), all, compiler);
    }
    return proofsOf(all, 'g++, clang++; Python', `${everyEdge}; first edges at compile time`);
  });
}
