import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { arrayNameFault, arrayNameFrom } from '../../shared/firmware/index.ts';
import { numbersInC, strictWarnings } from './support/compilers.ts';
import { inFolder, run } from './support/programs.ts';
import { exported, tone } from './support/tables.ts';

/** What people, careless or hostile, may call a wave: each tries to leave its comment, its line or its direction. */
const hostileNames = [
  '*/ int x;',
  '/* open',
  '*/*/ #error out',
  '/*/ /*/',
  'what??/',
  '??/??/??/??/',
  'what???/',
  'back\\',
  'back\\ ',
  '*\\/',
  '\\*\\/ int y;',
  'two\nlines',
  'two\r\n#error lines',
  'line\u2028\u2029#error separators',
  'bell\u0007null\u0000escape\u001b[31m',
  'next\u0085line',
  'right\u202eot tfel\u202c',
  'isolate\u2066\u2069\u200f',
  '*\u200b/ int z;',
  '*\u00ad/ int z;',
  '*\u{e0001}/ int z;',
  '{{ arrayName }} {% raw %}',
  '%:include <x>',
  '// slashes \\',
  '"quote" \'tick',
  'Nebelhorn «Tief» 霧笛 📯',
];

describe('names that people type', () => {
  it.each(hostileNames)('cannot leave the comment: %j', async (name) => {
    const { table, files } = exported(tone({ length: 16 }, name), 'c99');
    for (const dialect of [['-std=c99'], ['-std=c17', '-trigraphs', '-Wbidi-chars=any', '-Wnormalized']]) {
      const numbers = await numbersInC(files, 'fog_tone', [...dialect, ...strictWarnings]);
      expect(numbers).toEqual(Array.from(table.stored));
    }
  });

  it('never change how many lines a file has, nor what stands outside comments', () => {
    const plain = exported(tone({ length: 16 }, 'x'), 'c99').files;
    const text = fc.string({
      unit: fc.constantFrom('*', '/', '?', '\\', '\n', '\r', '\u2028', ' ', 'x', '\u202e'),
    });
    fc.assert(
      fc.property(
        text.filter((name) => name.length > 0 && name.length <= 64),
        (name) => {
          const { files } = exported(tone({ length: 16 }, name), 'c99');
          files.forEach((file, index) => {
            expect(linesBelowTitle(file.text)).toEqual(linesBelowTitle(plain[index].text));
            expect(file.text.split('\n')[1]).not.toMatch(/\*\/|\/\*|\?\?\/|\\|\r/);
          });
        },
      ),
      { seed: 20_480, numRuns: 300 },
    );
  });
});

/** The name stands on the second line; the digest, which covers it, is the one other thing that may differ. */
const linesBelowTitle = (text: string) =>
  text
    .replace(/sha256 \w+/, 'sha256')
    .split('\n')
    .slice(2);

describe('names of arrays', () => {
  it('that are taken in C, C++ or a library are refused; all others compile', async () => {
    // The names are those the machine's C library exports: far more than the standard has.
    const candidates = await inFolder([], async (folder) => {
      const listings = await Promise.all(
        ['libc.so.6', 'libm.so.6'].map(async (library) => {
          const path = (await run('gcc', [`-print-file-name=${library}`], folder)).trim();
          return run('nm', ['-D', '--defined-only', path], folder);
        }),
      );
      return [...new Set(listings.join('\n').match(/(?<= )[A-Za-z]\w*(?=@|$)/gm))];
    });
    expect(candidates.length).toBeGreaterThan(1000);
    const free = candidates.filter((name) => arrayNameFault(name) === undefined);
    expect(free.length).toBeGreaterThan(500);
    const source = `#include <stdint.h>\n${free
      .map((name) => `extern const uint8_t ${name}[2]; const uint8_t ${name}[2] = { 1, 2 };\n`)
      .join('')}`;
    await inFolder(
      [
        { name: 'names.c', text: source },
        { name: 'names.cpp', text: source },
      ],
      async (folder) => {
        for (const standard of ['-std=c99', '-std=c17', '-std=gnu17', '-std=gnu2x']) {
          await run('gcc', [standard, ...strictWarnings, '-c', 'names.c', '-o', 'names.o'], folder);
        }
        await run('g++', ['-std=c++20', ...strictWarnings, '-c', 'names.cpp', '-o', 'names.o'], folder);
        await run(
          'avr-gcc',
          ['-Os', '-Wall', '-Werror', '-mmcu=attiny4313', '-c', 'names.c', '-o', 'names.o'],
          folder,
        );
      },
    );
  });

  it('made from any name are free, ASCII and short enough', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', minLength: 1, maxLength: 64 }), (name) => {
        expect(arrayNameFault(arrayNameFrom(name))).toBeUndefined();
      }),
      { seed: 20_481, numRuns: 2000 },
    );
  });
});
