import { scoreOf, type Side } from '../../../../../shared/listening/index.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import type { FinishedTest, Loudness } from './blind-store.ts';

const capital = (side: Side) => side.toUpperCase();
/** In dB; below this, two are as good as equal. */
const equalDb = 0.005;

/** Which of the two was turned down, and by how much. */
export function sayTurnedDown({ turnedDownDb: { a, b } }: Loudness): string {
  const most = Math.max(a, b);
  if (most < equalDb) return 'Both have the same RMS already: neither is changed.';
  return `${a > b ? 'A' : 'B'} is turned down by ${formatQuantity(most, 'dB', { decimals: 2 })}.`;
}

/** A probability for reading: `3.84 %`. */
export const sayChance = (chance: number) => formatQuantity(100 * chance, '%', { significant: 3 });

/** What a score means. */
export function sayMeaning({ run }: Pick<FinishedTest, 'run'>): string {
  const { of, byGuessing } = scoreOf(run);
  if (of === 0) return 'Nothing was answered.';
  const early =
    run.end === 'complete'
      ? ''
      : ' The run was ended early; a figure that one may stop at will is worth less than it says.';
  if (byGuessing > 0.05) {
    return `Guessing does as well often enough: this does not show a difference. It does not show that there is none.${early}`;
  }
  const odds = Math.round(1 / byGuessing).toLocaleString('en');
  return `Guessing does as well in one of ${odds} such runs: that speaks for a difference that was heard.${early}`;
}

/** A finished run as text, its key included. */
export function resultText(test: FinishedTest): string {
  const { run, words, wave, loudness } = test;
  const { right, of, byGuessing } = scoreOf(run);
  const lines = run.answered.map(
    ({ x, said }, i) => `${i + 1}\t${capital(x)}\t${capital(said)}\t${x === said ? 'right' : 'wrong'}`,
  );
  return [
    `Blind test of ${wave}`,
    `A: ${words.a}`,
    `B: ${words.b}`,
    `Equal RMS of what is heard. ${sayTurnedDown(loudness)}`,
    `${right} of ${of} right; ${run.trials} trials were chosen beforehand${run.end === 'complete' ? '' : ', the run was ended early'}`,
    `Probability of at least as many by guessing: ${byGuessing.toPrecision(3)}`,
    'Trial\tX was\ttaken for\t',
    ...lines,
    '',
  ].join('\n');
}
