import type { ThicknessMap } from '../match/types.ts';

export const ROW_PROFILE_HEADER = 'row_px,pixels_measured,thickness_median_nm,low_median_nm,high_median_nm';

/** Median of the first `count` values, which are put in order. */
function median(values: Float32Array, count: number): number {
  const sorted = values.subarray(0, count).sort();
  const upper = sorted[count >> 1] ?? Number.NaN;
  return count % 2 === 1 ? upper : (upper + (sorted[(count >> 1) - 1] ?? Number.NaN)) / 2;
}

/**
 * Lines of the profile by row (RFC 4180): median thickness and medians of the 90 % interval's ends over the row's pixels
 * that have a thickness (bare ones count as 0 nm), nanometres. Rows without any are left out.
 * @returns a function from row to its line, or null
 */
export function rowProfile(map: ThicknessMap): (y: number) => string | null {
  const columns = [map.thicknessNm, map.lowNm, map.highNm].map((values) => ({
    values,
    row: new Float32Array(map.width),
  }));
  return (y) => {
    let count = 0;
    for (let i = y * map.width; i < (y + 1) * map.width; i++) {
      if (Number.isNaN(map.thicknessNm[i] ?? Number.NaN)) continue;
      for (const { values, row } of columns) row[count] = values[i] ?? Number.NaN;
      count++;
    }
    if (count === 0) return null;
    return [y, count, ...columns.map(({ row }) => median(row, count).toFixed(1))].join(',');
  };
}
