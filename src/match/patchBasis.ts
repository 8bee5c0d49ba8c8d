import { applyRows } from '../colour/applyWeights.ts';
import { cameraBasis } from '../colour/photoCamera.ts';
import type { Light } from '../colour/types.ts';
import { type FilmBasis, miredNeighbours, ROW, sumRows } from './filmBasis.ts';

/**
 * A basis whose rows are surfaces of known reflectance instead of film thicknesses: the fit of a camera to film then
 * serves for a colour target as well. An index there is none, so nothing depends on it.
 * @param reflectance surfaces x wavelengths
 */
export function patchBasis(reflectance: Float64Array, light: Light, wavelengthNm: Float64Array): FilmBasis {
  const n = wavelengthNm.length;
  const count = reflectance.length / n;
  const rows = cameraBasis(light, wavelengthNm);
  const neighbours = miredNeighbours(light);
  const perRow = new Float64Array(rows.length);
  if (neighbours) {
    const [cooler, warmer] = neighbours.map((k) => cameraBasis({ daylightK: k }, wavelengthNm));
    const span = 1e6 / neighbours[1] - 1e6 / neighbours[0];
    for (let i = 0; i < perRow.length; i++) perRow[i] = (warmer![i]! - cooler![i]!) / span;
  }
  return {
    stepNm: 1,
    count,
    table: applyRows(rows, ROW, n, reflectance),
    perIndex: new Float64Array(count * ROW),
    perMired: applyRows(perRow, ROW, n, reflectance),
    white: sumRows(rows),
    whitePerMired: sumRows(perRow),
  };
}
