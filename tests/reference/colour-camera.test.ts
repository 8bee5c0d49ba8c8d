/**
 * The photo camera's colour matrix on surfaces that it was not fitted to: the 24 measured patches of a chart (Ohta 1997).
 */
import { describe, expect, test } from 'vitest';
import { applyWeights } from '../../src/colour/applyWeights.ts';
import { deltaE2000 } from '../../src/colour/deltaE2000.ts';
import { labFromXyz } from '../../src/colour/lab.ts';
import { apply3, bradford, invert3 } from '../../src/colour/matrix3.ts';
import { observerWeights, whiteOf } from '../../src/colour/observer.ts';
import { cameraWeights, sensorRows } from '../../src/colour/photoCamera.ts';
import { SRGB } from '../../src/colour/rgb.ts';
import { FILM_WAVELENGTHS_NM } from '../../src/colour/sampled.ts';
import { sensorCurves } from '../../src/colour/sensorFamily.ts';
import type { Light } from '../../src/colour/types.ts';
import { fitKeepingWhite } from '../../src/colour/whitePreservingMatrix.ts';
import { chartReflectances } from '../colour/chartReflectances.ts';

const grid = FILM_WAVELENGTHS_NM;
const patches = chartReflectances();
const meanCamera = new Float64Array(9);

/** XYZ of linear RGB triples. */
const toXyz = (rgb: Float64Array) => eachTriple(rgb, (triple) => apply3(SRGB.toXyz, triple));

function eachTriple(values: Float64Array, map: (triple: Float64Array) => number[]): Float64Array {
  const out = new Float64Array(values.length);
  for (let k = 0; k < values.length; k += 3) out.set(map(values.subarray(k, k + 3)), k);
  return out;
}

describe.each<readonly [string, Light]>([
  ['daylight of 5500 K', { daylightK: 5500 }],
  ['daylight of 6500 K', { daylightK: 6500 }],
  ['illuminant A', { illuminant: 'A' }],
])('%s', (_name, light) => {
  const adapt = bradford(whiteOf('cie1931', light, grid), SRGB.whiteXyz);
  const seen = eachTriple(applyWeights(observerWeights('cie1931', light, grid), patches), (xyz) =>
    apply3(adapt, xyz),
  );
  const wanted = labFromXyz(seen, SRGB.whiteXyz);
  /** Mean CIEDE2000 over the patches of a camera's linear RGB. */
  function meanError(rgb: Float64Array): number {
    const lab = labFromXyz(toXyz(rgb), SRGB.whiteXyz);
    let total = 0;
    for (let k = 0; k < 24; k++) total += deltaE2000(lab, k, wanted, k);
    return total / 24;
  }
  const sensor = applyWeights(
    { wavelengthNm: grid, weights: sensorRows(sensorCurves(meanCamera, grid), light, grid) },
    patches,
  );
  const ours = meanError(applyWeights(cameraWeights(meanCamera, light, SRGB, grid), patches));
  const inRgb = eachTriple(seen, (xyz) => apply3(invert3(SRGB.toXyz), xyz));
  const bestMatrix = fitKeepingWhite(sensor, inRgb);
  const best = meanError(eachTriple(sensor, (triple) => apply3(bestMatrix, triple)));

  test('is within half a just noticeable difference (0.5 CIEDE2000) of the matrix made for these very patches', () => {
    expect(ours).toBeLessThan(best + 0.5);
  });

  test('without a matrix the patches are several times further off', () => {
    expect(meanError(sensor)).toBeGreaterThan(3 * ours);
  });
});
