import { z } from 'zod';
import { createLive } from '../../../../live/index.ts';

export const keepLimits = {
  seconds: { min: 0.1, max: 60 },
  rateHz: { min: 8_000, max: 192_000 },
} as const;

/** Rates in common use; any whole number of hertz can be typed. */
export const commonRatesHz = [8_000, 11_025, 16_000, 22_050, 32_000, 44_100, 48_000, 88_200, 96_000, 192_000];

const settingsSchema = z.strictObject({
  seconds: z.number().min(keepLimits.seconds.min).max(keepLimits.seconds.max),
  rateHz: z.int().min(keepLimits.rateHz.min).max(keepLimits.rateHz.max),
  depth: z.enum(['8', '16', '24', '32f']),
  level: z.enum(['full-scale', 'peak']),
  ends: z.enum(['rounds', 'fades']),
  isDithered: z.boolean(),
  isThroughDevice: z.boolean(),
});

/** How a sound is kept. It is the browser's and no part of the wave, so undo leaves it alone. */
export type KeepSettings = z.infer<typeof settingsSchema>;

const atFirst: KeepSettings = {
  seconds: 2,
  rateHz: 48_000,
  depth: '16',
  level: 'peak',
  ends: 'rounds',
  isDithered: true,
  isThroughDevice: true,
};

const storageKey = 'stepwell.bench.keep-sound';

function readKept(): KeepSettings {
  try {
    return settingsSchema.parse(JSON.parse(localStorage.getItem(storageKey) ?? 'null'));
  } catch {
    return atFirst;
  }
}

export const keepSettings = createLive<KeepSettings>(readKept());

export function setKeep(part: Partial<KeepSettings>): void {
  const next = { ...keepSettings.now(), ...part };
  keepSettings.set(next);
  try {
    localStorage.setItem(storageKey, JSON.stringify(next));
  } catch {
    // It then lasts as long as the page.
  }
}
