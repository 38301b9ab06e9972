import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { checkBoard, outputLimits, parseBoard } from '../../shared/contract/index.ts';
import { boardVolts } from '../../shared/output-stage/index.ts';
import { boardLines, exampleBoard, readList } from '../../src/boards/index.ts';
import { readBoardAt } from '../../src/features/bench/stage/chosen-board.ts';
import { fitWishes } from '../../src/features/bench/stage/fit-wishes.ts';
import { measuredVolts } from '../../src/features/bench/stage/measured-volts.ts';
import { draftOf, freshOutput, withBits, withKind } from '../../src/features/boards/draft.ts';
import { readReserved } from '../../src/features/boards/read-reserved.ts';

const bits = fc.integer(outputLimits.bits);
const kinds = ['ladder', 'on-chip', 'serial', 'pwm'] as const;

describe('the board that is being described', () => {
  it('begins allowed, whatever its converter and its bits', () => {
    fc.assert(
      fc.property(fc.constantFrom(...kinds), bits, (kind, count) => {
        const board = { ...exampleBoard(count), output: freshOutput(kind, count) };
        expect(checkBoard(board)).toHaveProperty('board');
      }),
    );
  });

  it('keeps the places of its bits and finds free pins for more, a new port where none is free', () => {
    fc.assert(
      fc.property(bits, bits, (before, after) => {
        const { output } = exampleBoard(before);
        if (output.kind !== 'ladder') throw new Error('The example is a ladder.');
        const { portMap } = output;
        const ports = portMap.ports.map((port, index) =>
          index === 0 && before < 8 ? { ...port, reserved: [{ pin: 7, rest: 'high' as const }] } : port,
        );
        const next = withBits({ ...portMap, ports }, after);
        expect(next.bits).toHaveLength(after);
        expect(next.bits.slice(0, before)).toEqual(portMap.bits.slice(0, after));
        const board = {
          ...exampleBoard(after),
          output: {
            ...output,
            bits: after,
            portMap: next,
          },
        };
        expect(checkBoard(board)).toHaveProperty('board');
      }),
    );
  });

  it('has what was typed for a kind of output again when that is chosen again', () => {
    const draft = draftOf(exampleBoard(), null);
    const back = withKind(withKind(draft, 'pwm'), 'ladder');
    expect(back.board).toEqual(draft.board);
  });

  it('reads reserved pins with their levels, and says which one is wrong', () => {
    expect(readReserved('6 high, 7; 5 LOW')).toEqual([
      { pin: 6, rest: 'high' },
      { pin: 7, rest: 'low' },
      { pin: 5, rest: 'low' },
    ]);
    expect(readReserved('')).toEqual([]);
    expect(readReserved('6 high, 40')).toContain('“40”');
    expect(readReserved('6 up')).toContain('“6 up”');
  });

  it('says a difference in each field in words', () => {
    const [one, other] = [exampleBoard(), parseBoard({ ...exampleBoard(), supply: { vHigh: 3.3 } })];
    const says = (board: typeof one) => new Map(boardLines(board).map(({ name, says }) => [name, says]));
    const differing = [...says(one)].filter(([name, text]) => says(other).get(name) !== text);
    expect(differing.map(([name]) => name)).toEqual(['Supply']);
  });
});

describe('measured values', () => {
  const own = fitWishes.now();

  it('are read as people write them, and the place of what is wrong is named', () => {
    expect(readList('4k7 9.98k; 10.02 kΩ\n4700', 'Ω')).toEqual({ numbers: [4700, 9980, 10_020, 4700] });
    expect(readList(' ', 'Ω')).toEqual({ numbers: undefined });
    expect(readList('4k7 4,7k', 'Ω')).toMatchObject({ fault: expect.stringContaining('Number 2, “4,7k”') });
    expect(readList('4k7 x', 'Ω')).toMatchObject({ fault: expect.stringContaining('Number 2, “x”') });
  });

  it('give the levels of the ladder they were measured at', () => {
    const board = exampleBoard(3);
    const nominal = measuredVolts({ ...own, measured: 'resistors', rungs: '20k 20k 20k' }, board);
    expect(nominal).toEqual({ kind: 'volts', volts: [...boardVolts(board)] });
    expect(measuredVolts({ ...own, measured: 'board' }, board)).toEqual(nominal);
    const weights = measuredVolts({ ...own, measured: 'weights', weights: '1 V\n2 V\n4 V' }, board);
    expect(weights).toEqual({ kind: 'volts', volts: [0, 1, 2, 3, 4, 5, 6, 7] });
  });

  it('are refused with the count that is wanted', () => {
    const board = exampleBoard(3);
    const why = (part: Partial<typeof own>) => measuredVolts({ ...own, ...part }, board);
    expect(why({ measured: 'levels', levels: '0 1 2' })).toMatchObject({
      why: expect.stringContaining('3 voltages'),
    });
    expect(why({ measured: 'weights', weights: '1 2' })).toMatchObject({
      why: expect.stringContaining('3 bits need 3'),
    });
    expect(why({ measured: 'resistors', rungs: '20k 20k' })).toMatchObject({
      why: expect.stringContaining('rungs'),
    });
    expect(why({ measured: 'resistors', terminator: '1k 2k' })).toMatchObject({
      why: expect.stringContaining('one'),
    });
    expect(why({})).toEqual({ kind: 'nothing' });
  });
});

describe('the board in the address', () => {
  it('is a team and a board, or the example', () => {
    expect(readBoardAt('ninth-fathom/buoy')).toEqual({ team: 'ninth-fathom', board: 'buoy' });
    for (const text of [null, '', 'buoy', 'a/b/c', '../x']) expect(readBoardAt(text)).toBeNull();
  });
});
