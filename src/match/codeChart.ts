/**
 * The chart as one photo would record it: for each thickness the code values expected, and how far off they may be.
 * Index j is thickness `thicknessNm[j]`; steps are even.
 */
export interface CodeChart {
  readonly count: number;
  readonly thicknessNm: Float64Array;
  /** Expected codes 0..255, 3 a label. */
  readonly codes: Float64Array;
  /** Inverse covariance of an observed code triple: xx yy zz xy xz yz, 6 a label. */
  readonly precision: Float64Array;
  /** Logarithm of the covariance's determinant, one a label. */
  readonly logDeterminant: Float64Array;
  /** Interference order of each label. */
  readonly order: Uint8Array;
  /** One standard deviation of thickness from what all pixels share (fitted camera, index, angle), nm. */
  readonly sharedSdNm: Float64Array;
  /** Share of a reading's variance that is the pixel's own noise; the rest is common to all pixels. */
  readonly noiseShare: Float64Array;
}

/** Labels to a block of the search tree. */
export const BLOCK = 16;

/** A code chart with a bounding ball for each block of labels, for the search. */
export interface SearchChart extends CodeChart {
  readonly blocks: number;
  /** x, y, z, radius of each block's ball. */
  readonly balls: Float64Array;
  /** Smallest eigenvalue of any precision in the block. */
  readonly leastPrecision: Float64Array;
}

/** Adds the bounding balls. */
export function searchable(chart: CodeChart): SearchChart {
  const blocks = Math.ceil(chart.count / BLOCK);
  const balls = new Float64Array(4 * blocks);
  const leastPrecision = new Float64Array(blocks).fill(Number.POSITIVE_INFINITY);
  for (let b = 0; b < blocks; b++) {
    const from = b * BLOCK;
    const to = Math.min(chart.count, from + BLOCK);
    const centre = [0, 0, 0];
    for (let j = from; j < to; j++)
      for (let c = 0; c < 3; c++) centre[c]! += chart.codes[3 * j + c]! / (to - from);
    let radius = 0;
    for (let j = from; j < to; j++) {
      radius = Math.max(
        radius,
        Math.hypot(
          chart.codes[3 * j]! - centre[0]!,
          chart.codes[3 * j + 1]! - centre[1]!,
          chart.codes[3 * j + 2]! - centre[2]!,
        ),
      );
      leastPrecision[b] = Math.min(leastPrecision[b]!, leastEigenvalue(chart.precision, 6 * j));
    }
    balls.set([centre[0]!, centre[1]!, centre[2]!, radius], 4 * b);
  }
  return { ...chart, blocks, balls, leastPrecision };
}

/**
 * Lower bound of the smallest eigenvalue of a symmetric 3 x 3 given as xx yy zz xy xz yz (closed form; Smith 1961), within
 * 1e-7 of the spread of its eigenvalues: where two of them meet, rounding moves the arc cosine by the root of the
 * machine's precision, and a bound must not lie above.
 */
export function leastEigenvalue(m: Float64Array, at: number): number {
  const [xx, yy, zz] = [m[at]!, m[at + 1]!, m[at + 2]!];
  const [xy, xz, yz] = [m[at + 3]!, m[at + 4]!, m[at + 5]!];
  const mean = (xx + yy + zz) / 3;
  const off = xy * xy + xz * xz + yz * yz;
  const spread = ((xx - mean) ** 2 + (yy - mean) ** 2 + (zz - mean) ** 2 + 2 * off) / 6;
  if (spread <= 1e-300) return mean;
  const p = Math.sqrt(spread);
  const [a, b, c] = [(xx - mean) / p, (yy - mean) / p, (zz - mean) / p];
  const [d, e, f] = [xy / p, xz / p, yz / p];
  const half = (a * (b * c - f * f) - d * (d * c - f * e) + e * (d * f - b * e)) / 2;
  const angle = Math.acos(Math.max(-1, Math.min(1, half))) / 3;
  return Math.max(0, mean + p * (2 * Math.cos(angle + (2 * Math.PI) / 3) - ROUNDING));
}

/** Share of the spread that rounding may add. */
const ROUNDING = 1e-7;

/** Precision and log determinant of a covariance xx yy zz xy xz yz, written at label j. */
export function invertCovariance(
  s: ArrayLike<number>,
  precision: Float64Array,
  logDeterminant: Float64Array,
  j: number,
): void {
  const [xx, yy, zz, xy, xz, yz] = [s[0]!, s[1]!, s[2]!, s[3]!, s[4]!, s[5]!];
  const a = yy * zz - yz * yz;
  const b = xz * yz - xy * zz;
  const c = xy * yz - xz * yy;
  const determinant = xx * a + xy * b + xz * c;
  precision[6 * j] = a / determinant;
  precision[6 * j + 1] = (xx * zz - xz * xz) / determinant;
  precision[6 * j + 2] = (xx * yy - xy * xy) / determinant;
  precision[6 * j + 3] = b / determinant;
  precision[6 * j + 4] = c / determinant;
  precision[6 * j + 5] = (xy * xz - xx * yz) / determinant;
  logDeterminant[j] = Math.log(determinant);
}
