/**
 * Row-major 3 x 3 from camera raw values to linear output values, by least squares over sample colours, with rows that add
 * to one so that white (1, 1, 1) stays white. What an image processor's colour matrix is, in its simplest form.
 *
 * `raw` and `wanted` are `count` x 3, white-balanced (white = 1, 1, 1). Each row has two free coefficients: with
 * a_own = 1 - a_p - a_q the residual is linear in a_p, a_q; solved by its 2 x 2 normal equations.
 */
export function fitCameraMatrix(raw: Float64Array, wanted: Float64Array): Float64Array {
  const matrix = new Float64Array(9);
  const count = raw.length / 3;
  for (let own = 0; own < 3; own++) {
    const p = (own + 1) % 3;
    const q = (own + 2) % 3;
    let pp = 0;
    let pq = 0;
    let qq = 0;
    let py = 0;
    let qy = 0;
    for (let i = 0; i < count; i++) {
      const base = raw[3 * i + own]!;
      const xp = raw[3 * i + p]! - base;
      const xq = raw[3 * i + q]! - base;
      const y = wanted[3 * i + own]! - base;
      pp += xp * xp;
      pq += xp * xq;
      qq += xq * xq;
      py += xp * y;
      qy += xq * y;
    }
    const det = pp * qq - pq * pq;
    if (!(det > 1e-12 * pp * qq)) {
      throw new RangeError('The sample colours are too alike to fit a camera matrix: give a wider set.');
    }
    const ap = (py * qq - qy * pq) / det;
    const aq = (qy * pp - py * pq) / det;
    matrix[3 * own + p] = ap;
    matrix[3 * own + q] = aq;
    matrix[3 * own + own] = 1 - ap - aq;
  }
  return matrix;
}

/** Sums `spectra` (rows of n values) against three `curves` (3 x n, each of unit sum over the light): count x 3. */
export function rawResponses(spectra: Float64Array, curves: Float64Array): Float64Array {
  const n = curves.length / 3;
  const count = spectra.length / n;
  const raw = new Float64Array(count * 3);
  for (let row = 0; row < count; row++) {
    for (let c = 0; c < 3; c++) {
      let sum = 0;
      for (let i = 0; i < n; i++) {
        sum += spectra[row * n + i]! * curves[c * n + i]!;
      }
      raw[3 * row + c] = sum;
    }
  }
  return raw;
}

/** The curves times a light, each scaled to unit sum: a perfect white then gives (1, 1, 1). Row-major 3 x n. */
export function lightWeighted(curves: Float64Array, light: ArrayLike<number>): Float64Array {
  const n = curves.length / 3;
  const weighted = new Float64Array(curves.length);
  for (let c = 0; c < 3; c++) {
    let sum = 0;
    for (let i = 0; i < n; i++) {
      const value = curves[c * n + i]! * light[i]!;
      weighted[c * n + i] = value;
      sum += value;
    }
    for (let i = 0; i < n; i++) {
      weighted[c * n + i]! /= sum;
    }
  }
  return weighted;
}
