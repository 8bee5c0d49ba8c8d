import type { PhotoPixels } from '../photo/types.ts';
import { type CandidateField, MOST_CANDIDATES } from './candidates.ts';
import type { PixelReader } from './pixelReader.ts';
import { MODE_FIELDS } from './posterior.ts';
import { STATED_SMOOTHNESS } from './resolveOrders.ts';
import { PIXEL_STATUS, type PixelStatus } from './types.ts';

/** What is decided about pixels beyond their colour. */
export interface ReadingRules {
  /** Squared Mahalanobis distance beyond which a colour is no film. */
  readonly outlierDistance: number;
  /** Readings thinner than this are bare surface; 0 where the surface cannot be bare (a soap film in air). */
  readonly bareNm: number;
  /** Past this thickness colour tells nothing more: a lower bound. */
  readonly resolvableNm: number;
  /** A second order this close in cost leaves the pixel ambiguous. */
  readonly ambiguityMargin: number;
}

/** Cost of a reading is capped here (minus log): one odd pixel cannot outvote its neighbours. */
const MOST_COST = 6;
/** 90 % of a Gaussian lies within this many standard deviations. */
export const COVER_90 = 1.6448536;

/** Marks of pixels that take no part: outside the region, clipped, painted out. One byte a pixel; 0 = takes part. */
export type LeftOut = Uint8Array | null;

/** What the map says of a mark (`engine/leftOutMarks.ts`): clipped or rough places are seen and no film, others outside. */
export function statusOfLeftOut(mark: number): PixelStatus {
  return mark === 2 || mark === 5 ? PIXEL_STATUS.noFilmColour : PIXEL_STATUS.outside;
}

/** Fills rows [fromRow, toRow) of a candidate field from the photo. */
export function fillCandidates(
  pixels: Omit<PhotoPixels, 'encoding'>,
  reader: PixelReader,
  rules: ReadingRules,
  leftOut: LeftOut,
  field: CandidateField,
  fromRow: number,
  toRow: number,
): void {
  const { width } = pixels;
  const half = field.spacing >> 1;
  for (let row = fromRow; row < toRow; row++) {
    const y = Math.min(pixels.height - 1, row * field.spacing + half);
    for (let column = 0; column < field.width; column++) {
      const x = Math.min(width - 1, column * field.spacing + half);
      const pixel = y * width + x;
      const place = row * field.width + column;
      field.count[place] = 0;
      if (leftOut?.[pixel]) continue;
      const offset = reader.lookUp(x, y);
      const { records, scale } = reader;
      if (records[offset + 1]! > rules.outlierDistance) continue;
      const count = Math.min(records[offset]!, MOST_CANDIDATES);
      field.count[place] = count;
      const best = records[offset + 2 + 3]!;
      for (let k = 0; k < count; k++) {
        const mode = offset + 2 + k * MODE_FIELDS;
        const out = place * MOST_CANDIDATES + k;
        field.thicknessNm[out] = records[mode]! * scale;
        field.sdNm[out] = ((records[mode + 2]! - records[mode + 1]!) * scale) / (2 * COVER_90);
        field.cost[out] = Math.min(MOST_COST, (records[mode + 3]! - best) / 2);
      }
    }
  }
}

/** The rows of a thickness map; `mapRows` fills every place. */
export interface MapRows {
  readonly fromRow: number;
  readonly toRow: number;
  readonly thicknessNm: Float32Array;
  readonly lowNm: Float32Array;
  readonly highNm: Float32Array;
  readonly order: Uint8Array;
  readonly status: Uint8Array;
}

export function makeMapRows(width: number, fromRow: number, toRow: number): MapRows {
  const size = width * (toRow - fromRow);
  return {
    fromRow,
    toRow,
    thicknessNm: new Float32Array(size),
    lowNm: new Float32Array(size),
    highNm: new Float32Array(size),
    order: new Uint8Array(size),
    status: new Uint8Array(size),
  };
}

/** Thickness settled on the candidate grid: NaN where no film; ambiguity as the margin of the order step. */
export interface SettledField {
  readonly width: number;
  readonly height: number;
  readonly spacing: number;
  readonly thicknessNm: Float32Array;
  readonly margin: Float32Array;
}

/**
 * Reads every pixel of the rows: of its colour's modes the one that agrees best with the settled field around it.
 */
