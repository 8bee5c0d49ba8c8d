import { lightSpectrum } from './light.ts';
import { apply3, bradford, invert3, type Matrix3, multiply3 } from './matrix3.ts';
import { naturalReflectances } from './naturalReflectances.ts';
import { observerWeights, whiteOf } from './observer.ts';
import { SENSOR_COMPONENTS, sensorComponents } from './sensorFamily.ts';
import type { Light, RgbEncoding } from './types.ts';

/** The colour matrix of an image processor, for any camera of the family under one light. */
export interface MatrixMaker {
  /**
   * White-preserving matrix from white-balanced sensor values to linear RGB, row-major; rows sum to one exactly.
   * @param coefficients nine sensor coefficients, see `sensorCurves`
   */
  readonly matrixFor: (coefficients: ArrayLike<number>) => Matrix3;
}

/**
 * Prepares the least-squares matrix that an image processor would fit: from white-balanced sensor values of natural
 * reflectances to their CIE 1931 colour under the light (adapted by Bradford to the encoding's white), white kept.
 *
 * Sums over wavelength are taken once; a matrix then costs a few thousand multiplications.
 */
export function matrixMaker(light: Light, encoding: RgbEncoding, wavelengthNm: Float64Array): MatrixMaker {
  const n = wavelengthNm.length;
  const surfaces = naturalReflectances(wavelengthNm);
  const power = lightSpectrum(light, wavelengthNm);
  const observer = observerWeights('cie1931', light, wavelengthNm).weights;
  const toRgb = multiply3(
    invert3(encoding.toXyz),
    bradford(whiteOf('cie1931', light, wavelengthNm), encoding.whiteXyz),
  );
  const target = new Float64Array(3 * surfaces.length);
  surfaces.forEach((reflectance, k) => {
    const xyz = [0, 0, 0];
    for (let c = 0; c < 3; c++) for (let i = 0; i < n; i++) xyz[c]! += observer[c * n + i]! * reflectance[i]!;
    target.set(apply3(toRgb, xyz), 3 * k);
  });
  // Sensor component sums of each surface, then of white, 12 each.
  const components = sensorComponents(wavelengthNm);
  const rows = 3 * SENSOR_COMPONENTS;
  const sums = new Float64Array(rows * (surfaces.length + 1));
  for (let k = 0; k <= surfaces.length; k++) {
    const reflectance = surfaces[k];
    for (let row = 0; row < rows; row++) {
      let sum = 0;
      for (let i = 0; i < n; i++)
        sum += components[row * n + i]! * power[i]! * (reflectance ? reflectance[i]! : 1);
      sums[rows * k + row] = sum;
    }
  }
  const sensor = new Float64Array(3 * surfaces.length);

  function matrixFor(a: ArrayLike<number>): Matrix3 {
    const channel = (k: number, c: number) => {
      const at = rows * k + c * SENSOR_COMPONENTS;
      return (
        sums[at]! + a[3 * c]! * sums[at + 1]! + a[3 * c + 1]! * sums[at + 2]! + a[3 * c + 2]! * sums[at + 3]!
      );
    };
    for (let c = 0; c < 3; c++) {
      const white = channel(surfaces.length, c);
      for (let k = 0; k < surfaces.length; k++) sensor[3 * k + c] = channel(k, c) / white;
    }
    const matrix = new Float64Array(9);
    for (let row = 0; row < 3; row++) solveRow(row, sensor, target, matrix);
    return matrix;
  }
  return { matrixFor };
}

/** Least squares for one row with its entries summing to one: two free entries, normal equations 2 x 2. */
function solveRow(row: number, sensor: Float64Array, target: Float64Array, matrix: Matrix3): void {
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
