import { lightSpectrum } from './light.ts';
import { apply3, bradford, invert3, type Matrix3, multiply3 } from './matrix3.ts';
import { naturalReflectances } from './naturalReflectances.ts';
import { observerWeights, whiteOf } from './observer.ts';
import type { Light, RgbEncoding } from './types.ts';

/**
 * What an image processor aims at: linear RGB of the natural surfaces as the CIE 1931 observer sees them under the
 * light, adapted by Bradford from the light to the encoding's white.
 * @returns 3 a surface
 */
export function surfaceTargets(
  surfaces: readonly Float64Array[],
  light: Light,
  encoding: RgbEncoding,
  wavelengthNm: Float64Array,
): Float64Array {
  const n = wavelengthNm.length;
  const observer = observerWeights('cie1931', light, wavelengthNm).weights;
  const white = whiteOf('cie1931', light, wavelengthNm);
  const toRgb = multiply3(invert3(encoding.toXyz), bradford(white, encoding.whiteXyz));
  const target = new Float64Array(3 * surfaces.length);
  surfaces.forEach((reflectance, k) => {
    const xyz = [0, 0, 0];
    for (let c = 0; c < 3; c++) for (let i = 0; i < n; i++) xyz[c]! += observer[c * n + i]! * reflectance[i]!;
    target.set(apply3(toRgb, xyz), 3 * k);
  });
  return target;
}

/**
 * The 3 x 3 matrix, row-major, that takes `sensor` closest to `target` (least squares over the surfaces) among all
 * whose rows sum to one, so that white (1, 1, 1) stays white. Not finite where two channels cannot be told apart.
 * @param sensor white-balanced sensor values, 3 a surface, 1 for a perfect white
 * @param target wanted values, 3 a surface
 */
export function fitKeepingWhite(sensor: Float64Array, target: Float64Array): Matrix3 {
  const matrix = new Float64Array(9);
  for (let row = 0; row < 3; row++) fitRow(row, sensor, target, matrix);
  return matrix;
}

/** One row: with the sum fixed two entries are free, and the normal equations are 2 x 2. */
function fitRow(row: number, sensor: Float64Array, target: Float64Array, matrix: Matrix3): void {
  const p = (row + 1) % 3;
  const q = (row + 2) % 3;
  let pp = 0;
  let pq = 0;
  let qq = 0;
  let pt = 0;
  let qt = 0;
  for (let k = 0; k < sensor.length; k += 3) {
    const u = sensor[k + p]! - sensor[k + row]!;
    const v = sensor[k + q]! - sensor[k + row]!;
    const t = target[k + row]! - sensor[k + row]!;
    pp += u * u;
    pq += u * v;
    qq += v * v;
    pt += u * t;
    qt += v * t;
  }
  const determinant = pp * qq - pq * pq;
  matrix[3 * row + p] = (pt * qq - qt * pq) / determinant;
  matrix[3 * row + q] = (qt * pp - pt * pq) / determinant;
  matrix[3 * row + row] = 1 - matrix[3 * row + p]! - matrix[3 * row + q]!;
}

/**
 * The colour matrix of a camera with any sensitivities (measured ones, say): from white-balanced sensor values to
 * linear RGB of the encoding, white kept. For cameras of the family `matrixMaker` gives the same, faster.
 * @param sensitivities 3 x n, any scale
 * @throws RangeError when two of the channels are alike, so that no matrix can part them
 */
export function whitePreservingMatrix(
  sensitivities: Float64Array,
  light: Light,
  encoding: RgbEncoding,
  wavelengthNm: Float64Array,
): Matrix3 {
  const n = wavelengthNm.length;
  const surfaces = naturalReflectances(wavelengthNm);
  const power = lightSpectrum(light, wavelengthNm);
  const sensor = new Float64Array(3 * surfaces.length);
  for (let c = 0; c < 3; c++) {
    let white = 0;
    for (let i = 0; i < n; i++) white += sensitivities[c * n + i]! * power[i]!;
    surfaces.forEach((reflectance, k) => {
      let sum = 0;
      for (let i = 0; i < n; i++) sum += sensitivities[c * n + i]! * power[i]! * reflectance[i]!;
      sensor[3 * k + c] = sum / white;
    });
  }
  const matrix = fitKeepingWhite(sensor, surfaceTargets(surfaces, light, encoding, wavelengthNm));
  // Alike channels leave only rounding in the determinant, so the entries are huge rather than infinite.
  if (!matrix.every((value) => Math.abs(value) < 1e6))
    throw new RangeError(
      'Two channels of this camera have the same sensitivity: no colour can be made of them.',
    );
  return matrix;
}
