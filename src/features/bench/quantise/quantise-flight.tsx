import { useState } from 'react';
import { useDefinition } from '../state/use-bench.ts';
import { later } from '../view/later.tsx';

const QuantiseBody = later('the flight', async () => (await import('./quantise-body.tsx')).QuantiseBody);

/** The second flight; its fields load when it is first opened. */
export function QuantiseFlight({ isOpen }: { isOpen: boolean }) {
  const [wasOpen, setWasOpen] = useState(isOpen);
  if (isOpen && !wasOpen) setWasOpen(true);
  return wasOpen && <QuantiseBody />;
}

/** The flight's settings in one line. */
export function QuantiseSummary() {
  const { length, bits, range, scale, coding, dither, shaping, fold, levels } = useDefinition(
    (definition) => definition.table,
  );
  const words = [
    `${length} entries of ${bits} ${bits === 1 ? 'bit' : 'bits'}`,
    range,
    scale === 'mid-tread' && 'mid-tread',
    dither !== 'none' && 'dithered',
    shaping !== 0 && `shaped, order ${shaping}`,
    levels !== undefined && 'measured levels',
    coding === 'twos-complement' && 'two’s complement',
    fold === 'quarter' && 'a quarter stored',
  ];
  return words.filter(Boolean).join(' · ');
}
