import { pulseLimits, Refusal, showValue, type PulsePattern, type PulseStep } from '../contract/index.ts';

// A pattern as one line, so that flags and addresses can say it: `200/100x3 500/0 endless`.

/** Word that stands for no pattern; nothing at all says the same. */
const noPattern = 'none';
const endlessWord = 'endless';

/** 64 steps of the longest numbers, the spaces between them and the last word. */
const longestText = 64 * '60000/60000x255 '.length + endlessWord.length;

const { onMs: on, offMs: off, repeats: times, steps: count } = pulseLimits;

/** On and off in milliseconds, repeats where there are several: `200/100x3 500/0`, and `endless` behind them. */
export function patternText({ steps, endless }: PulsePattern): string {
  const words = steps.map(
    ({ onMs, offMs, repeats }) => `${onMs}/${offMs}${repeats === 1 ? '' : `x${repeats}`}`,
  );
  return [...words, ...(endless ? [endlessWord] : [])].join(' ');
}

/**
 * Reads what `patternText` writes. Steps are parted by spaces; repeats left out are one.
 *
 * @returns `undefined` for no pattern: an empty text or `none`
 * @throws {Refusal} under `options.pulses`, saying which step is wrong, and what is allowed there
 */
export function parsePatternText(text: string): PulsePattern | undefined {
  const read = readPattern(text);
  if (typeof read !== 'string') return read;
  throw new Refusal({ path: 'options.pulses', value: showValue(text), allowed: read });
}

/** What is allowed in a text that is no pattern; nothing where it is one, or none. */
export function patternTextFault(text: string): string | undefined {
  const read = readPattern(text);
  return typeof read === 'string' ? read : undefined;
}

/** The pattern, nothing for none, or what would be allowed. */
function readPattern(text: string): PulsePattern | undefined | string {
  if (text.length > longestText) return `at most ${longestText} characters`;
  const words = text.split(' ').filter(Boolean);
  if (words.length === 0 || (words.length === 1 && words[0] === noPattern)) return undefined;
  const endless = words.at(-1) === endlessWord;
  if (endless) words.pop();
  if (words.length < count.min || words.length > count.max) {
    return `${count.min} to ${count.max} steps, as 200/100x3 500/0`;
  }
  const steps: PulseStep[] = [];
  for (const [index, word] of words.entries()) {
    const step = readStep(word);
    if (typeof step === 'string') return `in step ${index + 1}, ${step}`;
    steps.push(step);
  }
  return { steps, endless };
}

/** A step, or what is allowed in its place. */
function readStep(word: string): PulseStep | string {
  const [, onText, offText, repeatsText = '1'] = /^(\d{1,6})\/(\d{1,6})(?:x(\d{1,4}))?$/.exec(word) ?? [];
  if (onText === undefined) return 'on/off in whole milliseconds, with its repeats behind an x, as 200/100x3';
  const step = { onMs: Number(onText), offMs: Number(offText), repeats: Number(repeatsText) };
  const isIn = (value: number, { min, max }: { min: number; max: number }) => value >= min && value <= max;
  if (!isIn(step.onMs, on)) return `on from ${on.min} to ${on.max} ms`;
  if (!isIn(step.offMs, off)) return `off from ${off.min} to ${off.max} ms`;
  if (!isIn(step.repeats, times)) return `${times.min} to ${times.max} repeats`;
  return step;
}
