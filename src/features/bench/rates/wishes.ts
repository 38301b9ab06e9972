import { z } from 'zod';
import { createLive } from '../../../live/index.ts';

/** That a sample costs what was typed. */
export const ownCost = 'own';

const wishesSchema = z.strictObject({
  /** Tone as typed; empty for the one that is set on the bench. */
  tone: z.string(),
  clockHz: z.number().positive(),
  prescalers: z.string(),
  compareBits: z.enum(['8', '16', '32']),
  tolerancePpm: z.number().min(0),
  /** A playback code whose proven cycles count, by its case; `own` for `costCycles`. */
  costOf: z.string().default(ownCost),
  costCycles: z.number().min(0),
  lengths: z.enum(['this', 'others']),
  accumulatorTone: z.string(),
  firstTone: z.string(),
  secondTone: z.string(),
  longest: z.number(),
  withinCents: z.number(),
  pwmMode: z.enum(['fast', 'phase-correct']),
  pwmBits: z.int().min(1).max(16),
  pwmPrescaler: z.int().min(1),
  periodsPerEntry: z.int().min(1),
});

/** What is known of the part and asked of it. It is no part of the wave, so undo leaves it alone. */
export type RateWishes = z.infer<typeof wishesSchema>;

const atFirst: RateWishes = {
  tone: '',
  clockHz: 16e6,
  prescalers: '1, 8, 64, 256, 1024',
  compareBits: '16',
  tolerancePpm: 50,
  costOf: ownCost,
  costCycles: 40,
  lengths: 'this',
  accumulatorTone: '',
  firstTone: 'A4',
  secondTone: 'C#5',
  longest: 1024,
  withinCents: 5,
  pwmMode: 'fast',
  pwmBits: 8,
  pwmPrescaler: 8,
  periodsPerEntry: 4,
};

const storageKey = 'stepwell.bench.rates';

function readKept(): RateWishes {
  try {
    return wishesSchema.parse(JSON.parse(localStorage.getItem(storageKey) ?? 'null'));
  } catch {
    return atFirst;
  }
}

export const rateWishes = createLive<RateWishes>(readKept());

export function wish(part: Partial<RateWishes>): void {
  const next = { ...rateWishes.now(), ...part };
  rateWishes.set(next);
  try {
    localStorage.setItem(storageKey, JSON.stringify(next));
  } catch {
    // It then lasts as long as the page.
  }
}

/** Whole numbers parted by commas or blanks, and what of them is none. */
export function readPrescalers(text: string): { prescalers: number[] } | { fault: string } {
  const words = text.split(/[\s,;]+/).filter((word) => word !== '');
  const wrong = words.find((word) => !/^\d{1,5}$/.test(word) || Number(word) < 1);
  if (wrong !== undefined || words.length === 0)
    return { fault: `“${wrong ?? text}” is not allowed. Allowed: whole numbers from 1, as 1, 8, 64.` };
  return { prescalers: words.map(Number) };
}
