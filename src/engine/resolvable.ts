import type { CodeChart } from '../match/codeChart.ts';
import { COVER_90 } from '../match/mapPixels.ts';

/** Stated width: a 90 % interval narrower than this counts as resolved. */
export const STATED_WIDTH_NM = 60;

/**
 * Thicknesses over which one pixel of this photo tells thickness to a 90 % interval narrower than the stated width,
 * its order given: from the chart's slope and the pixel's covariance (Cramer-Rao).
 */
export function resolvableRange(
  chart: CodeChart,
  widthNm = STATED_WIDTH_NM,
): { fromNm: number; toNm: number } {
  const { count, codes, precision, thicknessNm } = chart;
  let from = -1;
  let to = -1;
  for (let j = 0; j < count; j++) {
    const before = Math.max(0, j - 1);
    const after = Math.min(count - 1, j + 1);
    const span = thicknessNm[after]! - thicknessNm[before]!;
    const x = (codes[3 * after]! - codes[3 * before]!) / span;
    const y = (codes[3 * after + 1]! - codes[3 * before + 1]!) / span;
    const z = (codes[3 * after + 2]! - codes[3 * before + 2]!) / span;
    const w = 6 * j;
    const information =
      precision[w]! * x * x +
      precision[w + 1]! * y * y +
      precision[w + 2]! * z * z +
      2 * (precision[w + 3]! * x * y + precision[w + 4]! * x * z + precision[w + 5]! * y * z);
    if (2 * COVER_90 > widthNm * Math.sqrt(information)) continue;
    if (from < 0) from = j;
    to = j;
  }
  return from < 0 ? { fromNm: 0, toNm: 0 } : { fromNm: thicknessNm[from]!, toNm: thicknessNm[to]! };
}
