import { describe, expect, it, test } from 'vitest';
import { readTemplates } from '../../server/tables/read-templates.ts';
import { buildTable } from '../../shared/build-table.ts';
import { parseBoard, Refusal, type Board, type BoardInput } from '../../shared/contract/index.ts';
import {
  boardOptionsFor,
  boardShare,
  notTakenOf,
  renderFiles,
  targetOf,
  targets,
} from '../../shared/firmware/index.ts';
import { exampleBoard } from '../../src/boards/index.ts';
import { originFrom } from '../../src/features/bench/export/board-origins.tsx';
import { sayRoom } from '../../src/features/bench/export/flash-budget.ts';

describe('a board behind an export', () => {
  const board = exampleBoard(8);

  test('gives each target what it has options for', () => {
    expect(boardOptionsFor(targetOf('avr'), board)).toMatchObject({
      clockHz: String(board.clock.hz),
      portMap: expect.stringContaining('0'),
    });
    expect(boardOptionsFor(targetOf('csv'), board)).not.toHaveProperty('clockHz');
  });

  test('keeps a clock that is no whole number to itself, and says so', () => {
    const odd = { ...board, clock: { ...board.clock, hz: 32_768.5 } };
    expect(boardOptionsFor(targetOf('avr'), odd)).not.toHaveProperty('clockHz');
    expect(notTakenOf(targetOf('avr'), odd)).toEqual([
      'its clock of 32768.5 Hz, as this target counts in whole hertz',
    ]);
  });

  test('says whether the words fit, to the last byte', () => {
    const budget = { boardName: 'Test board', flashBytes: 1024 };
    expect(sayRoom(1024, budget)).toBe(
      '✓ Within the 1,024 bytes that Test board leaves for tables: 0 are left.',
    );
    expect(sayRoom(1025, budget)).toBe('✗ Over the 1,024 bytes that Test board leaves for tables, by 1.');
  });
});

const place = (text: string) => ({ port: text[0], pin: Number(text[1]) });

/** Eight bits over ports B and D, two pins reserved. */
const buoy = parseBoard({
  schema: 1,
  name: 'Buoy',
  clock: { hz: 16_000_000 },
  output: {
    kind: 'ladder',
    bits: 8,
    R: 10_000,
    portMap: {
      bits: ['B0', 'B1', 'B3', 'B4', 'D3', 'D2', 'D1', 'D0'].map(place),
      ports: [
        { name: 'B', reserved: [{ pin: 2, rest: 'high' }] },
        { name: 'D', reserved: [{ pin: 7 }] },
      ],
    },
  },
});
const lamp: Board = { ...buoy, name: 'Lamp', clock: { ...buoy.clock, hz: 8_000_000 } };

const pins = {
  portMap: 'B.0 B.1 B.3 B.4 D.3 D.2 D.1 D.0',
  reservedPins: 'B.2=high D.7=low',
  reservedBy: 'baked',
};

const table = buildTable({
  schema: 1,
  name: 'Self-test',
  source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
  table: { length: 64, bits: 8 },
});

/** The files as the bench makes them of a board and of what is set by hand. */
const filesWith = (target: string, board: Board, byHand: Record<string, string>) =>
  renderFiles(
    table,
    target,
    { ...boardShare(targetOf(target), board, byHand).taken, ...byHand },
    readTemplates(),
  );

