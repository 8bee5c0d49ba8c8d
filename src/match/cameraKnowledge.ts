/**
 * What a fitted camera leaves for the next photo of the same phone: mean and covariance of the parameters that belong to
 * the phone. Gains, veil, light and film index belong to the photo and are not kept; their uncertainty is, because the
 * covariance is the marginal of the whole fit.
 */
import { SENSOR_DEPARTURES } from '../colour/sensorDepartures.ts';
import type { CameraFit } from './fitCamera.ts';
import { AT, MATRIX_ENTRIES, PARAMETERS, type Prior } from './parameters.ts';
import { inverseOf } from './symmetric.ts';

/** Places in the parameter vector that are kept: sensor, tone curve, colour matrix, the sensor's departures from its family. */
export const KEPT_PLACES: readonly number[] = [
  ...Array.from({ length: 9 }, (_, k) => AT.sensor + k),
  ...Array.from({ length: 3 }, (_, k) => AT.tone + k),
  ...Array.from({ length: 6 }, (_, k) => AT.matrix + k),
  ...Array.from({ length: 3 * SENSOR_DEPARTURES }, (_, k) => AT.departure + k),
];
export const KEPT = KEPT_PLACES.length;

/** A Gaussian over the kept parameters, in the order of `KEPT_PLACES`. */
export interface CameraKnowledge {
  readonly mean: Float64Array;
  /** Row-major KEPT x KEPT. */
  readonly covariance: Float64Array;
}

/**
 * How far one phone may be from itself between two photos, one standard deviation. Sensors do not change, but phones
 * have several lenses with a filter each; image processors bend the tone curve and turn the matrix by scene and light.
 * Engineering judgement, not published.
 */
const CHANGE = { sensor: 0.1, tone: [0.04, 0.02, 0.01], matrix: 0.03 } as const;
/**
 * White balance of either photo may be off by this share in each channel. Applied before the matrix (as most image
 * processors do) such an error comes out as a turned matrix; see `turnedBy`. Engineering judgement.
 */
const BALANCE_SD = 0.08;

/** The marginal of a fit over the parameters that belong to the phone. */
export function cameraKnowledge(fit: Pick<CameraFit, 'parameters' | 'covariance'>): CameraKnowledge {
  const covariance = new Float64Array(KEPT * KEPT);
  for (let i = 0; i < KEPT; i++) {
    for (let j = 0; j < KEPT; j++) {
      covariance[i * KEPT + j] = fit.covariance[KEPT_PLACES[i]! * PARAMETERS + KEPT_PLACES[j]!]!;
    }
  }
  return { mean: Float64Array.from(KEPT_PLACES, (p) => fit.parameters[p]!), covariance };
}

/**
 * The same camera at its next photo: as known, and what may have changed on top.
 * @param matrix the camera's colour matrix, row-major 3 x 3, rows summing to one
 */
export function atNextPhoto(known: CameraKnowledge, matrix: ArrayLike<number>): CameraKnowledge {
  const covariance = known.covariance.slice();
  for (let i = 0; i < KEPT; i++) {
    const sd = i < 9 || i >= 18 ? CHANGE.sensor : i < 12 ? CHANGE.tone[i - 9]! : CHANGE.matrix;
    covariance[i * KEPT + i]! += sd * sd;
  }
  const turned = turnedBy(matrix);
  for (let i = 0; i < 6; i++) {
    for (let j = 0; j < 6; j++) {
      let sum = 0;
      for (let k = 0; k < 3; k++) sum += turned[3 * i + k]! * turned[3 * j + k]!;
      covariance[(12 + i) * KEPT + 12 + j]! += 2 * BALANCE_SD ** 2 * sum;
    }
  }
  return { mean: known.mean, covariance };
}

/**
 * Change of the off-diagonal entries of M diag(1 + g), its rows scaled back to sum one, by the balance errors g:
 * d M_rc / d g_k = M_rc ((c = k) - M_rk) at g = 0; 6 x 3.
 */
function turnedBy(matrix: ArrayLike<number>): Float64Array {
  const out = new Float64Array(18);
  MATRIX_ENTRIES.forEach(([row, column], e) => {
    for (let k = 0; k < 3; k++)
      out[3 * e + k] = matrix[3 * row + column]! * ((column === k ? 1 : 0) - matrix[3 * row + k]!);
  });
  return out;
}

