import { lightSpectrum } from './light.ts';
import type { Matrix3 } from './matrix3.ts';
import { naturalReflectances } from './naturalReflectances.ts';
import { SENSOR_COMPONENTS, sensorComponents } from './sensorFamily.ts';
import type { Light, RgbEncoding } from './types.ts';
import { fitKeepingWhite, surfaceTargets } from './whitePreservingMatrix.ts';

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
  const target = surfaceTargets(surfaces, light, encoding, wavelengthNm);
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
    return fitKeepingWhite(sensor, target);
  }
  return { matrixFor };
}
