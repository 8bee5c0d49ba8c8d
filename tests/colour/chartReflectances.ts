import { FILM_WAVELENGTHS_NM, sampleAt } from '../../src/colour/sampled.ts';
import { figure, readTable } from './readTable.ts';

/** Measured reflectance of the 24 patches of a chart on the film grid, row by row. */
export function chartReflectances(): Float64Array {
  const rows = readTable('colour-checker-reflectance.csv');
  const n = FILM_WAVELENGTHS_NM.length;
  const table = new Float64Array(rows.length * n);
  rows.forEach((row, k) => {
    const values = Array.from({ length: 41 }, (_, i) => figure(row, String(380 + 10 * i)) / 1000);
    table.set(sampleAt({ startNm: 380, stepNm: 10, values }, FILM_WAVELENGTHS_NM), k * n);
  });
  return table;
}
