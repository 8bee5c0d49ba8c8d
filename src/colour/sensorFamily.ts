import * as family from './data/sensorFamily.ts';
import { sampleAt } from './sampled.ts';

/** Components of a channel: the mean and three principal components. */
export const SENSOR_COMPONENTS = 4;

const TABLES: readonly (readonly ArrayLike<number>[])[] = [
  [family.RED_MEAN, family.RED_COMPONENT_1, family.RED_COMPONENT_2, family.RED_COMPONENT_3],
  [family.GREEN_MEAN, family.GREEN_COMPONENT_1, family.GREEN_COMPONENT_2, family.GREEN_COMPONENT_3],
  [family.BLUE_MEAN, family.BLUE_COMPONENT_1, family.BLUE_COMPONENT_2, family.BLUE_COMPONENT_3],
];

/**
 * The family's curves at the wavelengths given: 12 rows, channel by channel, mean first then the three components
 * (each one standard deviation over real cameras).
 */
export function sensorComponents(wavelengthNm: Float64Array): Float64Array {
  const n = wavelengthNm.length;
  const out = new Float64Array(12 * n);
  TABLES.forEach((channel, c) => {
    channel.forEach((values, k) => {
      out.set(sampleAt({ startNm: 380, stepNm: 5, values }, wavelengthNm), (c * SENSOR_COMPONENTS + k) * n);
    });
  });
  return out;
}

/**
 * Sensitivities of one camera of the family: mean + sum of coefficient times component, 3 x n.
 *
 * The model is linear, so a curve may dip a little below zero where the mean is near it; that is kept, because
 * clipping would make the fit's derivatives jump. At 5 nm over 380..780 each curve sums to one whatever the
 * coefficients (to 1e-5, the rounding of the figures): white balance, not the family, sets the gains.
 * @param coefficients r1 r2 r3 g1 g2 g3 b1 b2 b3, N(0, 1) over real cameras
 */
export function sensorCurves(coefficients: ArrayLike<number>, wavelengthNm: Float64Array): Float64Array {
  const n = wavelengthNm.length;
  const components = sensorComponents(wavelengthNm);
  const out = new Float64Array(3 * n);
  for (let c = 0; c < 3; c++) {
    for (let i = 0; i < n; i++) {
      let sum = components[c * 4 * n + i]!;
      for (let k = 0; k < 3; k++) sum += coefficients[3 * c + k]! * components[(c * 4 + k + 1) * n + i]!;
      out[c * n + i] = sum;
    }
  }
  return out;
}
