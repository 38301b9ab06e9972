import type { z } from 'zod';
import { targets } from '../../../../shared/firmware/index.ts';
import { outputHz } from '../../../../shared/playback/index.ts';
import { sampleRateOf, timerOf, type Work } from '../state/wave.ts';

/** Options that more than one target knows, and how playback sets them. */
type Settings = Readonly<Record<string, string>>;

function settingsOf({ playback, definition }: Work): Settings {
  const timer = timerOf(playback);
  const { accumulator } = playback;
  return {
    ...(timer && {
      clockHz: String(timer.clockHz),
      prescaler: String(timer.prescaler),
      compare: String(timer.compare),
      countsPerWord: String(timer.prescaler * (timer.compare + 1)),
    }),
    ...(accumulator && {
      accumulatorBits: String(accumulator.accumulatorBits),
      toneMilliHz: String(Math.round(1000 * outputHz(accumulator, sampleRateOf(playback, definition.table)))),
    }),
  };
}

/** Puts the timer and the accumulator of a work into the options of every target that takes them. */
export function withExportOptions(work: Work): Work {
  const settings = settingsOf(work);
  const options = { ...work.exporting.options };
  for (const { id, options: known } of targets) {
    const taken = Object.entries(settings).filter(([name, value]) => {
      const schema = (known.shape as Record<string, z.ZodType | undefined>)[name];
      return schema !== undefined && schema.safeParse(value).success;
    });
    if (taken.length > 0) options[id] = { ...options[id], ...Object.fromEntries(taken) };
  }
  return { ...work, exporting: { ...work.exporting, options } };
}
