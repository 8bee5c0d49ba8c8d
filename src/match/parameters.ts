/**
 * The unknowns between a film and its code values, their places in the parameter vector and their priors.
 *
 * code = tone(encode(gain * (matrix * sensor response) + veil)); see `cameraModel.ts`.
 */

import { SENSOR_DEPARTURES } from '../colour/sensorDepartures.ts';

/** Places in the parameter vector. */
export const AT = {
  /** Sensor family coefficients r1 r2 r3 g1 g2 g3 b1 b2 b3, each N(0, 1) over real cameras. */
  sensor: 0,
  /** Natural logarithm of the gain of red, green, blue. */
  logGain: 9,
  /** Light added to the film's, linear, as a share of full scale: flare, light coming up out of the water. */
  veil: 12,
  /** Strength of the S, the skew and the fourth-order part of the tone curve; see `toneCurve.ts`. */
  tone: 15,
  /** Film index minus its preset, common to all wavelengths. */
  index: 18,
  /** Colour temperature of the light minus the stated one, in mired. */
  mired: 19,
  /** Off-diagonal departures of the image processor's colour matrix: rg rb gr gb br bg (rows keep their sums). */
  matrix: 20,
  /** Departures of the sensor from the family, red's first; each N(0, 1), see `colour/sensorDepartures.ts`. */
  departure: 26,
} as const;
export const PARAMETERS = 26 + 3 * SENSOR_DEPARTURES;

/** Row and column of each departure of the colour matrix, in the order of the parameters. */
export const MATRIX_ENTRIES: readonly (readonly [number, number])[] = [
  [0, 1],
  [0, 2],
  [1, 0],
  [1, 2],
  [2, 0],
  [2, 1],
];

export const PARAMETER_NAMES: readonly string[] = [
  ...['red', 'green', 'blue'].flatMap((c) => [1, 2, 3].map((k) => `${c} sensitivity, component ${k}`)),
  ...['red', 'green', 'blue'].map((c) => `ln gain, ${c}`),
  ...['red', 'green', 'blue'].map((c) => `veil, ${c}`),
  'tone curve, S',
  'tone curve, skew',
  'tone curve, fourth order',
  'film index shift',
  'light, mired shift',
  ...['rg', 'rb', 'gr', 'gb', 'br', 'bg'].map((e) => `colour matrix ${e}`),
  ...['red', 'green', 'blue'].flatMap((c) =>
    Array.from({ length: SENSOR_DEPARTURES }, (_, k) => `${c} sensitivity, departure ${k + 1}`),
  ),
];

/** What is believed before the photo is looked at: a Gaussian by its mean and precision (inverse covariance). */
export interface Prior {
  readonly mean: Float64Array;
  /** Row-major PARAMETERS x PARAMETERS. */
  readonly precision: Float64Array;
}

export interface PriorSpread {
  /** Common part of the three gains: how well the exposure is known. */
  readonly commonGain: number;
  /** Each gain apart from the common part: errors of white balance. */
  readonly channelGain: number;
  /** Standard deviation of each veil, linear light. */
  readonly veil: number;
  /** The film material's own index spread. */
  readonly index: number;
  /** Zero for a lamp of known spectrum. */
  readonly mired: number;
  /** Scale of the sensor, tone and matrix spreads: 1 for a phone, near 0 for a known observer. */
  readonly camera?: number;
}

/** Spread of an ideal camera: nothing of it is fitted but exposure, balance and veil. */
export const FIXED_CAMERA = { camera: 1e-4, mired: 0 } as const;

/**
 * The stated priors. Sensor coefficients N(0, 1): Jiang, Liu, Gu, Susstrunk 2013 and the family's own making.
 * The tone spreads cover the S curves of phones as handed over by their image processors; the matrix spread covers
 * that makers fit theirs to other surfaces than ours (engineering judgement, not published).
 */
export function statedPrior(spread: PriorSpread, mean: Float64Array): Prior {
  const precision = new Float64Array(PARAMETERS * PARAMETERS);
  const set = (i: number, sd: number) => {
    precision[i * PARAMETERS + i] = 1 / Math.max(sd, 1e-6) ** 2;
  };
  const own = spread.camera ?? 1;
  for (let k = 0; k < 9; k++) set(AT.sensor + k, own);
  for (let c = 0; c < 3; c++) set(AT.veil + c, spread.veil);
  set(AT.tone, 0.25 * own);
  set(AT.tone + 1, 0.1 * own);
  set(AT.tone + 2, 0.05 * own);
  set(AT.index, spread.index);
  set(AT.mired, spread.mired);
  for (let k = 0; k < 6; k++) set(AT.matrix + k, 0.12 * own);
  for (let k = 0; k < 3 * SENSOR_DEPARTURES; k++) set(AT.departure + k, own);
  // Gains: covariance channel^2 I + common^2 11', inverted by Sherman-Morrison.
  const a = spread.channelGain ** 2;
  const b = spread.commonGain ** 2;
  for (let i = 0; i < 3; i++) {
    for (let j = 0; j < 3; j++) {
      precision[(AT.logGain + i) * PARAMETERS + AT.logGain + j] =
        (i === j ? 1 / a : 0) - b / (a * (a + 3 * b));
    }
  }
  return { mean, precision };
}
