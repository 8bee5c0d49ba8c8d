import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { choleskyInPlace, choleskySolve, inverseOf } from '../../src/match/symmetric.ts';

/** A A^T + I: positive definite, least eigenvalue 1 or more. */
function positive(entries: readonly number[], n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      let sum = i === j ? 1 : 0;
      for (let k = 0; k < n; k++) sum += entries[i * n + k]! * entries[j * n + k]!;
      out[i * n + j] = sum;
    }
  }
  return out;
}

const sized = fc
  .integer({ min: 1, max: 8 })
  .chain((n) =>
    fc.tuple(
      fc.constant(n),
      fc.array(fc.double({ min: -2, max: 2, noNaN: true }), { minLength: n * n, maxLength: n * n }),
      fc.array(fc.double({ min: -5, max: 5, noNaN: true }), { minLength: n, maxLength: n }),
    ),
  );

describe('symmetric systems', () => {
  it('factors into L L^T', () => {
    fc.assert(
      fc.property(sized, ([n, entries]) => {
        const matrix = positive(entries, n);
        const factor = matrix.slice();
        choleskyInPlace(factor, n);
        for (let i = 0; i < n; i++) {
          for (let j = 0; j <= i; j++) {
            let sum = 0;
            for (let k = 0; k <= j; k++) sum += factor[i * n + k]! * factor[j * n + k]!;
            expect(sum).toBeCloseTo(matrix[i * n + j]!, 10);
          }
        }
      }),
    );
  });

  it('solves, and inverts to the identity, leaving the matrix as it was', () => {
    fc.assert(
      fc.property(sized, ([n, entries, right]) => {
        const matrix = positive(entries, n);
        const kept = matrix.slice();
        const factor = matrix.slice();
        choleskyInPlace(factor, n);
        const x = Float64Array.from(right);
        choleskySolve(factor, n, x);
        const inverse = inverseOf(matrix, n);
        expect(matrix).toEqual(kept);
        for (let i = 0; i < n; i++) {
          let back = 0;
          for (let k = 0; k < n; k++) back += matrix[i * n + k]! * x[k]!;
          expect(back).toBeCloseTo(right[i]!, 8);
          for (let j = 0; j < n; j++) {
            let sum = 0;
            for (let k = 0; k < n; k++) sum += matrix[i * n + k]! * inverse[k * n + j]!;
            expect(sum).toBeCloseTo(i === j ? 1 : 0, 8);
          }
        }
      }),
    );
  });

  it('refuses a matrix that is not positive definite', () => {
    expect(() => choleskyInPlace(Float64Array.of(1, 2, 2, 1), 2)).toThrow(RangeError);
    expect(() => choleskyInPlace(Float64Array.of(Number.NaN), 1)).toThrow(RangeError);
  });
});
