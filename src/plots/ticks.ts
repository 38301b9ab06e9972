/** Round steps of 1, 2 and 5 times a power of ten, about `target` of them between `min` and `max`. */
export function decimalTicks(min: number, max: number, target: number): number[] {
  return multiplesWithin(min, max, decimalStep((max - min) / Math.max(1, target)));
}

/** The same with no step below one. */
export function wholeTicks(min: number, max: number, target: number): number[] {
  return multiplesWithin(min, max, Math.max(1, decimalStep((max - min) / Math.max(1, target))));
}

/** Powers of two, as lengths and codes come in them; no step below one. */
export function binaryTicks(min: number, max: number, target: number): number[] {
  const rough = (max - min) / Math.max(1, target);
  return multiplesWithin(min, max, Math.max(1, 2 ** Math.ceil(Math.log2(rough))));
}

/** Decades, and 2 and 5 between them where there is room. Values and bounds are base-ten logarithms. */
export function logTicks(min: number, max: number, target: number): number[] {
  const ticks: number[] = [];
  const within = max - min < target / 2 ? [1, 2, 5] : [1];
  for (let decade = Math.floor(min); decade <= max; decade += 1) {
    for (const factor of within) {
      const tick = decade + Math.log10(factor);
      if (tick >= min - 1e-9 && tick <= max + 1e-9) ticks.push(tick);
    }
  }
  return ticks;
}

function decimalStep(rough: number): number {
  const power = 10 ** Math.floor(Math.log10(rough));
  const lead = rough / power;
  return power * (lead <= 1.0001 ? 1 : lead <= 2.0001 ? 2 : lead <= 5.0001 ? 5 : 10);
}

function multiplesWithin(min: number, max: number, step: number): number[] {
  const ticks: number[] = [];
  const slack = step * 1e-6;
  for (let count = Math.ceil((min - slack) / step); count * step <= max + slack; count += 1) {
    // Rounded to the step's own decimals, so that 3 · 0.1 is 0.3 on the label.
    ticks.push(Number((count * step).toPrecision(12)));
  }
  return ticks;
}

/** A tick's number with the sign of mathematics for minus. */
export function tickText(value: number): string {
  return String(value).replace('-', '\u2212');
}
