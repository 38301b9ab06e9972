/** Square matrices of one size, row by row. */
export type Matrix = Float64Array;

/** Terms of the series; with a norm of at most ½ the first left out is below 2⁻⁶⁰. */
const terms = 14;

/**
 * `e^(A·t)`: the series of a matrix halved until it is small, then squared as often ("scaling and squaring", Moler &
 * Van Loan 2003). It carries the state of a linear system with constant inputs exactly over a time t, equal and
 * very unlike rates included, as no closed form with differences of rates does.
 */
export function propagatorOf(matrix: Matrix, size: number, t: number): Matrix {
  let norm = 0;
  for (let row = 0; row < size; row += 1) {
    let sum = 0;
    for (let column = 0; column < size; column += 1) sum += Math.abs(matrix[row * size + column] * t);
    norm = Math.max(norm, sum);
  }
  const halvings = norm <= 0.5 ? 0 : Math.ceil(Math.log2(norm)) + 1;
  const scaled = matrix.map((value) => (value * t) / 2 ** halvings);

  // Horner's rule: I + X(I + X/2(I + X/3(…))).
  let sum = identity(size);
  for (let n = terms; n >= 1; n -= 1) {
    sum = product(scaled, sum, size);
    for (let i = 0; i < sum.length; i += 1) sum[i] /= n;
    for (let row = 0; row < size; row += 1) sum[row * size + row] += 1;
  }
  for (let n = 0; n < halvings; n += 1) sum = product(sum, sum, size);
  return sum;
}

function identity(size: number): Matrix {
  const matrix = new Float64Array(size * size);
  for (let row = 0; row < size; row += 1) matrix[row * size + row] = 1;
  return matrix;
}

function product(a: Matrix, b: Matrix, size: number): Matrix {
  const result = new Float64Array(size * size);
  for (let row = 0; row < size; row += 1) {
    for (let k = 0; k < size; k += 1) {
      const factor = a[row * size + k];
      if (factor === 0) continue;
      for (let column = 0; column < size; column += 1)
        result[row * size + column] += factor * b[k * size + column];
    }
  }
  return result;
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
