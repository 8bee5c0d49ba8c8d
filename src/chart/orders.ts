import { reflectanceTable } from '../optics/reflectanceTable.ts';
import type { FilmStack } from '../optics/types.ts';

/** Middle of the eye's and the sensors' sensitivity, where orders are counted. */
const ORDER_WAVELENGTH_NM = 550;
/** Contrast of a fringe below which its minimum is no longer an order's end. */
const LEAST_CONTRAST = 1e-6;

/**
 * Thicknesses where one interference order ends and the next begins: the minima of the stack's own reflectance at
 * 550 nm. Order 1 reaches from 0 to the first of them and holds the first bright band. Phase flips need no rule: a
 * soap film and oil on water are darkest at 0, a coating between is brightest there, and the minima say so.
 * @param maxNm thickness up to which boundaries are listed
 */
export function orderBoundaries(stack: FilmStack, incidenceRad: number, maxNm: number): number[] {
  const stepNm = 1;
  const count = Math.ceil(maxNm / stepNm) + 2;
  const table = reflectanceTable(stack, {
    thicknessNm: Float64Array.from({ length: count }, (_, j) => j * stepNm),
    wavelengthNm: Float64Array.of(ORDER_WAVELENGTH_NM),
    incidenceRad,
    polarisation: 's',
  });
  const boundaries: number[] = [];
  for (let j = 1; j < count - 1; j++) {
    const before = table[j - 1]!;
    const here = table[j]!;
    const after = table[j + 1]!;
    if (!(here < before && here <= after)) continue;
    const bend = before - 2 * here + after;
    if (bend < LEAST_CONTRAST * 1e-3) continue;
    const at = (j + (before - after) / (2 * bend)) * stepNm;
    if (at <= maxNm) boundaries.push(at);
  }
  return boundaries;
}

/** Order of a thickness: one more than the boundaries below it, at most 254. */
export function orderOf(thicknessNm: number, boundariesNm: readonly number[]): number {
  let order = 1;
  for (const boundary of boundariesNm) {
    if (thicknessNm < boundary) break;
    order++;
  }
  return Math.min(254, order);
}
