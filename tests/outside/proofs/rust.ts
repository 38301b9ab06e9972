import { existsSync } from 'node:fs';
import { inFolder, run } from '../support/programs.ts';
import { exportCases, mustPrint } from './cases.ts';
import { each, type Proof } from './proof.ts';

/** Debian's compiler, which may stand behind a newer one in the search path: what it takes, newer ones take. */
export const rustc = existsSync('/usr/bin/rustc') ? '/usr/bin/rustc' : 'rustc';

/** rust: a library without std, every warning an error, and a program that prints what it holds. */
export async function proveRust(): Promise<Proof[]> {
  const settings: Record<string, string>[] = [
    {},
    { alignment: '32', storage: 'ram', numberBase: 'hexadecimal' },
  ];
  for (const extra of settings) {
    const cases = exportCases('rust', extra);
    const library = `#![no_std]\n${cases.map(({ name }) => `pub mod ${name};`).join('\n')}\n`;
    const main = `fn main() {
${cases
  .flatMap(({ name, expected }) =>
    expected.map(
      ({ port }) => `    print!("${name} ${port || '-'}");
    for k in 0..waves::${name}::LENGTH { print!(" {}", waves::${name}::word${port && `_${port}`}(k)); }
    println!();`,
    ),
  )
  .join('\n')}
}
`;
    const files = [
      ...cases.flatMap((one) => one.files),
      { name: 'waves.rs', text: library },
      { name: 'main.rs', text: main },
    ];
    await inFolder(files, async (folder) => {
      const strict = ['--edition', '2021', '-D', 'warnings', '-O'];
      await run(rustc, [...strict, '--crate-type', 'rlib', '--crate-name', 'waves', 'waves.rs'], folder);
      await run(rustc, [...strict, '--extern', 'waves=libwaves.rlib', 'main.rs', '-o', 'print'], folder);
      mustPrint(await run('./print', [], folder), cases);
    });
  }
  return each(exportCases('rust'), 'rustc', 'no_std library without a warning; prints every entry');
}
