import { orderOf } from '../chart/orders.ts';
import { type ActivityMap, BLOCK_SIDE } from '../match/activity.ts';
import type { SettledField } from '../match/mapPixels.ts';
import type { PixelReader } from '../match/pixelReader.ts';
import { MODE_FIELDS } from '../match/posterior.ts';
import { STATED_SMOOTHNESS } from '../match/resolveOrders.ts';
import type { Reading } from '../match/types.ts';
import type { PhotoPixels } from '../photo/types.ts';
import type { Calibration } from './calibrate.ts';
import type { Probe } from './contract.ts';
import { seenAt } from './seenAngles.ts';

/** Step of the posterior curve that a probe hands over, nm. */
const CURVE_STEP_NM = 2;

/**
 * All that is known of one pixel, but for what the map says there (the caller has the map).
 * @returns null outside the photo
 */
export function probePixel(
  pixels: PhotoPixels,
  calibration: Calibration,
  reader: PixelReader,
  activity: ActivityMap,
  settled: SettledField,
  x: number,
  y: number,
): Omit<Probe, 'status' | 'mapThicknessNm' | 'mapLowNm' | 'mapHighNm'> | null {
  if (!(x >= 0 && y >= 0 && x < pixels.width && y < pixels.height)) return null;
  const at = (y * pixels.width + x) * pixels.channels;
  const scale = 255 / pixels.maxCode;
  const seen: [number, number, number] = [0, 1, 2].map((c) => pixels.codes[at + c]! * scale) as [
    number,
    number,
    number,
  ];
  const block = ((y / BLOCK_SIDE) | 0) * activity.columns + ((x / BLOCK_SIDE) | 0);
  const { charts, scale: perChart, orderBoundariesNm } = seenAt(calibration)(x, y);
  const chart = charts[activity.classOf[block]!]!;
  const stride = Math.max(1, Math.round(CURVE_STEP_NM / chart.thicknessNm[1]!));
  const count = Math.floor((chart.count - 1) / stride) + 1;
  const thicknessNm = Float32Array.from(
    { length: count },
    (_, k) => perChart * chart.thicknessNm[k * stride]!,
  );
  const costs = Float64Array.from({ length: count }, (_, k) => costAt(chart, k * stride, seen));
  const stepNm = perChart * stride * chart.thicknessNm[1]!;
  const around = neighbourCosts(settled, x, y, thicknessNm);
  const readings = readingsAt(reader, x, y, calibration.rules.outlierDistance, orderBoundariesNm);
  const best = readings[0];
  const label = best ? Math.round(best.thicknessNm / (perChart * chart.thicknessNm[1]!)) : -1;
  return {
    x,
    y,
    seen,
    matched:
      label >= 0 ? [chart.codes[3 * label]!, chart.codes[3 * label + 1]!, chart.codes[3 * label + 2]!] : null,
    thicknessNm,
    posteriorAlone: density(costs, stepNm),
    posteriorWithNeighbours: density(
      costs.map((c, k) => c + around[k]!),
      stepNm,
    ),
    orderBoundariesNm,
    readings,
  };
}

function costAt(chart: Calibration['charts'][number], j: number, seen: readonly number[]): number {
  const x = seen[0]! - chart.codes[3 * j]!;
  const y = seen[1]! - chart.codes[3 * j + 1]!;
  const z = seen[2]! - chart.codes[3 * j + 2]!;
  const p = chart.precision;
  const w = 6 * j;
  return (
    p[w]! * x * x +
    p[w + 1]! * y * y +
    p[w + 2]! * z * z +
    2 * (p[w + 3]! * x * y + p[w + 4]! * x * z + p[w + 5]! * y * z) +
    chart.logDeterminant[j]!
  );
}

/** Normalised density from costs (minus twice the log). */
function density(costs: Float64Array, stepNm: number): Float32Array {
  let least = Number.POSITIVE_INFINITY;
  for (const c of costs) if (c < least) least = c;
  const out = new Float32Array(costs.length);
  let sum = 0;
  for (let k = 0; k < out.length; k++) sum += out[k] = Math.exp((least - costs[k]!) / 2);
  for (let k = 0; k < out.length; k++) out[k]! /= sum * stepNm;
  return out;
}

/** What the settled places around a pixel make of each thickness (minus twice the log). */
function neighbourCosts(
  settled: SettledField,
  x: number,
  y: number,
  thicknessNm: Float32Array,
): Float64Array {
  const out = new Float64Array(thicknessNm.length);
  const { perNm, edge, perNmBeyond } = STATED_SMOOTHNESS;
  const column = Math.round(x / settled.spacing);
  const row = Math.round(y / settled.spacing);
  for (const [dx, dy] of [
    [-1, 0],
    [1, 0],
    [0, -1],
    [0, 1],
  ] as const) {
    const c = column + dx;
    const r = row + dy;
    if (c < 0 || r < 0 || c >= settled.width || r >= settled.height) continue;
    const d = settled.thicknessNm[r * settled.width + c]!;
    if (Number.isNaN(d)) continue;
    for (let k = 0; k < out.length; k++) {
      const gap = Math.abs(thicknessNm[k]! - d);
      out[k]! += 2 * Math.min((perNm / settled.spacing) * gap, edge + perNmBeyond * gap);
    }
  }
  return out;
}

function readingsAt(
  reader: PixelReader,
  x: number,
  y: number,
  outlierDistance: number,
  orderBoundariesNm: readonly number[],
): Reading[] {
  const offset = reader.lookUp(x, y);
  const { records, scale } = reader;
  if (records[offset + 1]! > outlierDistance) return [];
  const count = records[offset]!;
  const best = records[offset + 2 + 3]!;
  const readings: (Reading & { weight: number })[] = [];
  let total = 0;
  for (let k = 0; k < count; k++) {
    const mode = offset + 2 + k * MODE_FIELDS;
    const weight = Math.exp((best - records[mode + 3]!) / 2);
    total += weight;
    readings.push({
      thicknessNm: records[mode]! * scale,
      lowNm: records[mode + 1]! * scale,
      highNm: records[mode + 2]! * scale,
      order: orderOf(records[mode]! * scale, orderBoundariesNm),
      share: 0,
      weight,
    });
  }
  return readings.map(({ weight, ...reading }) => ({ ...reading, share: weight / total }));
}
