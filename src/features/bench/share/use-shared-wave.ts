import { useEffect, useState } from 'react';
import { useLocation } from 'react-router-dom';
import { decodeWave } from '../state/link-codec.ts';
import type { Wave } from '../state/wave.ts';

type Decoded = { wave: Wave } | { fault: string };

/** The wave in the address's fragment; `null` while it is read. */
export function useSharedWave(): Decoded | null {
  const { hash } = useLocation();
  const [read, setRead] = useState<{ hash: string; result: Decoded } | null>(null);
  useEffect(() => {
    let isWanted = true;
    void decodeWave(hash).then((result) => {
      if (isWanted) setRead({ hash, result });
    });
    return () => {
      isWanted = false;
    };
  }, [hash]);
  return read?.hash === hash ? read.result : null;
}
