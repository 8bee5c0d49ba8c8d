import type { MapRows } from './mapPixels.ts';
import { PIXEL_STATUS } from './types.ts';

/** A pixel this far from the median of its surroundings is no detail of a film: a film is smooth over a pixel or two. */
const SPECKLE_NM = 40;

/**
 * Replaces lone readings that no neighbour shares by the median of the neighbours: at a steep edge compression mixes
 * two colours into a third, which may lie on the chart at quite another order. The interval then spans what the
 * middle of the neighbours holds. Straight edges and thin ridges two pixels wide keep their place.
 */
export function mendSpeckles(rows: MapRows, width: number): void {
  const height = rows.toRow - rows.fromRow;
  const { thicknessNm, lowNm, highNm, status } = rows;
  const source = thicknessNm.slice();
  const near = new Float32Array(8);
  for (let y = 1; y < height - 1; y++) {
    for (let x = 1; x < width - 1; x++) {
      const i = y * width + x;
      const own = source[i]!;
      const before = source[i - 1]!;
      const after = source[i + 1]!;
      const above = source[i - width]!;
      const below = source[i + width]!;
      if (Number.isNaN(own)) continue;
      // Quick way out for the smooth majority: two opposite neighbours agree with the pixel.
      if (Math.abs(before - own) < SPECKLE_NM && Math.abs(after - own) < SPECKLE_NM) continue;
      if (Math.abs(above - own) < SPECKLE_NM && Math.abs(below - own) < SPECKLE_NM) continue;
      let count = 0;
      for (let dy = -1; dy <= 1; dy++) {
        for (let dx = -1; dx <= 1; dx++) {
          const value = source[i + dy * width + dx]!;
          if ((dx === 0 && dy === 0) || Number.isNaN(value)) continue;
          let place = count++;
          for (; place > 0 && near[place - 1]! > value; place--) near[place] = near[place - 1]!;
          near[place] = value;
        }
      }
      if (count < 5) continue;
      const median = near[count >> 1]!;
      if (Math.abs(median - own) < SPECKLE_NM) continue;
      let agree = 0;
      for (let k = 0; k < count; k++) if (Math.abs(near[k]! - own) < SPECKLE_NM) agree++;
      if (agree >= 3) continue;
      thicknessNm[i] = median;
      lowNm[i] = Math.max(0, near[1]! - SPECKLE_NM / 4);
      highNm[i] = near[count - 2]! + SPECKLE_NM / 4;
      status[i] = PIXEL_STATUS.measured;
    }
  }
}
