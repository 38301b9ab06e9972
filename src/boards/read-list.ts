import { parseQuantity } from '../../shared/quantities/index.ts';

/**
 * Reads numbers parted by blanks, semicolons or line ends, each as people write it: `4k7 9.98k; 10.02 kΩ`. Nothing
 * typed is nothing given.
 */
export function readList(text: string, unit: string): { numbers: number[] | undefined } | { fault: string } {
  // A number and its unit stay together.
  const tidy = text.replace(/(\d)[^\S\n]+(?=[pnuµmkKMG]?(?:Ω|ohms?|V)(?![A-Za-z]))/gi, '$1');
  const cells = tidy.split(/[;\s]+/).filter((cell) => cell !== '');
  if (cells.length === 0) return { numbers: undefined };
  const numbers: number[] = [];
  for (const [index, cell] of cells.entries()) {
    const reading = parseQuantity(cell, unit);
    if (reading.kind === 'number') numbers.push(reading.value);
    else if (reading.kind === 'ask') {
      const ways = reading.readings.map((one) => one.text).join(' or ');
      return {
        fault: `Number ${index + 1}, “${cell}”, can be read in two ways: write ${ways}, with parts by blanks.`,
      };
    } else
      return {
        fault: `Number ${index + 1}, “${cell}”, is not allowed; allowed: numbers parted by blanks, as in 4k7.`,
      };
  }
  return { numbers };
}
