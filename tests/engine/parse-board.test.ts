import { describe, expect, it } from 'vitest';
import {
  checkBoard,
  checkLadder,
  parseBoard,
  parseLadder,
  Refusal,
  sayProblem,
  type BoardInput,
} from '../../shared/contract/index.ts';
import { boardWith, straightMap } from './support/boards.ts';

const linesOf = (problems: readonly { path: string; value: string; allowed: string }[]) =>
  problems.map(sayProblem);

function ladderFaults(input: unknown): string[] {
  const checked = checkLadder(input);
  return 'problems' in checked ? linesOf(checked.problems) : [];
}
function boardFaults(input: unknown): string[] {
  const checked = checkBoard(input);
  return 'problems' in checked ? linesOf(checked.problems) : [];
}

describe('a ladder', () => {
  it('has its defaults filled in', () => {
    expect(parseLadder({ bits: 8, R: 1000 })).toEqual({
      bits: 8,
      R: 1000,
      rHigh: 0,
      rLow: 0,
      vHigh: 5,
      vLow: 0,
    });
  });

  const ohms = 'a number from 1e-9 to 1e12 Ω';
  it.each<[string, unknown, string[]]>([
    ['no object', 7, ['ladder: 7 is not allowed; allowed: an object']],
    ['no R', { bits: 8 }, [`R: nothing is not allowed; allowed: ${ohms}`]],
    ['R of 0', { bits: 8, R: 0 }, [`R: 0 is not allowed; allowed: ${ohms}`]],
    ['R below 0', { bits: 8, R: -1 }, [`R: -1 is not allowed; allowed: ${ohms}`]],
    ['R not a number', { bits: 8, R: NaN }, [`R: NaN is not allowed; allowed: ${ohms}`]],
    ['17 bits', { bits: 17, R: 1 }, ['bits: 17 is not allowed; allowed: a whole number from 1 to 16']],
    ['2.5 bits', { bits: 2.5, R: 1 }, ['bits: 2.5 is not allowed; allowed: a whole number from 1 to 16']],
    ['a rung of 0', { bits: 2, R: 1, rungs: [2, 0] }, [`rungs[1]: 0 is not allowed; allowed: ${ohms}`]],
    [
      'a series resistor of text',
      { bits: 2, R: 1, series: ['1k'] },
      [`series[0]: "1k" is not allowed; allowed: ${ohms}`],
    ],
    [
      'a terminator of 0',
      { bits: 2, R: 1, terminator: 0 },
      [`terminator: 0 is not allowed; allowed: ${ohms}`],
    ],
    ['a load of 0', { bits: 2, R: 1, load: 0 }, [`load: 0 is not allowed; allowed: ${ohms}`]],
    [
      'rHigh below 0',
      { bits: 2, R: 1, rHigh: -1 },
      ['rHigh: -1 is not allowed; allowed: a number from 0 to 1e12 Ω'],
    ],
    [
      'too few rungs',
      { bits: 4, R: 1, rungs: [2, 2, 2] },
      ['rungs: a list of 3 is not allowed; allowed: 4 resistances, one for each bit'],
    ],
    [
      'too many series resistors',
      { bits: 4, R: 1, series: [1, 1, 1, 1] },
      ['series: a list of 4 is not allowed; allowed: 3 resistances, one between each two nodes of 4 bits'],
    ],
    [
      'rails the wrong way round',
      { bits: 4, R: 1, vHigh: 0, vLow: 5 },
      ['vHigh: 0 is not allowed; allowed: at least 0.001 V above vLow, which is 5'],
    ],
    ['an unknown field', { bits: 4, R: 1, ohms: 3 }, ['ohms: 3 is not allowed; allowed: no such field']],
  ])('%s is refused by its place', (_what, input, wanted) => {
    expect(ladderFaults(input)).toEqual(wanted);
    expect(() => parseLadder(input)).toThrow(Refusal);
  });

  it('of one bit has no series resistor', () => {
    expect(ladderFaults({ bits: 1, R: 1, series: [], rungs: [2] })).toEqual([]);
  });

  it('with millions of wrong resistors is refused by their number', () => {
    const rungs = new Array<string>(2_000_000).fill('x');
    expect(ladderFaults({ bits: 4, R: 1, rungs })).toEqual([
      'rungs: a list of 2000000 is not allowed; allowed: a list of 1 to 16 resistances',
    ]);
  });
});

