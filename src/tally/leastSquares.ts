/** Value of the model at the i-th observation for these parameters. */
export type Model = (parameters: Float64Array, i: number) => number;

export interface LeastSquaresFit {
  readonly parameters: Float64Array;
  /** Row-major covariance of the parameters from the stated standard deviations alone. */
  readonly covariance: Float64Array;
  /** Observed minus fitted, in the unit of the observations. */
  readonly residuals: Float64Array;
  readonly chiSquare: number;
  readonly degreesOfFreedom: number;
  readonly converged: boolean;
}

/**
 * Weighted nonlinear least squares by Levenberg-Marquardt (Marquardt 1963) for a handful of parameters: minimises
 * the sum of ((observed - model) / sd)^2. Derivatives by central differences, for which parameters should be scaled so
 * that a change of a hundredth is a small one (logarithms are).
 * @throws RangeError where there are no more observations than parameters, or a standard deviation is not positive
 */
export function leastSquares(
  model: Model,
  observed: Float64Array,
  sd: Float64Array,
  start: Float64Array,
): LeastSquaresFit {
  const count = observed.length;
  const size = start.length;
  if (count <= size || sd.length !== count) {
    throw new RangeError(
      `A fit of ${size} parameters needs more than ${size} readings with an interval each.`,
    );
  }
  if (sd.some((value) => !(value > 0))) {
    throw new RangeError('Every reading needs an interval wider than nothing.');
  }
  let parameters = start.slice();
  let chiSquare = chiSquareOf(model, observed, sd, parameters);
  let damping = 1e-3;
  let converged = false;
  for (let round = 0; round < 200 && !converged; round++) {
    const { normal, gradient } = normalEquations(model, observed, sd, parameters);
    let better = false;
    while (!better && damping < 1e12) {
      const damped = normal.slice();
      for (let k = 0; k < size; k++) {
        damped[k * size + k]! *= 1 + damping;
      }
      const step = solve(damped, gradient, size);
      const trial = parameters.map((value, k) => value + (step?.[k] ?? Number.NaN));
      const trialChiSquare = chiSquareOf(model, observed, sd, trial);
      if (step && trialChiSquare <= chiSquare) {
        const gain = chiSquare - trialChiSquare;
        const still = trial.every((value, k) => Math.abs(value - parameters[k]!) <= 1e-12 * Math.abs(value));
        parameters = trial;
        chiSquare = trialChiSquare;
        damping = Math.max(1e-12, damping / 10);
        better = true;
        converged = still || gain <= 1e-14 * chiSquare;
      } else {
        damping *= 10;
      }
    }
    converged ||= !better;
  }
  const { normal } = normalEquations(model, observed, sd, parameters);
  return {
    parameters,
    covariance: inverse(normal, size),
    residuals: observed.map((value, i) => value - model(parameters, i)),
    chiSquare,
    degreesOfFreedom: count - size,
    converged: converged && Number.isFinite(chiSquare),
  };
}

function chiSquareOf(
  model: Model,
  observed: Float64Array,
  sd: Float64Array,
  parameters: Float64Array,
): number {
  let sum = 0;
  for (let i = 0; i < observed.length; i++) {
    sum += ((observed[i]! - model(parameters, i)) / sd[i]!) ** 2;
  }
  return sum;
}

function normalEquations(model: Model, observed: Float64Array, sd: Float64Array, parameters: Float64Array) {
  const size = parameters.length;
  const normal = new Float64Array(size * size);
  const gradient = new Float64Array(size);
  const slope = new Float64Array(size);
  const moved = parameters.slice();
  for (let i = 0; i < observed.length; i++) {
    for (let k = 0; k < size; k++) {
      const step = 1e-6 * Math.max(1e-2, Math.abs(parameters[k]!));
      moved[k] = parameters[k]! + step;
      const above = model(moved, i);
      moved[k] = parameters[k]! - step;
      slope[k] = (above - model(moved, i)) / (2 * step * sd[i]!);
      moved[k] = parameters[k]!;
    }
    const miss = (observed[i]! - model(parameters, i)) / sd[i]!;
    for (let k = 0; k < size; k++) {
      gradient[k]! += slope[k]! * miss;
      for (let l = 0; l < size; l++) {
        normal[k * size + l]! += slope[k]! * slope[l]!;
      }
    }
  }
  return { normal, gradient };
}

/** Gauss-Jordan with pivoting on the equations scaled to a unit diagonal; null where they are singular. */
function solve(matrix: Float64Array, right: Float64Array, size: number): Float64Array | null {
  const scale = Float64Array.from({ length: size }, (_, k) => 1 / Math.sqrt(matrix[k * size + k]!));
  const rows = Array.from({ length: size }, (_, k) =>
    Float64Array.from({ length: size + 1 }, (_, l) =>
      l < size ? matrix[k * size + l]! * scale[k]! * scale[l]! : right[k]! * scale[k]!,
    ),
  );
  for (let k = 0; k < size; k++) {
    let pivot = k;
    for (let l = k + 1; l < size; l++) {
      if (Math.abs(rows[l]![k]!) > Math.abs(rows[pivot]![k]!)) {
        pivot = l;
      }
    }
    [rows[k], rows[pivot]] = [rows[pivot]!, rows[k]!];
    const head = rows[k]![k]!;
    if (!(Math.abs(head) > 1e-14)) {
      return null;
    }
    for (let l = 0; l < size; l++) {
      if (l !== k) {
        const factor = rows[l]![k]! / head;
        for (let m = k; m <= size; m++) {
          rows[l]![m]! -= factor * rows[k]![m]!;
        }
      }
    }
  }
  return Float64Array.from(rows, (row, k) => (row[size]! / row[k]!) * scale[k]!);
}

function inverse(matrix: Float64Array, size: number): Float64Array {
  const result = new Float64Array(size * size).fill(Number.NaN);
  for (let column = 0; column < size; column++) {
    const unit = new Float64Array(size);
    unit[column] = 1;
    const solved = solve(matrix, unit, size);
    for (let row = 0; row < size && solved; row++) {
      result[row * size + column] = solved[row]!;
    }
  }
  return result;
}
