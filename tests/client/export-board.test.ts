import { describe, expect, test } from 'vitest';
import { boardOptionsFor, targetOf } from '../../shared/firmware/index.ts';
import { exampleBoard } from '../../src/boards/index.ts';
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

  test('keeps a clock that is no whole number to itself', () => {
    const odd = { ...board, clock: { ...board.clock, hz: 32_768.5 } };
    expect(boardOptionsFor(targetOf('avr'), odd)).not.toHaveProperty('clockHz');
  });

  test('says whether the words fit, to the last byte', () => {
    const budget = { boardName: 'Test board', flashBytes: 1024 };
    expect(sayRoom(1024, budget)).toBe(
      '✓ Within the 1,024 bytes that Test board leaves for tables: 0 are left.',
    );
    expect(sayRoom(1025, budget)).toBe('✗ Over the 1,024 bytes that Test board leaves for tables, by 1.');
  });
});
