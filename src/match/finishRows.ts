import { type AngleCharts, angleCursor, type CosineAt } from './angleCharts.ts';
import type { CodeChart } from './codeChart.ts';
import { COVER_90, type MapRows, type ReadingRules } from './mapPixels.ts';
import { PIXEL_STATUS } from './types.ts';

/** Orders, bare surface, lower bounds and the shared part of the intervals; `ownShare` is noise variance left after smoothing. */
export function finishRows(
  rows: MapRows,
  chart: CodeChart,
  rules: ReadingRules,
  ownShare: Float32Array | null,
): void {
  for (let i = 0; i < rows.status.length; i++) {
    if (!hasReading(rows, i)) continue;
    finishPixel(rows, i, chart, 1, rules.bareNm, rules.resolvableNm, ownShare ? ownShare[i]! : 1);
  }
}

/** The same where pixels look at different angles: each is finished by the chart nearest its own. */
export function finishAngleRows(
  rows: MapRows,
  width: number,
  angles: AngleCharts,
  cosineAt: CosineAt,
  rules: ReadingRules,
  ownShare: Float32Array | null,
): void {
  const cursor = angleCursor(angles, cosineAt);
  let i = 0;
  for (let y = rows.fromRow; y < rows.toRow; y++) {
    for (let x = 0; x < width; x++, i++) {
      if (!hasReading(rows, i)) continue;
      cursor.moveTo(x, y);
      const chart = angles.charts[cursor.near]![0]!;
      const resolvableNm = angles.resolvableNm[cursor.near]! * cursor.scale;
      const bareNm = (angles.bareNm?.[cursor.near] ?? rules.bareNm) * (angles.bareNm ? cursor.scale : 1);
      finishPixel(rows, i, chart, cursor.scale, bareNm, resolvableNm, ownShare ? ownShare[i]! : 1);
    }
  }
}

function hasReading(rows: MapRows, i: number): boolean {
  const status = rows.status[i]!;
  return status === PIXEL_STATUS.measured || status === PIXEL_STATUS.ambiguous;
}

/** @param scale thickness at the pixel for thickness on the chart */
function finishPixel(
  rows: MapRows,
  i: number,
  chart: CodeChart,
  scale: number,
  bareNm: number,
  resolvableNm: number,
  ownShare: number,
): void {
  const thickness = rows.thicknessNm[i]!;
  const place = Math.round(thickness / (chart.thicknessNm[1]! * scale));
  const label = Math.max(0, Math.min(chart.count - 1, place));
  const own = chart.noiseShare[label]! * ownShare;
  const shared = (COVER_90 * chart.sharedSdNm[label]! * scale) ** 2;
  const low = thickness - Math.sqrt((thickness - rows.lowNm[i]!) ** 2 * own + shared);
  const high = thickness + Math.sqrt((rows.highNm[i]! - thickness) ** 2 * own + shared);
  rows.lowNm[i] = Math.max(0, low);
  rows.highNm[i] = high;
  if (thickness < bareNm) {
    rows.status[i] = PIXEL_STATUS.bare;
    rows.thicknessNm[i] = 0;
    rows.lowNm[i] = 0;
    rows.highNm[i] = Math.max(high, bareNm);
    rows.order[i] = 0;
  } else if (thickness > resolvableNm) {
    rows.status[i] = PIXEL_STATUS.atLeast;
    rows.lowNm[i] = Math.min(low, resolvableNm);
    rows.thicknessNm[i] = Number.NaN;
    rows.highNm[i] = Number.NaN;
    rows.order[i] = 255;
  } else {
    rows.order[i] = chart.order[label]!;
  }
}
