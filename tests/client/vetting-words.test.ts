import { describe, expect, test } from 'vitest';
import {
  changeLimitSetSchema,
  problemsIn,
  type LimitOutcome,
  type VettingLimits,
} from '../../shared/contract/index.ts';
import { readPicked } from '../../src/features/reviews/compare/picked.ts';
import { sideNames } from '../../src/features/reviews/compare/side.ts';
import { toneOf } from '../../src/features/reviews/compare/tone.ts';
import { sayHindrance, saySince } from '../../src/features/reviews/words.ts';
import { noLimits, readLimits, typeLimits } from '../../src/features/team/limit-fields.ts';
import { sayAllowed, sayLimit, sayMeasured, sayStanding } from '../../src/limits/words.ts';

const outcome = (part: Partial<LimitOutcome>): LimitOutcome => ({
  limit: 'minSnrDb',
  tag: null,
  allowed: 48,
  measured: 49.76,
  passed: true,
  ...part,
});

describe('limits in words', () => {
  test('say bound and unit, lists too', () => {
    expect(sayLimit('minSnrDb', 48)).toBe('SNR at least 48 dB');
    expect(sayLimit('maxUnwantedDb', -60.5)).toBe('Unwanted line at most −60.5 dB');
    expect(sayAllowed('lengths', [256, 512])).toBe('one of 256, 512 entries');
  });

  test('say what was measured with as many digits as tell on which side of the bound it lies', () => {
    expect(sayMeasured(outcome({ measured: 49.76123 }))).toBe('49.76 dB');
    expect(sayMeasured(outcome({ measured: 47.99996, passed: false }))).toBe('47.99996 dB');
    const peak = { limit: 'maxPeakErrorLsb', allowed: 0.5 } as const;
    expect(sayMeasured(outcome({ ...peak, measured: 0.499999999999998 }))).toBe('0.5 LSB');
    expect(sayMeasured(outcome({ ...peak, measured: 0.50003, passed: false }))).toBe('0.50003 LSB');
    expect(sayMeasured(outcome({ limit: 'maxTableBytes', allowed: 1024, measured: 131_072 }))).toBe(
      '131072 bytes',
    );
    expect(sayMeasured(outcome({ limit: 'bits', allowed: [8, 10], measured: 12, passed: false }))).toBe(
      '12 bits',
    );
  });

  test('say why a figure is missing', () => {
    expect(sayMeasured(outcome({ measured: null, passed: true }))).toBe('no error at all');
    expect(sayMeasured(outcome({ measured: null, passed: false }))).toBe('no such figure for this wave');
  });

  test('say how a table stands against all of them', () => {
    const [good, bad] = [outcome({}), outcome({ passed: false })];
    expect(sayStanding([])).toBe('The team has set no limits for this table');
    expect(sayStanding([good])).toBe('The one limit is kept');
    expect(sayStanding([bad])).toBe('The one limit is broken');
    expect(sayStanding([good, good])).toBe('All 2 limits are kept');
    expect(sayStanding([good, bad, good])).toBe('1 of 3 limits is broken');
    expect(sayStanding([bad, bad, good])).toBe('2 of 3 limits are broken');
  });
});

describe('limits as they are typed', () => {
  test('are numbers with or without their unit, shares in percent, lists with any separator', () => {
    const typed = {
      ...noLimits,
      minSnrDb: ' 48 dB ',
      maxMean: '2 %',
      maxTableBytes: '2 Ki',
      lengths: '512, 256;64',
    };
    expect(readLimits(typed)).toEqual({
      minSnrDb: 48,
      maxMean: 0.02,
      maxTableBytes: 2048,
      lengths: [512, 256, 64],
    });
  });

  test('stay as typed where they are none, so that the schema says what is allowed', () => {
    const limits = readLimits({ ...noLimits, minSnrDb: 'forty', bits: '8, ten' });
    expect(limits).toEqual({ minSnrDb: 'forty', bits: '8, ten' });
    const { error } = changeLimitSetSchema.safeParse({ limits });
    expect(problemsIn(error?.issues ?? [], { limits }, 'body')).toEqual([
      { path: 'limits.minSnrDb', value: '"forty"', allowed: 'a number from 0 to 200 dB' },
      { path: 'limits.bits', value: '"8, ten"', allowed: 'a list of whole numbers' },
    ]);
  });

  test('law: typed out and read back they are the same', () => {
    const limits: VettingLimits = {
      minSnrDb: 48.25,
      maxUnwantedDb: -60,
      maxMean: 0.005,
      lengths: [64, 256],
      bits: [8],
    };
    expect(readLimits(typeLimits(limits))).toEqual(limits);
    expect(readLimits(noLimits)).toEqual({});
  });
});

describe('reviews in words', () => {
  test('say how long something has waited', () => {
    const now = Date.parse('2026-12-01T12:00:00Z');
    const since = (at: string) => saySince(at, now);
    expect(since('2026-12-01T11:59:30Z')).toBe('less than a minute');
    expect(since('2026-12-01T12:00:30Z')).toBe('less than a minute');
    expect(since('2026-12-01T11:58:59Z')).toBe('1 minute');
    expect(since('2026-12-01T09:00:00Z')).toBe('3 hours');
    expect(since('2026-11-29T12:00:00Z')).toBe('2 days');
  });

  test('say what hinders whom', () => {
    expect(sayHindrance('judge', null, 'in-review')).toBeNull();
    expect(sayHindrance('judge', 'role', 'in-review')).toBe('Judging takes the role reviewer.');
    expect(sayHindrance('judge', 'own-revision', 'in-review')).toBe(
      'The two-person rule: somebody else must judge what you made.',
    );
    expect(sayHindrance('judge', 'state', 'vetted')).toBe(
      'This revision is vetted; only one in review can be judged.',
    );
    expect(sayHindrance('submit', 'state', 'draft')).toBe('The table is archived: restore it first.');
  });

  test('name two sides by their tables where those differ', () => {
    const side = (slug: string, number: number) => ({ slug, title: slug.toUpperCase(), number });
    expect(sideNames({ a: side('fog', 1), b: side('fog', 3) })).toEqual({ a: 'revision 1', b: 'revision 3' });
    expect(sideNames({ a: side('fog', 1), b: side('bell', 3) })).toEqual({
      a: 'FOG, revision 1',
      b: 'BELL, revision 3',
    });
  });

  test('read a revision from an address, and nothing else', () => {
    expect(readPicked('fog-signal:3')).toEqual({ table: 'fog-signal', number: 3 });
    for (const text of [null, '', 'fog-signal', 'fog-signal:0', 'fog signal:3', 'fog:1:2', 'fog:-1', 'Fog:1'])
      expect(readPicked(text), String(text)).toBeNull();
  });

  test('play at the tone that a revision was listened to with', () => {
    const table = { length: 64, cycles: 2 };
    expect(toneOf(null, table)).toBe(220);
    const playback = { mode: 'loop' as const, by: 'tone' as const, toneHz: 440, sampleRateHz: 8_000 };
    expect(toneOf(playback, table)).toBe(440);
    expect(toneOf({ ...playback, by: 'sampleRate' }, table)).toBe(250);
  });
});
