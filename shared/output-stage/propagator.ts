/** Square matrices of one size, row by row. */
export type Matrix = Float64Array;

/** Terms of the series; with a norm of at most ½ the first left out is below 2⁻⁶⁰. */
const terms = 14;

/**
 * `e^(A·t) − I`: the series of a matrix halved until it is small, then doubled as often by `D ← 2D + D²` ("scaling and
 * squaring", Moler & Van Loan 2003). It carries the state of a linear system with constant inputs exactly over a time
 * t, equal and very unlike rates included, as no closed form with differences of rates does.
 *
 * The I is left out because rows of D that keep a constant sum to 0, and stay so to the last bit through any number of
 * doublings; of `e^(A·t)` itself such rows sum to 1 and a rounding, which each doubling would double.
 */
export function changeOver(matrix: Matrix, size: number, t: number): Matrix {
  let norm = 0;
  for (let row = 0; row < size; row += 1) {
    let sum = 0;
    for (let column = 0; column < size; column += 1) sum += Math.abs(matrix[row * size + column] * t);
    if (sum > norm) norm = sum;
  }
  const halvings = norm <= 0.5 ? 0 : Math.ceil(Math.log2(norm)) + 1;
  const count = size * size;
  const scaled = new Float64Array(count);
  let change = new Float64Array(count);
  let next = new Float64Array(count);
  const share = t / 2 ** halvings;
  for (let i = 0; i < count; i += 1) change[i] = scaled[i] = matrix[i] * share;

  // Horner's rule: X(I + X/2(I + X/3(…))).
  for (let n = terms; n >= 2; n -= 1) {
    for (let i = 0; i < count; i += 1) change[i] /= n;
    multiply(scaled, change, size, next);
    for (let i = 0; i < count; i += 1) next[i] += scaled[i];
    [change, next] = [next, change];
  }
  for (let n = 0; n < halvings; n += 1) {
    multiply(change, change, size, next);
    for (let i = 0; i < count; i += 1) next[i] += 2 * change[i];
    [change, next] = [next, change];
  }
  return change;
}

/** `e^(A·t)`. */
export function propagatorOf(matrix: Matrix, size: number, t: number): Matrix {
  const change = changeOver(matrix, size, t);
  for (let row = 0; row < size; row += 1) change[row * size + row] += 1;
  return change;
}

/** Fills `to` with a times b; most of what these matrices hold is 0. */
function multiply(a: Matrix, b: Matrix, size: number, to: Matrix): void {
  to.fill(0);
  for (let row = 0; row < size; row += 1) {
    for (let k = 0; k < size; k += 1) {
      const factor = a[row * size + k];
      if (factor === 0) continue;
      for (let column = 0; column < size; column += 1)
        to[row * size + column] += factor * b[k * size + column];
    }
  }
}

/** Fills `to` with matrix times `from`; the two must differ. */
export function apply(matrix: Matrix, from: Float64Array, to: Float64Array): void {
  const size = from.length;
  for (let row = 0; row < size; row += 1) {
    let sum = 0;
    for (let column = 0; column < size; column += 1) sum += matrix[row * size + column] * from[column];
    to[row] = sum;
  }
}