export function mapRows(
  pixels: Omit<PhotoPixels, 'encoding'>,
  reader: PixelReader,
  rules: ReadingRules,
  leftOut: LeftOut,
  settled: SettledField | null,
  rows: MapRows,
): void {
  const { width } = pixels;
  const nearby = new Float64Array(4);
  const half = settled ? settled.spacing >> 1 : 0;
  for (let y = rows.fromRow; y < rows.toRow; y++) {
    // The settled places about a pixel stay the same for as many pixels as lie between them.
    let aboutColumn = -2;
    for (let x = 0; x < width; x++) {
      const pixel = y * width + x;
      const out = (y - rows.fromRow) * width + x;
      if (leftOut?.[pixel]) {
        noAnswer(rows, out, statusOfLeftOut(leftOut[pixel]!));
        continue;
      }
      const offset = reader.lookUp(x, y);
      const { records, scale } = reader;
      if (records[offset + 1]! > rules.outlierDistance || records[offset] === 0) {
        noAnswer(rows, out, PIXEL_STATUS.noFilmColour);
        continue;
      }
      const count = records[offset]!;
      let chosen = 0;
      let margin = Number.POSITIVE_INFINITY;
      if (count > 1 && settled) {
        const column = Math.floor((x - half) / settled.spacing);
        if (column !== aboutColumn) {
          settledAround(settled, column, Math.floor((y - half) / settled.spacing), nearby);
          aboutColumn = column;
        }
        chosen = choose(records, offset, count, scale, nearby, NEIGHBOURS.count);
        margin = NEIGHBOURS.margin;
      } else if (count > 1) {
        margin = (records[offset + 2 + MODE_FIELDS + 3]! - records[offset + 2 + 3]!) / 2;
      }
      const mode = offset + 2 + chosen * MODE_FIELDS;
      rows.thicknessNm[out] = records[mode]! * scale;
      rows.lowNm[out] = records[mode + 1]! * scale;
      rows.highNm[out] = records[mode + 2]! * scale;
      if (reader.share > 0) blend(reader, rules, rows, out);
      rows.status[out] =
        count > 1 && margin < rules.ambiguityMargin ? PIXEL_STATUS.ambiguous : PIXEL_STATUS.measured;
    }
  }
}

function noAnswer(rows: MapRows, at: number, status: PixelStatus): void {
  rows.status[at] = status;
  rows.thicknessNm[at] = Number.NaN;
  rows.lowNm[at] = Number.NaN;
  rows.highNm[at] = Number.NaN;
  rows.order[at] = 255;
}

/** Settled thicknesses of the four places from (left, top) on into `out`; `NEIGHBOURS` tells how many, and the least margin. */
function settledAround(settled: SettledField, left: number, top: number, out: Float64Array): void {
  let margin = Number.POSITIVE_INFINITY;
  let count = 0;
  const reach = settled.spacing === 1 ? 1 : 2;
  for (let dy = 0; dy < reach; dy++) {
    const row = Math.max(0, Math.min(settled.height - 1, top + dy));
    for (let dx = 0; dx < reach; dx++) {
      const column = Math.max(0, Math.min(settled.width - 1, left + dx));
      const place = row * settled.width + column;
      const thickness = settled.thicknessNm[place]!;
      if (Number.isNaN(thickness)) continue;
      out[count++] = thickness;
      if (settled.margin[place]! < margin) margin = settled.margin[place]!;
    }
  }
  NEIGHBOURS.count = count;
  NEIGHBOURS.margin = margin;
}

const NEIGHBOURS = { count: 0, margin: 0 };

/**
 * Mixes in what the second angle makes of the same reading, for its share. It is the mode nearest in thickness; where
 * none is near (at the end of the chart, or no film at that angle) the first stands alone.
 */
function blend(reader: PixelReader, rules: ReadingRules, rows: MapRows, out: number): void {
  const offset = reader.lookUpBeside();
  const { besideRecords: records, besideScale: scale, share } = reader;
  if (records[offset + 1]! > rules.outlierDistance) return;
  const own = rows.thicknessNm[out]!;
  let nearest = -1;
  let least = SAME_MODE_NM;
  for (let k = 0; k < records[offset]!; k++) {
    const mode = offset + 2 + k * MODE_FIELDS;
    const gap = Math.abs(records[mode]! * scale - own);
    if (gap < least) {
      least = gap;
      nearest = mode;
    }
  }
  if (nearest < 0) return;
  rows.thicknessNm[out]! += share * (records[nearest]! * scale - own);
  rows.lowNm[out]! += share * (records[nearest + 1]! * scale - rows.lowNm[out]!);
  rows.highNm[out]! += share * (records[nearest + 2]! * scale - rows.highNm[out]!);
}

/** Readings of a colour at two neighbouring angles that lie closer than this are the same mode: well under half an order. */
const SAME_MODE_NM = 40;

function choose(
  records: Float32Array,
  offset: number,
  count: number,
  scale: number,
  nearby: Float64Array,
  neighbours: number,
): number {
  const { perNm, edge, perNmBeyond } = STATED_SMOOTHNESS;
  const best = records[offset + 2 + 3]!;
  let chosen = 0;
  let least = Number.POSITIVE_INFINITY;
  for (let k = 0; k < count; k++) {
    const mode = offset + 2 + k * MODE_FIELDS;
    let cost = Math.min(MOST_COST, (records[mode + 3]! - best) / 2);
    for (let n = 0; n < neighbours; n++) {
      const gap = Math.abs(records[mode]! * scale - nearby[n]!);
      cost += Math.min(perNm * gap, edge + perNmBeyond * gap);
    }
    if (cost < least) {
      least = cost;
      chosen = k;
    }
  }
  return chosen;
}
