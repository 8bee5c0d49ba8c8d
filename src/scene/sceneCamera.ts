import { daylightSpectrum } from '../colour/light.ts';
import { apply3, invert3 } from '../colour/matrix3.ts';
import { observerWeights } from '../colour/observer.ts';
import { SRGB } from '../colour/rgb.ts';
import { FILM_WAVELENGTHS_NM } from '../colour/sampled.ts';
import { sensorCurves } from '../colour/sensorFamily.ts';
import { fitCameraMatrix, lightWeighted, rawResponses } from './cameraMatrix.ts';
import { type MeasuredSensor, measuredSensorCurves } from './measuredSensors.ts';
import { outsideSensorCurves } from './outsideSensor.ts';
import type { Random } from './random.ts';
import { randomReflectances } from './reflectances.ts';

/** A camera under one light: what it records of a reflectance, and the matrix its image processor applies. */
export interface SceneCamera {
  /** Sensitivity times light on `FILM_WAVELENGTHS_NM`, 3 x n, each channel of unit sum. */
  readonly rawWeights: Float64Array;
  /** Row-major 3 x 3, raw to linear sRGB, white kept; without any white balance error. */
  readonly matrix: Float64Array;
}

/** The spectra a matrix is fitted on, and the sRGB each would have under D65. One set a camera maker. */
function matrixTargets(random: Random): { spectra: Float64Array; wanted: Float64Array } {
  const spectra = randomReflectances(FILM_WAVELENGTHS_NM, 160, random);
  const xyz = rawResponses(
    spectra,
    observerWeights('cie1931', { illuminant: 'D65' }, FILM_WAVELENGTHS_NM).weights,
  );
  const toRgb = invert3(SRGB.toXyz);
  const wanted = new Float64Array(xyz.length);
  for (let i = 0; i < xyz.length; i += 3) {
    wanted.set(apply3(toRgb, xyz.subarray(i, i + 3)), i);
  }
  return { spectra, wanted };
}

/**
 * A camera from its sensor (nine coefficients of the family, a measured camera, or 'outside' for invented curves that are
 * none of the family) under a daylight.
 * The matrix is the white-preserving least-squares one onto the colours that the surfaces have under D65.
 */
export function sceneCamera(
  sensor: ArrayLike<number> | MeasuredSensor | 'outside',
  daylightK: number,
  random: Random,
): SceneCamera {
  const curves =
    sensor === 'outside'
      ? outsideSensorCurves(FILM_WAVELENGTHS_NM, random.fork('sensor'))
      : 'curves' in sensor
        ? measuredSensorCurves(sensor, FILM_WAVELENGTHS_NM)
        : sensorCurves(sensor, FILM_WAVELENGTHS_NM);
  const rawWeights = lightWeighted(curves, daylightSpectrum(daylightK, FILM_WAVELENGTHS_NM));
  const { spectra, wanted } = matrixTargets(random.fork('matrix'));
  return { rawWeights, matrix: fitCameraMatrix(rawResponses(spectra, rawWeights), wanted) };
}
