import { expect, it } from 'vitest';
import { deviceKinds } from '../../shared/listening/device-curves.ts';
import { readCurves, writeCurves } from '../../src/features/bench/listen/device/curves.ts';
import { inOrder, pointAfter } from '../../src/features/bench/listen/device/points.ts';
import { fileNameOf } from '../../src/features/bench/listen/keep/keep-plan.ts';

const atFirst = readCurves(null);
const flat = [
  { hz: 100, db: 0 },
  { hz: 1_000, db: 0 },
];

it('curves that the browser kept come back, the others as they came', () => {
  const changed = {
    ...atFirst,
    cone: { name: 'Small cone', typed: flat, points: flat },
    own: { name: 'Buoy horn', typed: flat, points: flat },
  };
  expect(readCurves(writeCurves(changed))).toEqual(changed);
  expect(JSON.parse(writeCurves(changed))).not.toHaveProperty('piezo');
  expect(JSON.parse(writeCurves(atFirst))).toEqual({ version: 1 });
  expect(atFirst.handset.points).toBe(deviceKinds[1].points);
});

it.each([
  ['no JSON', '{'],
  ['another version', '{"version":2}'],
  ['falling frequencies', JSON.stringify({ version: 1, piezo: flat.toReversed() })],
  ['one point', JSON.stringify({ version: 1, piezo: flat.slice(1) })],
  ['no number', '{"version":1,"piezo":[{"hz":1,"db":null},{"hz":2,"db":0}]}'],
  ['a stranger', '{"version":1,"horn":[]}'],
])('what is kept but not sound, %s, counts as nothing', (_, text) => {
  expect(readCurves(text)).toEqual(atFirst);
});

it('a point added lies half-way, or an octave on; points are put in order where that mends them', () => {
  expect(
    pointAfter(
      [
        { hz: 100, db: -6 },
        { hz: 400, db: 0 },
      ],
      0,
    ),
  ).toEqual({ hz: 200, db: -3 });
  expect(pointAfter(flat, 1)).toEqual({ hz: 2_000, db: 0 });
  expect(inOrder(flat)).toBeNull();
  expect(inOrder(flat.toReversed())).toEqual(flat);
  expect(inOrder([flat[1], flat[0], flat[0]])).toBeNull();
});

it('names of files are plain on every system', () => {
  expect(fileNameOf('Fog-signal tone', 440, 48_000, '16')).toBe('fog_signal_tone_440hz_48000hz_16bit.wav');
  expect(fileNameOf('../../Ä: é\\ "x"', 0.5, 8_000, '32f')).toMatch(/^[a-z0-9_]+_0p5hz_8000hz_float\.wav$/);
});
