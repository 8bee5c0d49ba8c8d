import { BLOCK_SIDE } from '../match/activity.ts';
import type { SettledField } from '../match/mapPixels.ts';
import type { PhotoPixels } from '../photo/types.ts';
import type { Calibration } from './calibrate.ts';
import { smoothingReach } from './estimate.ts';
import type { BandTask } from './jobs.ts';

/** A band and the rows of it that count: it reads a few more above, so that smoothing has neighbours there. */
export interface Band {
  readonly fromRow: number;
  readonly toRow: number;
  /** Rows read above `fromRow`, cut off again afterwards. */
  readonly lead: number;
}

/** Splits a photo into `count` bands whose edges fall on the blocks and on the places of the order step. */
export function bandsOf(height: number, spacing: number, count: number): Band[] {
  const grain = BLOCK_SIDE * spacing;
  const grains = Math.ceil(height / grain);
  const bands: Band[] = [];
  for (let k = 0; k < count; k++) {
    const fromRow = Math.round((k * grains) / count) * grain;
    const toRow = Math.min(height, Math.round(((k + 1) * grains) / count) * grain);
    if (toRow > fromRow) bands.push({ fromRow, toRow, lead: fromRow > 0 ? grain : 0 });
  }
  return bands;
}

/** Cuts a self-contained task for a band; its arrays are copies, free to be transferred. */
export function bandTask(
  pixels: PhotoPixels,
  calibration: Calibration,
  leftOut: Uint8Array,
  settled: SettledField,
  band: Band,
): BandTask {
  const { width, channels, maxCode } = pixels;
  const from = band.fromRow - band.lead;
  const firstPlace = from / settled.spacing;
  const lastPlace = Math.min(settled.height, Math.ceil(band.toRow / settled.spacing) + 1);
  const places = (values: Float32Array) =>
    values.slice(firstPlace * settled.width, lastPlace * settled.width);
  return {
    pixels: {
      width,
      height: band.toRow - from,
      codes: pixels.codes.slice(from * width * channels, band.toRow * width * channels),
      channels,
      maxCode,
    },
    firstRow: from,
    charts: calibration.charts,
    angles: calibration.angles,
    rules: calibration.rules,
    leftOut: leftOut.slice(from * width, band.toRow * width),
    settled: {
      width: settled.width,
      height: lastPlace - firstPlace,
      spacing: settled.spacing,
      thicknessNm: places(settled.thicknessNm),
      margin: places(settled.margin),
    },
    reach: smoothingReach(width, pixels.height),
  };
}
