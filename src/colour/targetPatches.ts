import { PATCH_THOUSANDTHS } from './data/targetPatches.ts';
import { sampleAt } from './sampled.ts';

/** Layout of the 24-patch colour target. */
export const TARGET_COLUMNS = 6;
export const TARGET_ROWS = 4;
export const TARGET_PATCHES = TARGET_COLUMNS * TARGET_ROWS;

/** Reflectance 0..1 of the 24 patches, row by row from dark skin to black: 24 x wavelengths. */
export function targetReflectances(wavelengthNm: Float64Array): Float64Array {
  const n = wavelengthNm.length;
  const table = new Float64Array(TARGET_PATCHES * n);
  PATCH_THOUSANDTHS.forEach((values, k) => {
    const row = sampleAt({ startNm: 380, stepNm: 10, values }, wavelengthNm);
    for (let i = 0; i < n; i++) table[k * n + i] = row[i]! / 1000;
  });
  return table;
}
