import { z } from 'zod';
import { deviceKinds } from '../../../../../shared/listening/device-curves.ts';
import { curveProblems, type ResponsePoint } from '../../../../../shared/listening/device-response.ts';
import { createLive } from '../../../../live/index.ts';

export const curveIds = ['piezo', 'handset', 'cone', 'own'] as const;
export type CurveId = (typeof curveIds)[number];

export interface Curve {
  readonly name: string;
  /** As they are typed: their order may be wrong on the way. */
  readonly typed: readonly ResponsePoint[];
  /** The last ones without problems: what is drawn and heard. */
  readonly points: readonly ResponsePoint[];
}

/** The own curve is there once it has been brought in. */
export type Curves = Readonly<Record<Exclude<CurveId, 'own'>, Curve>> & { readonly own: Curve | null };

const pointsSchema = z
  .array(z.strictObject({ hz: z.number(), db: z.number() }))
  .refine((points) => curveProblems(points).length === 0);

const keptSchema = z.strictObject({
  version: z.literal(1),
  piezo: pointsSchema.optional(),
  handset: pointsSchema.optional(),
  cone: pointsSchema.optional(),
  own: z.strictObject({ name: z.string().min(1).max(80), points: pointsSchema }).optional(),
});

const storageKey = 'stepwell.bench.devices';

/** The curves as this browser keeps them; what is not sound there counts as nothing. */
export function readCurves(text: string | null): Curves {
  let kept: Partial<z.infer<typeof keptSchema>> = {};
  try {
    kept = keptSchema.parse(JSON.parse(text ?? 'null'));
  } catch {
    // Then it is as it was at first.
  }
  const [piezo, handset, cone] = deviceKinds.map(({ id, name, points }) => {
    const own = kept[id] ?? points;
    return { name, typed: own, points: own };
  });
  const { own } = kept;
  return { piezo, handset, cone, own: own === undefined ? null : { ...own, typed: own.points } };
}

/** Text that `readCurves` reads back. Curves that are as they came are left out. */
export function writeCurves(curves: Curves): string {
  const { own } = curves;
  const changed = deviceKinds
    .filter(({ id }) => isChanged(curves, id))
    .map(({ id }) => [id, curves[id].points] as const);
  return JSON.stringify({
    version: 1,
    ...Object.fromEntries(changed),
    ...(own !== null && { own: { name: own.name, points: own.points } }),
  });
}

const firstOf = (id: CurveId) => deviceKinds.find((kind) => kind.id === id)?.points;

/** Whether a curve that came with the bench is another now. */
export function isChanged(curves: Curves, id: CurveId): boolean {
  const first = firstOf(id);
  return first !== undefined && JSON.stringify(curves[id]?.typed) !== JSON.stringify(first);
}

/** Curves are the browser's and no part of a wave, so undo leaves them alone. */
export const deviceCurves = createLive<Curves>(readCurves(stored()));

function stored(): string | null {
  try {
    return localStorage.getItem(storageKey);
  } catch {
    return null;
  }
}

function keep(curves: Curves): void {
  deviceCurves.set(curves);
  try {
    localStorage.setItem(storageKey, writeCurves(curves));
  } catch {
    // They then last as long as the page.
  }
}

/** Changes points as they are typed; they sound once they have no problem. */
export function changePoints(
  id: CurveId,
  change: (typed: readonly ResponsePoint[]) => readonly ResponsePoint[],
): void {
  const curves = deviceCurves.now();
  const before = curves[id];
  if (before === null) return;
  const typed = change(before.typed);
  const points = curveProblems(typed).length === 0 ? typed : before.points;
  keep({ ...curves, [id]: { ...before, typed, points } });
}

/** @param points without problems */
export function bringIn(name: string, points: readonly ResponsePoint[]): void {
  keep({ ...deviceCurves.now(), own: { name: name.slice(0, 80), typed: points, points } });
}

export function restore(id: CurveId): void {
  const first = firstOf(id);
  if (first !== undefined) changePoints(id, () => first);
}
