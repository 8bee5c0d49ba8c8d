import type { MapRows } from './mapPixels.ts';

/** Pixels over which compression mixes the colours of both sides of an edge: colour is kept at half size. */
const REACH_PX = 2;
/** Thicknesses this far apart, nm, are two sides of an edge and no slope. */
const EDGE_NM = 30;
const HALF_NM = EDGE_NM / 2;

/**
 * Beside an edge a pixel's colour is a mixture, and its thickness may be that of either side or lie between: there the
 * interval is widened, in place, to hold both. Works on finished rows; pixels without a thickness stay as they are.
 */
export function widenAtEdges(rows: MapRows, width: number): void {
  const { thicknessNm, lowNm, highNm } = rows;
  const height = rows.toRow - rows.fromRow;
  const offsets = offsetsFor(width);
  for (let y = REACH_PX; y < height - REACH_PX; y++) {
    for (let x = REACH_PX; x < width - REACH_PX; x++) {
      const i = y * width + x;
      let least = thicknessNm[i]!;
      if (Number.isNaN(least)) continue;
      // Quick way out for the smooth majority: no step of half an edge on either side, along or across.
      const own = least;
      if (
        Math.abs(thicknessNm[i - REACH_PX]! - own) < HALF_NM &&
        Math.abs(thicknessNm[i + REACH_PX]! - own) < HALF_NM &&
        Math.abs(thicknessNm[i - REACH_PX * width]! - own) < HALF_NM &&
        Math.abs(thicknessNm[i + REACH_PX * width]! - own) < HALF_NM
      )
        continue;
      let most = least;
      for (let k = 0; k < offsets.length; k++) {
        // A neighbour without a thickness is NaN, which is neither less nor more.
        const near = thicknessNm[i + offsets[k]!]!;
        if (near < least) least = near;
        else if (near > most) most = near;
      }
      if (most - least < EDGE_NM) continue;
      if (least < lowNm[i]!) lowNm[i] = least;
      if (most > highNm[i]!) highNm[i] = most;
    }
  }
}

/** Steps in the arrays to the eight pixels on a ring about one. */
function offsetsFor(width: number): Int32Array {
  const ring: number[] = [];
  for (const dy of [-REACH_PX, 0, REACH_PX])
    for (const dx of [-REACH_PX, 0, REACH_PX]) if (dx !== 0 || dy !== 0) ring.push(dy * width + dx);
  return Int32Array.from(ring);
}
