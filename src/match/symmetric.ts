/** Small dense symmetric systems, row-major in a Float64Array of n * n. */

/**
 * Cholesky factor L (lower triangle, in place) of a positive definite matrix.
 * @throws RangeError when a pivot is not positive: the matrix is not positive definite to working precision.
 */
export function choleskyInPlace(matrix: Float64Array, n: number): void {
  for (let j = 0; j < n; j++) {
    let pivot = matrix[j * n + j]!;
    for (let k = 0; k < j; k++) pivot -= matrix[j * n + k]! ** 2;
    if (!(pivot > 0)) throw new RangeError(`matrix is not positive definite at pivot ${j}`);
    const root = Math.sqrt(pivot);
    matrix[j * n + j] = root;
    for (let i = j + 1; i < n; i++) {
      let sum = matrix[i * n + j]!;
      for (let k = 0; k < j; k++) sum -= matrix[i * n + k]! * matrix[j * n + k]!;
      matrix[i * n + j] = sum / root;
    }
  }
}

/** Solves L Lt x = b in place, with L from `choleskyInPlace`. */
export function choleskySolve(factor: Float64Array, n: number, b: Float64Array): void {
  for (let i = 0; i < n; i++) {
    let sum = b[i]!;
    for (let k = 0; k < i; k++) sum -= factor[i * n + k]! * b[k]!;
    b[i] = sum / factor[i * n + i]!;
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = b[i]!;
    for (let k = i + 1; k < n; k++) sum -= factor[k * n + i]! * b[k]!;
    b[i] = sum / factor[i * n + i]!;
  }
}

/** Inverse of a positive definite matrix (the matrix is not changed). */
export function inverseOf(matrix: Float64Array, n: number): Float64Array {
  const factor = matrix.slice();
  choleskyInPlace(factor, n);
  const inverse = new Float64Array(n * n);
  const column = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    column.fill(0);
    column[j] = 1;
    choleskySolve(factor, n, column);
    for (let i = 0; i < n; i++) inverse[i * n + j] = column[i]!;
  }
  return inverse;
}
