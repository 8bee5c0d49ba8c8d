/**
 * The Gauss rule of a weighted set of points: `count` nodes and weights that give the same mean of every polynomial up
 * to degree 2 count - 1. Recurrence by the Stieltjes procedure, nodes as roots of the last orthogonal polynomial
 * (Gautschi 2004, Orthogonal Polynomials, sections 2.2 and 3.1). Weights sum to 1, nodes ascend.
 * @throws RangeError where there are fewer distinct points than nodes asked for, or no weight
 */
export function discreteGauss(
  points: Float64Array,
  weights: Float64Array,
  count: number,
): { readonly node: Float64Array; readonly weight: Float64Array } {
  const total = weights.reduce((sum, w) => sum + w, 0);
  if (!(count >= 1 && total > 0)) {
    throw new RangeError('A Gauss rule needs at least one node and some weight.');
  }
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const point of points) {
    low = Math.min(low, point);
    high = Math.max(high, point);
  }
  const alpha = new Float64Array(count);
  const beta = new Float64Array(count);
  let before = new Float64Array(points.length);
  let now = new Float64Array(points.length).fill(1);
  let normBefore = 1;
  for (let k = 0; k < count; k++) {
    let norm = 0;
    let moment = 0;
    for (let i = 0; i < points.length; i++) {
      const square = weights[i]! * now[i]! * now[i]!;
      norm += square;
      moment += square * points[i]!;
    }
    // A norm lost in rounding means that the polynomial already vanishes on every point.
    if (!(norm > 1e-26 * total * Math.max(1e-300, (high - low) / 2) ** (2 * k))) {
      throw new RangeError(`${count} nodes need at least as many distinct points.`);
    }
    alpha[k] = moment / norm;
    beta[k] = k === 0 ? total : norm / normBefore;
    const next = new Float64Array(points.length);
    for (let i = 0; i < points.length; i++) {
      next[i] = (points[i]! - alpha[k]!) * now[i]! - (k === 0 ? 0 : beta[k]! * before[i]!);
    }
    before = now;
    now = next;
    normBefore = norm;
  }
  const node = new Float64Array(count);
  const weight = new Float64Array(count);
  for (let j = 0; j < count; j++) {
    // The roots lie between the outermost points, and the Sturm count brackets the j-th of them.
    let a = low;
    let b = high;
    for (
      let step = 0;
      step < 200 && b - a > 4 * Number.EPSILON * Math.max(Math.abs(a), Math.abs(b));
      step++
    ) {
      const middle = (a + b) / 2;
      if (rootsBelow(alpha, beta, middle) > j) {
        b = middle;
      } else {
        a = middle;
      }
    }
    node[j] = (a + b) / 2;
    weight[j] = christoffel(alpha, beta, node[j]!);
  }
  return { node, weight };
}

/** Eigenvalues of the Jacobi matrix below x, by the signs of its Sturm sequence. */
function rootsBelow(alpha: Float64Array, beta: Float64Array, x: number): number {
  let below = 0;
  let pivot = 1;
  for (let k = 0; k < alpha.length; k++) {
    pivot = alpha[k]! - x - (k === 0 ? 0 : beta[k]! / pivot);
    if (pivot === 0) {
      pivot = Number.MIN_VALUE * 1e16;
    }
    if (pivot < 0) {
      below++;
    }
  }
  return below;
}

/** Weight of a node: 1 over the sum of the squared orthonormal polynomials there. */
function christoffel(alpha: Float64Array, beta: Float64Array, x: number): number {
  let before = 0;
  let now = 1;
  let sum = 1;
  for (let k = 0; k + 1 < alpha.length; k++) {
    const next =
      ((x - alpha[k]!) * now - (k === 0 ? 0 : Math.sqrt(beta[k]!) * before)) / Math.sqrt(beta[k + 1]!);
    before = now;
    now = next;
    sum += now * now;
  }
  return 1 / sum;
}
