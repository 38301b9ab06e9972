/** Sweeps over the table; each carries a bend some entries further. */
const sweeps = 400;

/**
 * A loop of the least bend that still rounds to the same codes: each entry stays within half a code of its own, and
 * moves towards the cubic through its two neighbours on each side as far as that lets it (Gauss–Seidel steps on the
 * sum of squared second differences, projected onto the box).
 */
export function smoothWithinCodes(codes: ArrayLike<number>): Float64Array {
  const length = codes.length;
  const values = Float64Array.from(codes);
  if (length < 5) return values;
  for (let sweep = 0; sweep < sweeps; sweep += 1) {
    for (let k = 0; k < length; k += 1) {
      const near = values[k === 0 ? length - 1 : k - 1] + values[k === length - 1 ? 0 : k + 1];
      const far = values[(k + length - 2) % length] + values[(k + 2) % length];
      const wanted = (4 * near - far) / 6;
      values[k] = Math.max(codes[k] - 0.5, Math.min(codes[k] + 0.5, wanted));
    }
  }
  return values;
}
