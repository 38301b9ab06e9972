import { useEffect, useState, type RefObject } from 'react';

const withExponent = /^(-?\d+(?:\.\d+)?)(e[+-]\d+)$/;

/**
 * A number's text in so many characters, its exponent in sight: `3.8981718325193755e-17` becomes `3.89…e-17` in nine.
 * For looking at only: it does not read back. Any other text stays as it is, as what is cut off there are its least
 * digits.
 */
export function withExponentInSight(text: string, room: number): string {
  const [, mantissa, exponent] = withExponent.exec(text) ?? [];
  if (mantissa === undefined || text.length <= room) return text;
  const digits = mantissa.slice(0, Math.max(0, room - exponent.length - 1)).replace(/\D+$/, '');
  return `${digits}…${exponent}`;
}

/** What an input shows of a text while nobody edits it: the whole, or as much as leaves its exponent in sight. */
export function useFittedText(
  input: RefObject<HTMLInputElement | null>,
  text: string,
  isEdited: boolean,
): string {
  const [fitted, setFitted] = useState<{ of: string; shown: string } | null>(null);
  const isDue = !isEdited && fitted?.of !== text && withExponent.test(text);
  useEffect(() => {
    if (!isDue) return;
    const frame = requestAnimationFrame(() => {
      if (input.current === null) return;
      const room = Math.floor(text.length * shareInSight(input.current));
      setFitted({ of: text, shown: withExponentInSight(text, room) });
    });
    return () => cancelAnimationFrame(frame);
  }, [input, text, isDue]);
  return !isEdited && fitted?.of === text ? fitted.shown : text;
}

/** Share of the text in an input that its width shows. */
function shareInSight(input: HTMLInputElement): number {
  const { clientWidth, scrollWidth } = input;
  if (scrollWidth <= clientWidth) return 1;
  const { paddingLeft, paddingRight } = getComputedStyle(input);
  const padding = parseFloat(paddingLeft) + parseFloat(paddingRight);
  return (clientWidth - padding) / (scrollWidth - padding);
}