/**
 * The prior of a fit with what is known of the camera in the place of what is true of all cameras.
 * @throws RangeError when the covariance is not positive definite
 */
export function withCamera(prior: Prior, camera: CameraKnowledge): Prior {
  const mean = prior.mean.slice();
  const precision = prior.precision.slice();
  const own = inverseOf(camera.covariance, KEPT);
  KEPT_PLACES.forEach((p, i) => {
    mean[p] = camera.mean[i]!;
    for (let q = 0; q < PARAMETERS; q++) precision[p * PARAMETERS + q] = precision[q * PARAMETERS + p] = 0;
  });
  KEPT_PLACES.forEach((p, i) => {
    KEPT_PLACES.forEach((q, j) => {
      precision[p * PARAMETERS + q] = own[i * KEPT + j]!;
    });
  });
  return { mean, precision };
}

export interface Conflict {
  /** Squared distance between camera and fit, in the spread that their difference should have. */
  readonly chiSquare: number;
  readonly degrees: number;
  /** Chance of a distance at least this large were it the same camera. */
  readonly probability: number;
}

/** Directions of which the photo says less than this share count for little: their quotient would be noise over noise. */
const RIDGE = 0.05;

/**
 * Whether a fit agrees with the camera that was its prior. Where it does, the fit's departure from the prior's mean has
 * the covariance C - C' (prior minus posterior). The statistic is d' (C - C' + 0.05 C)^-1 d; its distribution is
 * matched by a scaled chi-square of the same mean and variance (Satterthwaite 1946, Biometrics Bulletin 2, 110).
 */
export function conflictWith(
  camera: CameraKnowledge,
  fit: Pick<CameraFit, 'parameters' | 'covariance'>,
): Conflict {
  const after = cameraKnowledge(fit);
  const learnt = camera.covariance.map((v, k) => v - after.covariance[k]!);
  const inverse = inverseOf(
    learnt.map((v, k) => v + RIDGE * camera.covariance[k]!),
    KEPT,
  );
  let distance = 0;
  let trace = 0;
  let traceOfSquare = 0;
  // share = inverse x learnt: how much of each direction the photo has told.
  const share = new Float64Array(KEPT * KEPT);
  for (let i = 0; i < KEPT; i++) {
    for (let j = 0; j < KEPT; j++) {
      distance +=
        (after.mean[i]! - camera.mean[i]!) * inverse[i * KEPT + j]! * (after.mean[j]! - camera.mean[j]!);
      for (let k = 0; k < KEPT; k++) share[i * KEPT + j]! += inverse[i * KEPT + k]! * learnt[k * KEPT + j]!;
    }
  }
  for (let i = 0; i < KEPT; i++) {
    trace += share[i * KEPT + i]!;
    for (let j = 0; j < KEPT; j++) traceOfSquare += share[i * KEPT + j]! * share[j * KEPT + i]!;
  }
  if (trace < 1e-6) return { chiSquare: 0, degrees: 0, probability: 1 };
  const degrees = trace ** 2 / traceOfSquare;
  const chiSquare = (distance * trace) / traceOfSquare;
  return { chiSquare, degrees, probability: chiSquareTail(chiSquare, degrees) };
}

/**
 * Upper tail of the chi-square distribution by the cube root's near normality (Wilson & Hilferty 1931, PNAS 17, 684);
 * good to 0.001 from five degrees of freedom on, and to a tenth of itself where it is 0.001: enough for a threshold.
 */
export function chiSquareTail(chiSquare: number, degrees: number): number {
  const spread = 2 / (9 * degrees);
  const z = (Math.cbrt(chiSquare / degrees) - (1 - spread)) / Math.sqrt(spread);
  return normalTail(z);
}

/** Upper tail of the standard normal distribution (Abramowitz & Stegun 1964, 26.2.17; error below 7.5e-8). */
function normalTail(z: number): number {
  const t = 1 / (1 + 0.2316419 * Math.abs(z));
  const series =
    t * (0.31938153 + t * (-0.356563782 + t * (1.781477937 + t * (-1.821255978 + t * 1.330274429))));
  const tail = (series * Math.exp(-0.5 * z * z)) / Math.sqrt(2 * Math.PI);
  return z >= 0 ? tail : 1 - tail;
}
