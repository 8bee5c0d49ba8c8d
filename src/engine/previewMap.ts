import { type CandidateField, MOST_CANDIDATES, makeCandidateField } from '../match/candidates.ts';
import { finishAngleRows, finishRows } from '../match/finishRows.ts';
import { COVER_90, makeMapRows, statusOfLeftOut } from '../match/mapPixels.ts';
import { type OrderSolution, resolveOrders } from '../match/resolveOrders.ts';
import { PIXEL_STATUS, type ThicknessMap } from '../match/types.ts';
import { cosineReader } from '../view/waterFields.ts';
import type { Calibration } from './calibrate.ts';
import { LEFT_OUT } from './leftOut.ts';
import { heedPins } from './pins.ts';
import type { Setup } from './setup.ts';

/** A preview has at most this many places: larger fields are thinned. */
const MOST_PLACES = 150_000;

/** Every `step`-th place of every `step`-th row. */
function thinned(field: CandidateField, step: number): CandidateField {
  if (step === 1) return field;
  const K = MOST_CANDIDATES;
  const out = makeCandidateField(
    Math.ceil(field.width / step),
    Math.ceil(field.height / step),
    field.spacing * step,
  );
  for (let place = 0; place < out.count.length; place++) {
    const row = Math.floor(place / out.width);
    const from = row * step * field.width + (place - row * out.width) * step;
    out.count[place] = field.count[from]!;
    for (let k = 0; k < field.count[from]!; k++) {
      out.thicknessNm[place * K + k] = field.thicknessNm[from * K + k]!;
      out.sdNm[place * K + k] = field.sdNm[from * K + k]!;
      out.cost[place * K + k] = field.cost[from * K + k]!;
    }
  }
  return out;
}

/**
 * The map at the places of the order step alone: what a full map will say, some pixels apart, neither mended nor smoothed.
 * Quick, because every colour there has been met before.
 * @param filled candidates of this photo; pins change them, so fill the field anew before the next call
 * @param leftOut of the photo, `width` pixels a row and `height` rows
 * @returns a map of one pixel a place
 */
export function previewMap(
  filled: CandidateField,
  setup: Setup,
  calibration: Calibration,
  leftOut: Uint8Array,
  width: number,
  height: number,
): ThicknessMap {
  let step = 1;
  while (filled.count.length > MOST_PLACES * step * step) step++;
  const field = thinned(filled, step);
  heedPins(field, setup.pins ?? [], calibration);
  const solution = resolveOrders(field, { thickerDown: setup.trend === 'thickerDown' });
  const { charts, angles, rules } = calibration;
  const rows = makeMapRows(field.width, 0, field.height);
  const half = filled.spacing >> 1;
  for (let row = 0; row < field.height; row++) {
    const y = Math.min(height - 1, row * field.spacing + half);
    for (let column = 0; column < field.width; column++) {
      const x = Math.min(width - 1, column * field.spacing + half);
      const place = row * field.width + column;
      if (field.count[place]! > 0) {
        readPlace(field, solution, place, rules.ambiguityMargin, rows);
        continue;
      }
      const mark = leftOut[y * width + x]!;
      rows.status[place] = mark === LEFT_OUT.no ? PIXEL_STATUS.noFilmColour : statusOfLeftOut(mark);
      rows.thicknessNm[place] = Number.NaN;
      rows.lowNm[place] = Number.NaN;
      rows.highNm[place] = Number.NaN;
      rows.order[place] = 255;
    }
  }
  if (angles) {
    const cosineAt = cosineReader(angles.view);
    const atPlace = (column: number, row: number) =>
      cosineAt(column * field.spacing + half, row * field.spacing + half);
    finishAngleRows(rows, field.width, angles.charts, atPlace, rules, null);
  } else finishRows(rows, charts[0]!, rules, null);
  const { thicknessNm, lowNm, highNm, order, status } = rows;
  return { width: field.width, height: field.height, thicknessNm, lowNm, highNm, order, status };
}

function readPlace(
  field: CandidateField,
  { choice, margin }: OrderSolution,
  place: number,
  ambiguityMargin: number,
  rows: Pick<ThicknessMap, 'thicknessNm' | 'lowNm' | 'highNm' | 'status'>,
): void {
  const mode = place * MOST_CANDIDATES + choice[place]!;
  const thickness = field.thicknessNm[mode]!;
  const reach = COVER_90 * field.sdNm[mode]!;
  rows.thicknessNm[place] = thickness;
  rows.lowNm[place] = thickness - reach;
  rows.highNm[place] = thickness + reach;
  rows.status[place] =
    field.count[place]! > 1 && margin[place]! < ambiguityMargin
      ? PIXEL_STATUS.ambiguous
      : PIXEL_STATUS.measured;
}
