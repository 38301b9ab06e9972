import { outputLimits, type Port } from '../../../shared/contract/index.ts';

/** Reads reserved pins with their rest levels, as in `6 high, 7`; answers in words what is wrong. */
export function readReserved(text: string): Port['reserved'] | string {
  const reserved: Port['reserved'] = [];
  for (const part of text.split(/[,;]/).map((each) => each.trim())) {
    if (part === '') continue;
    const [, pin, rest = 'low'] = /^(\d{1,2})(?:\s+(high|low))?$/i.exec(part) ?? [];
    if (pin === undefined || Number(pin) >= outputLimits.portWidth.max)
      return `“${part}” is not allowed; allowed: pins from 0 to ${outputLimits.portWidth.max - 1}, each with high or low behind it, parted by commas`;
    reserved.push({ pin: Number(pin), rest: rest.toLowerCase() as 'low' | 'high' });
  }
  return reserved;
}
