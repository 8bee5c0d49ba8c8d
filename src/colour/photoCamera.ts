import { matrixMaker } from './cameraMatrix.ts';
import { lightSpectrum } from './light.ts';
import type { Matrix3 } from './matrix3.ts';
import { SENSOR_DEPARTURES, sensorDepartures } from './sensorDepartures.ts';
import { SENSOR_COMPONENTS, sensorComponents, sensorCurves } from './sensorFamily.ts';
import type { ChannelWeights, Light, RgbEncoding } from './types.ts';

/**
 * Weights of a photo camera: linear RGB of a reflectance in the encoding's primaries, a perfect white giving (1, 1, 1).
 * White balance divides each channel by its white; the matrix is the one an image processor would fit.
 * @param coefficients nine sensor coefficients; zeros are the family's mean camera
 */
export function cameraWeights(
  coefficients: ArrayLike<number>,
  light: Light,
  encoding: RgbEncoding,
  wavelengthNm: Float64Array,
): ChannelWeights {
  const matrix = matrixMaker(light, encoding, wavelengthNm).matrixFor(coefficients);
  const rows = sensorRows(sensorCurves(coefficients, wavelengthNm), light, wavelengthNm);
  return { wavelengthNm, weights: mixRows(matrix, rows) };
}

/** Sensitivities times light, each row with unit sum, 3 x n. */
export function sensorRows(
  sensitivities: Float64Array,
  light: Light,
  wavelengthNm: Float64Array,
): Float64Array {
  const n = wavelengthNm.length;
  const power = lightSpectrum(light, wavelengthNm);
  const rows = new Float64Array(3 * n);
  for (let c = 0; c < 3; c++) {
    let sum = 0;
    for (let i = 0; i < n; i++) {
      rows[c * n + i] = sensitivities[c * n + i]! * power[i]!;
      sum += rows[c * n + i]!;
    }
    for (let i = 0; i < n; i++) rows[c * n + i]! /= sum;
  }
  return rows;
}

/** Rows of a matrix times three spectra. */
function mixRows(matrix: Matrix3, rows: Float64Array): Float64Array {
  const n = rows.length / 3;
  const out = new Float64Array(3 * n);
  for (let c = 0; c < 3; c++) {
    for (let s = 0; s < 3; s++) {
      const m = matrix[3 * c + s]!;
      for (let i = 0; i < n; i++) out[c * n + i]! += m * rows[s * n + i]!;
    }
  }
  return out;
}

/** Rows of a channel in `cameraBasis`: the family's mean and components, then the departures from it. */
export const BASIS_ROWS = SENSOR_COMPONENTS + SENSOR_DEPARTURES;

/**
 * The family's components and departures under a light, not normalised: 3 x BASIS_ROWS rows of component times light
 * power. Their products with a reflectance are what a fit mixes; their plain sums are the white that it divides by.
 */
export function cameraBasis(light: Light, wavelengthNm: Float64Array): Float64Array {
  const n = wavelengthNm.length;
  const power = lightSpectrum(light, wavelengthNm);
  const family = sensorComponents(wavelengthNm);
  const departures = sensorDepartures(wavelengthNm);
  const rows = new Float64Array(3 * BASIS_ROWS * n);
  for (let c = 0; c < 3; c++) {
    const own = SENSOR_COMPONENTS * n;
    rows.set(family.subarray(c * own, (c + 1) * own), c * BASIS_ROWS * n);
    const beyond = SENSOR_DEPARTURES * n;
    rows.set(departures.subarray(c * beyond, (c + 1) * beyond), c * BASIS_ROWS * n + own);
  }
  for (let row = 0; row < 3 * BASIS_ROWS; row++) {
    for (let i = 0; i < n; i++) rows[row * n + i]! *= power[i]!;
  }
  return rows;
}
