import { COVER_90, type MapRows } from './mapPixels.ts';
import { PIXEL_STATUS } from './types.ts';

/** A pair may differ from the pixel by this many standard deviations and still speak for it. */
const AGREE = 2.5;
/** Noise of neighbouring pixels is not independent: compression shares it out over blocks and shrunk colour planes. */
const CORRELATION = 2;

/**
 * Averages each reading with pairs of neighbours on opposite sides of it.
 *
 * A pair's mean stands for the centre on any even slope, so ramps stay as they are; a pair that straddles an edge
 * disagrees with the centre and is left out. Returns the share of each pixel's own noise variance that is left.
 * @param bareNm readings below this are bare surface and stay as they are
 * @param reach 1 for 3 x 3 (four pairs), 2 for 5 x 5 (twelve pairs)
 */
export function smoothRows(rows: MapRows, width: number, reach: 1 | 2, bareNm = 0): Float32Array {
  const height = rows.toRow - rows.fromRow;
  const { thicknessNm, lowNm, highNm, status } = rows;
  const source = thicknessNm.slice();
  const share = new Float32Array(thicknessNm.length).fill(1);
  const offsets: number[] = [];
  for (let dy = 0; dy <= reach; dy++) {
    for (let dx = -reach; dx <= reach; dx++) if (dy > 0 || dx > 0) offsets.push(dy * width + dx);
  }
  const pairs = Int32Array.from(offsets);
  const variance = new Float32Array(thicknessNm.length);
  for (let i = 0; i < variance.length; i++) {
    const measured = status[i] === PIXEL_STATUS.measured || status[i] === PIXEL_STATUS.ambiguous;
    variance[i] =
      measured && thicknessNm[i]! >= bareNm
        ? Math.max(0.01, ((highNm[i]! - lowNm[i]!) / (2 * COVER_90)) ** 2)
        : 0;
  }
  const agree = AGREE * AGREE;
  for (let y = reach; y < height - reach; y++) {
    for (let x = reach; x < width - reach; x++) {
      const i = y * width + x;
      const own = variance[i]!;
      if (own === 0) continue;
      const centre = source[i]!;
      let weight = 1 / own;
      let sum = centre / own;
      for (let k = 0; k < pairs.length; k++) {
        const a = i - pairs[k]!;
        const b = i + pairs[k]!;
        const va = variance[a]!;
        const vb = variance[b]!;
        if (va === 0 || vb === 0) continue;
        const spread = (va + vb) / 4;
        const mean = (source[a]! + source[b]!) / 2;
        const gap = mean - centre;
        if (gap * gap > agree * (own + spread)) continue;
        const precision = 1 / spread;
        weight += precision;
        sum += mean * precision;
      }
      const moved = sum / weight;
      thicknessNm[i] = moved;
      lowNm[i]! += moved - centre;
      highNm[i]! += moved - centre;
      share[i] = Math.min(1, CORRELATION / (weight * own));
    }
  }
  return share;
}
