import { describe, expect, it } from 'vitest';
import { lookAtLevels } from '../../src/features/bench/quantise/levels/linearity-of.ts';
import { readLevels } from '../../src/features/bench/quantise/levels/read-levels.ts';

const volts = (...values: number[]) => ({ kind: 'levels', volts: values });

describe('voltages as text', () => {
  it.each([
    ['one a line', '0\n0.5\n1\n', volts(0, 0.5, 1)],
    ['with Windows line ends', '0\r\n0.5\r\n', volts(0, 0.5)],
    ['on one line', '0, 0.5, 1', volts(0, 0.5, 1)],
    ['with units', '0 V\n19.5 mV\n1.2V', volts(0, 0.0195, 1.2)],
    ['below a heading', 'volts\n0\n1', volts(0, 1)],
    ['by code, in any order', 'code,volts\n1,0.5\n0,0.1\n2,0.9', volts(0.1, 0.5, 0.9)],
    ['by code with decimal commas', '1;0,5\n0;0,25', volts(0.25, 0.5)],
    ['of nothing', ' \n', { kind: 'nothing' }],
  ])('%s', (_what, text, read) => {
    expect(readLevels(text)).toEqual(read);
  });

  it('asks what a comma is where only the writer knows', () => {
    const text = '0,1\n1,25';
    expect(readLevels(text)).toMatchObject({ kind: 'ask', text: '0,1' });
    expect(readLevels(text, 'decimal')).toEqual(volts(0.1, 1.25));
    expect(readLevels(text, 'separator')).toEqual(volts(1, 25));
    expect(readLevels('0;1,234')).toMatchObject({ kind: 'ask', text: '1,234' });
    expect(readLevels('0;1,234', 'decimal')).toEqual(volts(0, 1.234));
    expect(readLevels('0;1,234', 'thousands')).toEqual(volts(0, 1234));
  });

  it('names the line, the value and what is allowed', () => {
    expect(readLevels('0\nabc\n1')).toEqual({
      kind: 'faults',
      faults: [{ line: 2, value: 'abc', allowed: 'a voltage, as in 0.0195 or 19.5 mV' }],
    });
    expect(readLevels('0,0.1\n0,0.2\n9,0.3')).toMatchObject({
      kind: 'faults',
      faults: [
        { line: 2, value: '0', allowed: 'each code from 0 to 2 once' },
        { line: 3, value: '9', allowed: 'each code from 0 to 2 once' },
      ],
    });
  });
});

it('levels are held against even steps between their ends', () => {
  // LSBe = (3.3 − 0)/3 = 1.1 V; V(1) lies (1.4 − 1.1)/1.1 LSB above.
  const look = lookAtLevels([0, 1.4, 1.3, 3.3]);
  expect(look).toMatchObject({ lowest: 0, highest: 3.3, worstCode: 2, isMonotonic: false });
  expect(look.stepVolts).toBeCloseTo(1.1, 12);
  expect(look.offLsb?.[1]).toBeCloseTo(0.3 / 1.1, 12);
  expect(look.offLsb?.[2]).toBeCloseTo(1.3 / 1.1 - 2, 12);
  expect(lookAtLevels([1, 2, 1]).offLsb).toBeNull();
});
