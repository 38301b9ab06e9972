import { beforeAll, describe, expect, it } from 'vitest';
import type { BuiltTable } from '../../shared/build-table.ts';
import { portWrites, type RegisterWrite } from './support/avr-simulator.ts';
import { avrPart, avrProgram, type AvrPart } from './support/compilers.ts';
import { inFolder, run } from './support/programs.ts';
import { exported, pair, tone } from './support/tables.ts';

// Compiler and addresses: avr-gcc and avr-libc. Judge of what runs: the instruction-level simulator avr8js.
// That a port's pins follow the words bit by bit is the definition of an export to a port; it needs no source.

const mcu = 'attiny4313';
let part: AvrPart;
beforeAll(async () => {
  part = await avrPart(mcu, ['B', 'D']);
});

const readerInCpp = `#include "fog_tone.h"
uint8_t entry(uint16_t i) { return pgm_read_byte(&fog_tone[i]); }
`;

const valuesAt = (writes: readonly RegisterWrite[], register: string) =>
  writes.filter((write) => write.register === register).map(({ value }) => value);

const twice = (words: readonly number[]) => [...words, ...words];

const pins = (table: BuiltTable, from: number, to: number) =>
  Array.from(table.stored, (word) => (word >> from) & (2 ** (to - from) - 1));

describe('avr export, run in the simulator', () => {
  const onOnePort = {
    '256 × 8': () => exported(tone({}), 'avr'),
    '100 × 8': () => exported(tone({ length: 100 }), 'avr'),
    '2 × 8': () => exported(pair, 'avr'),
    '1000 × 8': () => exported(tone({ length: 1000 }), 'avr'),
    '100 × 8 in two’s complement': () => exported(tone({ length: 100, coding: 'twos-complement' }), 'avr'),
    '100 × 6 in two’s complement': () =>
      exported(tone({ length: 100, bits: 6, coding: 'twos-complement' }), 'avr'),
    '64 × 1': () => exported(tone({ length: 64, bits: 1 }), 'avr'),
  };

  it.each(Object.entries(onOnePort))(
    'writes %s to the port in order, twice round',
    async (_title, render) => {
      const { table, files } = render();
      const bits = table.definition.table.bits;
      const writes = portWrites(await avrProgram(files, mcu), part, 2 * table.stored.length);
      expect(writes[0]).toMatchObject({ register: 'DDRB', value: 2 ** bits - 1 });
      expect(valuesAt(writes, 'PORTB')).toEqual(twice(pins(table, 0, bits)));
      expect(writes).toHaveLength(1 + 2 * table.stored.length);
    },
  );

  it('writes to the port that was chosen, and to no other', async () => {
    const { table, files } = exported(tone({ length: 100, bits: 7 }), 'avr', { port: 'D' });
    const writes = portWrites(await avrProgram(files, mcu), part, 2 * table.stored.length);
    expect(writes[0]).toMatchObject({ register: 'DDRD', value: 0x7f });
    expect(valuesAt(writes, 'PORTD')).toEqual(twice(Array.from(table.codes)));
    expect(valuesAt(writes, 'PORTB')).toEqual([]);
  });

  const onTwoPorts = {
    '256 × 12': tone({ bits: 12 }),
    '100 × 9': tone({ length: 100, bits: 9 }),
    '100 × 12 in two’s complement': tone({ length: 100, bits: 12, coding: 'twos-complement' }),
    '1000 × 16': tone({ length: 1000, bits: 16 }),
  };

  it.each(Object.entries(onTwoPorts))(
    'writes %s to two ports, the upper bits first',
    async (_title, definition) => {
      const { table, files } = exported(definition, 'avr', { port: 'B', highPort: 'D' });
      const bits = table.definition.table.bits;
      const writes = portWrites(await avrProgram(files, mcu), part, 4 * table.stored.length);
      expect(writes.slice(0, 3).map(({ register }) => register)).toEqual(['DDRD', 'DDRB', 'PORTD']);
      expect(writes[0].value).toBe(2 ** (bits - 8) - 1);
      expect(valuesAt(writes, 'PORTB')).toEqual(twice(pins(table, 0, 8)));
      expect(valuesAt(writes, 'PORTD')).toEqual(twice(pins(table, 8, bits)));
    },
  );

  // Lengths around every seam of the counters: 8-bit ones, nested, and what is left over.
  it('takes as long for each step, the one round the seam as well, whatever the length', async () => {
    for (const length of [3, 8, 258, 259, 261, 515, 516, 1031]) {
      for (const unroll of ['none', 'two']) {
        const { table, files } = exported(tone({ length }), 'avr', { unroll });
        const writes = portWrites(await avrProgram(files, mcu), part, 3 * length);
        expect(valuesAt(writes, 'PORTB')).toEqual([...twice(pins(table, 0, 8)), ...pins(table, 0, 8)]);
        const cycles = writes.filter(({ register }) => register === 'PORTB').map(({ cycle }) => cycle);
        const steps = new Set(cycles.slice(1).map((cycle, index) => cycle - cycles[index]));
        expect([...steps], `${length}, ${unroll}`).toEqual([length < 8 ? 8 : unroll === 'two' ? 6 : 7]);
      }
    }
  });

  it('compiles as C99 with every warning an error', async () => {
    const { files } = exported(tone({ bits: 10, coding: 'twos-complement' }), 'avr');
    await avrProgram(files, mcu, [
      '-std=c99',
      '-Os',
      '-Wall',
      '-Wextra',
      '-Wpedantic',
      '-Wconversion',
      '-Werror',
    ]);
  });

  it('is read from C++ through the same header', async () => {
    const { files } = exported(tone({}), 'avr');
    const reader = { name: 'reader.cpp', text: readerInCpp };
    await inFolder([...files, reader], (folder) =>
      run(
        'avr-g++',
        ['-std=c++11', '-Os', '-Wall', '-Wextra', '-Werror', `-mmcu=${mcu}`, '-c', 'reader.cpp'],
        folder,
      ),
    );
  });

  it('says so where the part lacks the port', async () => {
    const { files } = exported(tone({}), 'avr', { port: 'G' });
    await expect(avrProgram(files, mcu)).rejects.toThrow(
      'This part has no port G: render for one that it has.',
    );
  });
});
