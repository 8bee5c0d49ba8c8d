import { deltaE2000 } from '../colour/deltaE2000.ts';
import { orderOf } from './orders.ts';

/** Two thicknesses of different orders whose colours are hard to tell apart. */
export interface LookAlike {
  readonly aNm: number;
  readonly bNm: number;
  readonly deltaE: number;
}

/** Neighbours across an order's end look alike of course; pairs closer than this say nothing. */
const LEAST_APART_NM = 60;
/** Grid of the search, nm: finer than any band. */
const GRID_NM = 5;

/**
 * Near-coincidences between orders: pairs closer than `within` (CIEDE2000) that are the closest of their surroundings,
 * nearest colours first.
 * @param lab CIELAB triples at thickness j * stepNm
 */
export function lookAlikes(
  lab: ArrayLike<number>,
  stepNm: number,
  boundariesNm: readonly number[],
  within: number,
  upToNm: number,
): LookAlike[] {
  const stride = Math.max(1, Math.round(GRID_NM / stepNm));
  const count = Math.min(Math.floor(lab.length / 3 / stride), Math.floor(upToNm / (stride * stepNm)) + 1);
  const order = Uint8Array.from({ length: count }, (_, k) => orderOf(k * stride * stepNm, boundariesNm));
  const at = (i: number, j: number) =>
    i < 0 || j < 0 || i >= count || j >= count || order[i] === order[j]
      ? Number.POSITIVE_INFINITY
      : roughly(lab, i * stride, j * stride) > 4 * within
        ? Number.POSITIVE_INFINITY
        : deltaE2000(lab, i * stride, lab, j * stride);
  const found: LookAlike[] = [];
  for (let i = 0; i < count; i++) {
    for (let j = i + Math.ceil(LEAST_APART_NM / (stride * stepNm)); j < count; j++) {
      const own = at(i, j);
      if (!(own < within)) continue;
      if (own > at(i - 1, j) || own >= at(i + 1, j) || own > at(i, j - 1) || own >= at(i, j + 1)) continue;
      found.push({ aNm: i * stride * stepNm, bNm: j * stride * stepNm, deltaE: own });
    }
  }
  return found.sort((p, q) => p.deltaE - q.deltaE);
}

/** Euclidean distance in CIELAB: never far below CIEDE2000 for neutral colours, and quick. */
function roughly(lab: ArrayLike<number>, i: number, j: number): number {
  return Math.hypot(
    lab[3 * i]! - lab[3 * j]!,
    lab[3 * i + 1]! - lab[3 * j + 1]!,
    lab[3 * i + 2]! - lab[3 * j + 2]!,
  );
}