describe('what comes from the board where nothing is set by hand', () => {
  const avr = targetOf('avr');

  it('is its clock and its pins', () => {
    expect(boardShare(avr, buoy, {})).toEqual({ taken: { clockHz: '16000000', ...pins }, byHand: [] });
    expect(boardShare(targetOf('wav'), buoy, {})).toEqual({ taken: {}, byHand: [] });
  });

  it('stands in the exported files: the map, the clock, and each word on the board’s pins', () => {
    const [header, source, main] = filesWith('avr', buoy, { playback: 'timer' });
    expect(header.text).toContain(
      ` *   Port map    ${pins.portMap}\n *   Reserved    ${pins.reservedPins}, baked`,
    );
    expect(main.text).toContain('16000000 Hz / 500 is the sample rate');
    const words = [...source.text.split('= {')[1].matchAll(/\d+/g)].map(Number);
    // Bits 0 to 3 on B.0, B.1, B.3, B.4 with B.2 high, bits 4 to 7 on D.3, D.2, D.1, D.0 in the upper byte.
    const shown = Array.from(table.codes, (code) => {
      const bit = (at: number) => (code >> at) & 1;
      const b = bit(0) + 2 * bit(1) + 4 + 8 * bit(2) + 16 * bit(3);
      const d = bit(7) + 2 * bit(6) + 4 * bit(5) + 8 * bit(4);
      return b + 256 * d;
    });
    expect(words.slice(0, 64)).toEqual(shown);
  });

  it('gives way to what is set by hand, option by option, whatever board is chosen', () => {
    const byHand = { clockHz: '1000000', reservedBy: 'kept' };
    for (const board of [buoy, lamp]) {
      const { taken, byHand: names } = boardShare(avr, board, byHand);
      expect(taken).toEqual({ portMap: pins.portMap, reservedPins: pins.reservedPins });
      expect(names).toEqual(['clockHz', 'reservedBy']);
      const [, , main] = filesWith('avr', board, { ...byHand, playback: 'timer' });
      expect(main.text).toContain('1000000 Hz / 500 is the sample rate');
    }
    expect(boardShare(avr, lamp, {}).taken.clockHz).toBe('8000000');
  });

  it.each<Record<string, string>>([{ portMap: '' }, { port: 'D' }, { highPort: 'B' }])(
    'leaves the whole map away where %o is set by hand',
    (byHand) => {
      const { taken, byHand: names } = boardShare(avr, buoy, byHand);
      expect(taken).toEqual({ clockHz: '16000000' });
      expect(names).toEqual(Object.keys(byHand));
      expect(filesWith('avr', buoy, byHand)[0].text).not.toContain('Port map');
    },
  );

  it('keeps its reserved pins under a map by hand, and refuses what they do not go with', () => {
    const moved = { portMap: pins.portMap.replace('B.4', 'B.5') };
    expect(boardShare(avr, buoy, moved).taken).toMatchObject({ reservedPins: pins.reservedPins });
    const taken = { portMap: pins.portMap.replace('B.4', 'B.2') };
    expect(() => filesWith('avr', buoy, taken)).toThrow(Refusal);
    expect(() => filesWith('avr', buoy, taken)).toThrow(/options\.reservedPins.*each pin once/);
  });

  it('is undefined by hand where it is the board’s again', () => {
    expect(boardShare(avr, buoy, { clockHz: undefined }).taken.clockHz).toBe('16000000');
  });
});

describe('beside a field', () => {
  const origin = (typed: Record<string, string>, name: string) =>
    originFrom({ target: targetOf('avr'), board: buoy, typed, onTake: () => undefined }, name);

  it('stands whose value it is', () => {
    expect(origin({}, 'clockHz')).toEqual({ says: 'From the board Buoy.' });
    expect(origin({}, 'playback')).toBeUndefined();
    expect(origin({}, 'port')).toBeUndefined();
    expect(origin({ clockHz: '1000' }, 'clockHz')?.says).toBe('Set by hand; the board Buoy has 16000000.');
    expect(origin({ clockHz: '16000000' }, 'clockHz')?.says).toBe('Set by hand, to what the board Buoy has.');
    expect(origin({ port: 'D' }, 'port')?.says).toBe(
      'Set by hand: the pins of the board Buoy are not taken.',
    );
    expect(origin({ port: 'D' }, 'port')).toHaveProperty('action');
  });
});

describe('what a target does not take of a board', () => {
  const withOutput = (output: BoardInput['output']): Board =>
    parseBoard({ schema: 1, name: 'Buoy', clock: { hz: 8_000_000 }, output });
  const onChip = withOutput({ kind: 'on-chip', bits: 10, registerBits: 16, alignment: 'left' });
  const rightAligned = withOutput({ kind: 'on-chip', bits: 12 });
  const serial = withOutput({ kind: 'serial', bits: 12, wordBits: 16 });
  const pwm = withOutput({ kind: 'pwm', bits: 8 });

  it.each([
    [
      'avr',
      onChip,
      'its converter on the chip, 10 bits in a register of 16, left-aligned; what plays writes the words to port pins',
    ],
    [
      'avr',
      serial,
      'its converter behind a serial line, 12 bits in words of 16; what plays writes the words to port pins',
    ],
    ['avr', pwm, 'its pulse-width modulation of 8 bits; what plays writes the words to port pins'],
    [
      'cortex-m',
      rightAligned,
      'its converter on the chip, 12 bits in a register of 16, right-aligned; what plays writes the words right-aligned to the address given as the output register, which may be that of its data register',
    ],
    [
      'riscv',
      onChip,
      'its converter on the chip, 10 bits in a register of 16, left-aligned; what plays writes the words right-aligned to the address given as the output register',
    ],
    [
      'c99',
      serial,
      'its converter behind a serial line, 12 bits in words of 16; the files hold words, and what sends them there is yours',
    ],
    ['wav', buoy, 'its pins, as this target has no port map'],
  ])('%s', (target, board, phrase) => {
    expect(notTakenOf(targetOf(target), board)).toEqual([phrase]);
  });

  it('is said by every target of every output that it does not serve', () => {
    for (const target of targets) {
      for (const board of [onChip, serial, pwm]) {
        expect(notTakenOf(target, board), target.id).toHaveLength(1);
        expect(boardShare(target, board, {}).taken, target.id).toEqual(
          'clockHz' in target.options.shape ? { clockHz: '8000000' } : {},
        );
      }
      expect(notTakenOf(target, buoy)).toHaveLength('portMap' in target.options.shape ? 0 : 1);
    }
  });
});
