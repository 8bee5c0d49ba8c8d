import { activityMap } from '../match/activity.ts';
import { type CandidateField, MOST_CANDIDATES, makeCandidateField } from '../match/candidates.ts';
import { widenAtEdges } from '../match/edgeIntervals.ts';
import { finishAngleRows, finishRows } from '../match/finishRows.ts';
import { fillCandidates, type MapRows, makeMapRows, mapRows, type SettledField } from '../match/mapPixels.ts';
import { mendSpeckles } from '../match/mendSpeckles.ts';
import { resolveOrders } from '../match/resolveOrders.ts';
import { smoothRows } from '../match/smoothRows.ts';
import type { ThicknessMap } from '../match/types.ts';
import type { PhotoPixels } from '../photo/types.ts';
import { cosineReader } from '../view/waterFields.ts';
import { type Calibration, calibrate, type OnStep } from './calibrate.ts';
import type { EstimateResult } from './contract.ts';
import type { BandTask } from './jobs.ts';
import { leftOutOf } from './leftOut.ts';
import { heedPins } from './pins.ts';
import { makeReader } from './seenAngles.ts';
import type { Setup } from './setup.ts';
import { summarise } from './summarise.ts';
import { type TallyFacts, tallyFactsOf } from './tallyFacts.ts';

/** Places that the order step looks at, at most; larger photos are sampled evenly for it. */
const MOST_PLACES = 400_000;
/** Photos above this many pixels are smoothed over 3 x 3 instead of 5 x 5: finer pixels than the film's own detail. */
const WIDE_SMOOTHING_BELOW = 3_000_000;

/** Pixels between the places of the order step. */
export function spacingFor(width: number, height: number): number {
  return Math.max(1, Math.ceil(Math.sqrt((width * height) / MOST_PLACES)));
}

export function emptyField(pixels: PhotoPixels): CandidateField {
  const spacing = spacingFor(pixels.width, pixels.height);
  return makeCandidateField(Math.ceil(pixels.width / spacing), Math.ceil(pixels.height / spacing), spacing);
}

/** Settles the orders of a filled field; pins and trend are heeded. */
export function settle(
  field: CandidateField,
  setup: Setup,
  calibration: Calibration,
  onShare: (share: number) => void = () => {},
): SettledField {
  heedPins(field, setup.pins ?? [], calibration);
  const { choice, margin } = resolveOrders(field, { thickerDown: setup.trend === 'thickerDown' }, onShare);
  const thicknessNm = new Float32Array(choice.length);
  for (let i = 0; i < choice.length; i++) {
    thicknessNm[i] = choice[i] === 255 ? Number.NaN : field.thicknessNm[i * MOST_CANDIDATES + choice[i]!]!;
  }
  return { width: field.width, height: field.height, spacing: field.spacing, thicknessNm, margin };
}

/** Reach of the smoothing for a photo of this size. */
export function smoothingReach(width: number, height: number): 1 | 2 {
  return width * height < WIDE_SMOOTHING_BELOW ? 2 : 1;
}

/** Reads a band of the full map, mends, smooths and finishes it. A reader that has met the photo's colours is quicker. */
export function readBand(
  task: BandTask,
  reader = makeReader(task.pixels, activityMap(task.pixels), task, task.firstRow),
): MapRows {
  const { pixels, charts, angles, rules } = task;
  const rows = makeMapRows(pixels.width, 0, pixels.height);
  mapRows(pixels, reader, rules, task.leftOut, task.settled, rows);
  mendSpeckles(rows, pixels.width);
  const ownShare = smoothRows(rows, pixels.width, task.reach, rules.bareNm);
  if (angles) {
    const cosineAt = cosineReader(angles.view, task.firstRow);
    finishAngleRows(rows, pixels.width, angles.charts, cosineAt, rules, ownShare);
  } else finishRows(rows, charts[0]!, rules, ownShare);
  widenAtEdges(rows, pixels.width);
  return rows;
}

/** Milliseconds since any fixed moment; injected, because the pure code has no clock. */
export type Clock = () => number;

/** The estimate with what its tally needs. */
export interface HeadlessResult extends EstimateResult {
  readonly tallyFacts: TallyFacts;
}

/**
 * The whole job on one thread: photo pixels and a set-up in, thickness map and summary out.
 * @throws SetupError, PhotoError with a sentence that says what to do
 */
export function estimate(
  pixels: PhotoPixels,
  setup: Setup,
  clock: Clock = () => 0,
  onStep: OnStep = () => {},
): HeadlessResult {
  const started = clock();
  const leftOut = leftOutOf(pixels, setup);
  const activity = activityMap(pixels);
  const calibration = calibrate(pixels, setup, leftOut, activity, (share, step) => onStep(share * 0.4, step));
  const fitted = clock();
  const reader = makeReader(pixels, activity, calibration);
  const field = emptyField(pixels);
  onStep(0.4, 'matching colours');
  fillCandidates(pixels, reader, calibration.rules, leftOut, field, 0, field.height);
  const matched = clock();
  const settled = settle(field, setup, calibration, (share) => onStep(0.5 + 0.2 * share, 'settling orders'));
  const ordered = clock();
  onStep(0.7, 'reading every pixel');
  const { charts, angles, rules } = calibration;
  const reach = smoothingReach(pixels.width, pixels.height);
  const rows = readBand({ pixels, firstRow: 0, charts, angles, rules, leftOut, settled, reach }, reader);
  const map = joinBands(pixels.width, pixels.height, [rows]);
  const mapped = clock();
  const timingsMs = {
    calibrate: fitted - started,
    match: matched - fitted,
    orders: ordered - matched,
    map: mapped - ordered,
    total: mapped - started,
  };
  return {
    map,
    summary: summarise(map, calibration, timingsMs),
    camera: calibration.camera,
    tallyFacts: tallyFactsOf(calibration, leftOut),
  };
}

/** Puts bands, top to bottom, together into one map. A single band's arrays are used as they are. */
export function joinBands(width: number, height: number, bands: readonly MapRows[]): ThicknessMap {
  const first = bands[0];
  if (bands.length === 1 && first) {
    const { thicknessNm, lowNm, highNm, order, status } = first;
    return { width, height, thicknessNm, lowNm, highNm, order, status };
  }
  const size = width * height;
  const map = {
    width,
    height,
    thicknessNm: new Float32Array(size),
    lowNm: new Float32Array(size),
    highNm: new Float32Array(size),
    order: new Uint8Array(size),
    status: new Uint8Array(size),
  };
  let at = 0;
  for (const band of bands) {
    map.thicknessNm.set(band.thicknessNm, at);
    map.lowNm.set(band.lowNm, at);
    map.highNm.set(band.highNm, at);
    map.order.set(band.order, at);
    map.status.set(band.status, at);
    at += band.status.length;
  }
  return map;
}
