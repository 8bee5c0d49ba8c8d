import { applyRows } from '../colour/applyWeights.ts';
import { apply3, bradford, invert3, multiply3 } from '../colour/matrix3.ts';
import { observerWeights, whiteOf } from '../colour/observer.ts';
import type { Light, RgbEncoding } from '../colour/types.ts';
import { blurredReflectanceTable } from '../optics/blur.ts';
import { COMPONENTS, type FilmBasis, type FilmScene, ROW } from './filmBasis.ts';

/**
 * The basis of an ideal camera: the CIE 1931 observer, shown in an RGB encoding (white adapted). Its sensor
 * coefficients do nothing; component 0 of each channel is the finished linear RGB.
 */
export function observerBasis(
  scene: FilmScene,
  light: Light,
  encoding: RgbEncoding,
  stepNm: number,
  count: number,
  wavelengthNm: Float64Array,
): FilmBasis {
  const n = wavelengthNm.length;
  const xyz = observerWeights('cie1931', light, wavelengthNm).weights;
  const toRgb = multiply3(
    invert3(encoding.toXyz),
    bradford(whiteOf('cie1931', light, wavelengthNm), encoding.whiteXyz),
  );
  const rows = new Float64Array(ROW * n);
  for (let i = 0; i < n; i++) {
    const rgb = apply3(toRgb, [xyz[i]!, xyz[n + i]!, xyz[2 * n + i]!]);
    for (let c = 0; c < 3; c++) rows[c * COMPONENTS * n + i] = rgb[c]!;
  }
  const table = blurredReflectanceTable(
    scene.stack,
    {
      thicknessNm: Float64Array.from({ length: count }, (_, j) => j * stepNm),
      wavelengthNm,
      incidenceRad: scene.incidenceRad,
      polarisation: scene.polarisation,
    },
    scene.blur,
  );
  const white = new Float64Array(ROW);
  for (let c = 0; c < 3; c++) white[c * COMPONENTS] = 1;
  return {
    stepNm,
    count,
    table: applyRows(rows, ROW, n, table),
    perIndex: new Float64Array(ROW * count),
    perMired: new Float64Array(ROW * count),
    white,
    whitePerMired: new Float64Array(ROW),
  };
}
