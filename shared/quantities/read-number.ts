/**
 * Reads the digits of a number with its points, commas and gaps.
 *
 * @returns Each fair reading as JavaScript writes it; none where there is no fair one. A point is the decimal sign;
 *   one lone comma may be the decimal sign or part the thousands, so it has two readings, decimal first.
 */
export function readNumber(digits: string): string[] {
  const gap = /[ '_]/u.exec(digits)?.[0];
  if (gap !== undefined) {
    const [whole, ...fraction] = digits.split(/[.,]/u);
    if (fraction.length > 1 || !isGrouped(whole, gap)) return [];
    return readNumber(digits.replaceAll(gap, ''));
  }

  const points = count(digits, '.');
  const commas = count(digits, ',');
  if (commas === 0) {
    if (points <= 1) return [digits];
    return isGrouped(digits, '.') ? [digits.replaceAll('.', '')] : [];
  }
  if (points === 0) {
    if (commas === 1) return readLoneComma(digits);
    return isGrouped(digits, ',') ? [digits.replaceAll(',', '')] : [];
  }
  // Both signs: the last one is the decimal sign, the other parts thousands.
  const decimal = digits.lastIndexOf('.') > digits.lastIndexOf(',') ? '.' : ',';
  const grouping = decimal === '.' ? ',' : '.';
  const [whole, fraction, ...more] = digits.split(decimal);
  if (more.length > 0 || !isGrouped(whole, grouping)) return [];
  return [`${whole.replaceAll(grouping, '')}.${fraction}`];
}

function isGrouped(digits: string, sign: string): boolean {
  const [first, ...groups] = digits.split(sign);
  return /^\d{1,3}$/u.test(first) && groups.every((group) => /^\d{3}$/u.test(group));
}

function count(text: string, sign: string): number {
  return text.split(sign).length - 1;
}

function readLoneComma(digits: string): string[] {
  const asPoint = digits.replace(',', '.');
  // Nobody parts thousands after a nought: `0,5` is a half.
  return /^0*,/u.test(digits) ? [asPoint] : [asPoint, digits.replace(',', '')];
}
