import { useEffect } from 'react';
import {
  gainOf,
  minimumPhaseImpulse,
  type ResponsePoint,
} from '../../../../../shared/listening/device-response.ts';
import { useSettled } from '../../../../components/use-settled.ts';
import { useListening, type Device } from '../listening.tsx';
import type { Curve, CurveId } from './curves.ts';

export type Through = CurveId | 'straight';

interface CurveDevice extends Device {
  readonly id: CurveId;
  readonly points: readonly ResponsePoint[];
}

/** Changes of a curve are heard when they have stood still for so long: each takes a crossfade. */
const restMs = 150;

/** What it is heard through now. */
export function throughOf(device: Device | null): Through {
  return device === null ? 'straight' : (device as CurveDevice).id;
}

/** Lets what is heard go through a curve, and follow its changes. A curve that is not there is straight. */
export function useHeardThrough(id: Through, curve: Curve | null): void {
  const { device, setDevice } = useListening();
  const wanted = curve?.points ?? null;
  const settled = useSettled(wanted, restMs);
  const name = curve?.name ?? '';
  const isSettled = settled === wanted;
  useEffect(() => {
    const now = device as CurveDevice | null;
    if (id === 'straight' || wanted === null) {
      if (now !== null) setDevice(null);
      return;
    }
    if (now?.points === wanted && now.name === name) return;
    // Another device is heard at once, the same one once its curve stands still.
    if (now?.id === id && !isSettled) return;
    setDevice(deviceOf(id, name, wanted));
  }, [id, wanted, name, isSettled, device, setDevice]);
}

function deviceOf(id: CurveId, name: string, points: readonly ResponsePoint[]): CurveDevice {
  let known: { rateHz: number; impulse: Float32Array<ArrayBuffer> } | undefined;
  return {
    id,
    name,
    points,
    response: gainOf(points),
    impulseFor(rateHz) {
      if (known?.rateHz !== rateHz) known = { rateHz, impulse: minimumPhaseImpulse(points, rateHz) };
      return known.impulse;
    },
  };
}