describe('a board', () => {
  it('has its defaults filled in', () => {
    expect(parseBoard(boardWith())).toEqual({
      schema: 1,
      name: 'Board',
      clock: { hz: 16e6, tolerancePpm: 0 },
      timer: { prescalers: [1], compareBits: 16 },
      supply: { vHigh: 5, vLow: 0 },
      currents: {},
      output: {
        kind: 'ladder',
        bits: 8,
        R: 10_000,
        rHigh: 0,
        rLow: 0,
        tolerancePercent: 1,
        distribution: 'uniform',
        portMap: {
          bits: Array.from({ length: 8 }, (_, pin) => ({ port: 'A', pin })),
          ports: [{ name: 'A', width: 8, reserved: [], reservedPins: 'baked' }],
        },
      },
      stage: { outputCapacitanceF: 0, filter: { kind: 'none' }, edgeSkewS: 0 },
    });
  });

  it('parsed again is the same', () => {
    const board = parseBoard(
      boardWith({ bits: 12 }, { levels: Array.from({ length: 4096 }, (_, c) => c / 1e3) }),
    );
    expect(parseBoard(JSON.parse(JSON.stringify(board)))).toEqual(board);
  });

  const two = straightMap(2);
  const portOf = (fields: object) => ({ bits: two.bits, ports: [{ name: 'A', ...fields }] });
  const serial = (fields: object): BoardInput =>
    boardWith({}, { output: { kind: 'serial', bits: 12, ...fields } as BoardInput['output'] });
  it.each<[string, unknown, string[]]>([
    [
      'no clock',
      boardWith({}, { clock: { hz: 0 } }),
      ['clock.hz: 0 is not allowed; allowed: a number from 0.001 to 1e12 Hz'],
    ],
    [
      'a tolerance of 100 %',
      boardWith({ tolerancePercent: 100 }),
      [
        'output.tolerancePercent: 100 is not allowed; allowed: a number of percent from 0 up to, not including, 100',
      ],
    ],
    [
      'a normal tolerance whose draws could pass 0 Ω',
      boardWith({ tolerancePercent: 45, distribution: 'normal' }),
      [
        'output.tolerancePercent: 45 is not allowed; allowed: at most 44 while output.distribution is "normal"',
      ],
    ],
    [
      'rungs of the wrong number',
      boardWith({ rungs: [1, 2] }),
      ['output.rungs: a list of 2 is not allowed; allowed: 8 resistances, one for each bit'],
    ],
    [
      'levels of the wrong number',
      boardWith({ bits: 2 }, { levels: [0, 1, 2] }),
      ['levels: a list of 3 is not allowed; allowed: 4 voltages, one for each code of 2 bits'],
    ],
    [
      'rails of no distance',
      boardWith({}, { supply: { vHigh: 1, vLow: 1 } }),
      ['supply.vHigh: 1 is not allowed; allowed: at least 0.001 V above vLow, which is 1'],
    ],
    [
      'a bit on a reserved pin',
      boardWith({ bits: 2, portMap: portOf({ reserved: [{ pin: 1 }] }) }),
      ['output.portMap.bits[1].pin: 1 is not allowed; allowed: a pin of port A that is not reserved'],
    ],
    [
      'a pin used twice',
      boardWith({
        bits: 2,
        portMap: { bits: [two.bits[0], two.bits[0]], ports: two.ports },
      }),
      ['output.portMap.bits[1].pin: 0 is not allowed; allowed: a pin that bit 0 does not use'],
    ],
    [
      'a bit left out',
      boardWith({ bits: 3, portMap: two }),
      ['output.portMap.bits: a list of 2 is not allowed; allowed: 3 places, one for each bit of the output'],
    ],
    [
      'a port that is not there',
      boardWith({ bits: 1, portMap: { bits: [{ port: 'C', pin: 0 }], ports: [{ name: 'A' }] } }),
      [
        'output.portMap.ports[0].name: "A" is not allowed; allowed: a port that carries a bit',
        'output.portMap.bits[0].port: "C" is not allowed; allowed: a port of the map: A',
      ],
    ],
    [
      'a pin beyond the port',
      boardWith({ bits: 2, portMap: portOf({ width: 1 }) }),
      ['output.portMap.bits[1].pin: 1 is not allowed; allowed: a pin of port A, 0 to 0'],
    ],
    [
      'a reserved pin beyond the port, and one named twice',
      boardWith({ bits: 2, portMap: portOf({ reserved: [{ pin: 9 }, { pin: 7 }, { pin: 7 }] }) }),
      [
        'output.portMap.ports[0].reserved[0].pin: 9 is not allowed; allowed: a pin of port A, 0 to 7',
        'output.portMap.ports[0].reserved[2].pin: 7 is not allowed; allowed: a pin that is not reserved already',
      ],
    ],
    [
      'two ports of one name',
      boardWith({ bits: 2, portMap: { bits: two.bits, ports: [{ name: 'A' }, { name: 'A' }] } }),
      ['output.portMap.ports[1].name: "A" is not allowed; allowed: a name that no port before it has'],
    ],
    [
      'a port name that no program can hold',
      boardWith({ bits: 2, portMap: portOf({ name: 'A*/' }) }),
      [
        'output.portMap.ports[0].name: "A*/" is not allowed; allowed: a letter, then up to 7 letters, digits or underscores',
      ],
    ],
    [
      'a register that is too small',
      boardWith({}, { output: { kind: 'on-chip', bits: 10, registerBits: 8 } }),
      ['output.bits: 10 is not allowed; allowed: at most output.registerBits, which is 8'],
    ],
    [
      'a shift out of the word',
      serial({ shift: 5 }),
      ['output.shift: 5 is not allowed; allowed: at most 4: 12 bits in a word of 16'],
    ],
    [
      'a mask that loses bits of the code',
      serial({ mask: 0x7ff }),
      ['output.mask: 2047 is not allowed; allowed: a mask that holds every bit of the code, 4095'],
    ],
    [
      'a command within the mask',
      serial({ command: 0x800 }),
      ['output.command: 2048 is not allowed; allowed: bits that the mask leaves free'],
    ],
    [
      'a command beyond the word',
      serial({ command: 0x1_0000 }),
      ['output.command: 65536 is not allowed; allowed: below 65536, as the word has 16 bits'],
    ],
    [
      'an unknown output',
      { ...boardWith(), output: { kind: 'valve' } },
      [
        'output.kind: "valve" is not allowed; allowed: an output of kind "ladder", "on-chip", "serial" or "pwm"',
      ],
    ],
    [
      'an unknown filter',
      boardWith({}, { stage: { filter: { kind: 'brick' } as never } }),
      ['stage.filter.kind: "brick" is not allowed; allowed: a filter of kind "none", "rc" or "butterworth"'],
    ],
    [
      'a cut-off of 0',
      boardWith({}, { stage: { filter: { kind: 'rc', cutoffHz: 0 } } }),
      ['stage.filter.cutoffHz: 0 is not allowed; allowed: a number from 0.001 to 1e12 Hz'],
    ],
  ])('with %s is refused by its place', (_what, input, wanted) => {
    expect(boardFaults(input)).toEqual(wanted);
    expect(() => parseBoard(input)).toThrow(Refusal);
  });

  it('takes a serial word with command, shift and mask', () => {
    expect(boardFaults(serial({ shift: 2, mask: 0x3ffc, command: 0xc000 }))).toEqual([]);
    expect(boardFaults(serial({ wordBits: 32, shift: 20, command: 3 }))).toEqual([]);
  });
});
