import { SENSOR_COMPONENTS, sensorComponents, sensorCurves } from '../../src/colour/sensorFamily.ts';

const sumOfSquares = (values: Float64Array) => values.reduce((total, v) => total + v * v, 0);

/** What a channel of one camera is to the family; norms are sums of squares over the wavelengths, curves of unit sum. */
export interface ChannelFit {
  readonly coefficients: readonly [number, number, number];
  readonly curve: number;
  /** Camera minus the family's mean. */
  readonly apart: number;
  /** Camera minus its best fit. */
  readonly left: number;
}

/**
 * The member of the family nearest to a camera, by least squares a channel. The components are at right angles (tested in
 * tests/reference/colour-sensor-family.test.ts), so each coefficient is one projection.
 * @param curves 3 x n, each of unit sum, on `wavelengthNm` (380 to 780 nm by 5 nm)
 */
export function fitFamily(curves: Float64Array, wavelengthNm: Float64Array): readonly ChannelFit[] {
  const n = wavelengthNm.length;
  const rows = sensorComponents(wavelengthNm);
  const apart = [0, 1, 2].map((c) => {
    const mean = rows.subarray(c * SENSOR_COMPONENTS * n);
    return Float64Array.from({ length: n }, (_, i) => curves[c * n + i]! - mean[i]!);
  });
  const coefficients = apart.map((deviation, c) =>
    [1, 2, 3].map((k) => {
      const component = rows.subarray((c * SENSOR_COMPONENTS + k) * n, (c * SENSOR_COMPONENTS + k + 1) * n);
      return deviation.reduce((t, v, i) => t + v * component[i]!, 0) / sumOfSquares(component);
    }),
  ) as [number, number, number][];
  const fitted = sensorCurves(coefficients.flat(), wavelengthNm);
  return apart.map((deviation, c) => ({
    coefficients: coefficients[c]!,
    curve: sumOfSquares(curves.subarray(c * n, (c + 1) * n)),
    apart: sumOfSquares(deviation),
    left: sumOfSquares(fitted.subarray(c * n, (c + 1) * n).map((v, i) => curves[c * n + i]! - v)),
  }));
}
