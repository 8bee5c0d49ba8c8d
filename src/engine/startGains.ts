import type { RgbEncoding } from '../colour/types.ts';
import { type CameraKnowledge, KEPT_PLACES } from '../match/cameraKnowledge.ts';
import { type CameraModel, modelEvaluator } from '../match/cameraModel.ts';
import { AT, PARAMETERS, type PriorSpread } from '../match/parameters.ts';
import type { FilmSample } from '../match/sampleFilm.ts';
import { toneOf } from '../match/toneCurve.ts';
import type { PhotoPixels } from '../photo/types.ts';
import type { References } from './references.ts';

export interface Start {
  /** Parameter vectors to start from, the likeliest first. */
  readonly starts: readonly Float64Array[];
  readonly priorMean: Float64Array;
  readonly spread: Pick<PriorSpread, 'commonGain' | 'channelGain' | 'veil'>;
  /** The exposure was guessed from the brightest first-order band: enough for a film in air. */
  readonly byBrightBand: boolean;
}

/** Share of a bare surface's light that is taken as veil at the start. */
const VEIL_SHARE = 0.15;
/** Exposure errors tried where only the brightest band fixes it. */
const BRIGHT_BAND_TRIALS = [1, 0.75, 1.35];
const SHARE_OF_BRIGHTEST = 0.98;

/**
 * First guess of gains and veils: from a card of stated reflectance, else from bare surface, else from the brightest
 * film seen against the brightest film there is; a card's colour sets the balance in any case.
 * @param known what is known of this camera: its tone curve is undone, and the start is at its mean
 */
export function startGains(
  model: CameraModel,
  sample: FilmSample,
  references: References,
  pixels: PhotoPixels,
  known: CameraKnowledge | null = null,
): Start {
  const start = new Float64Array(PARAMETERS);
  KEPT_PLACES.forEach((p, i) => {
    start[p] = known?.mean[i] ?? 0;
  });
  const straight = (linear: number) => withoutTone(linear, model.encoding, start);
  const bareRow = references.evidence.find(({ kind }) => kind === 'clean')?.row ?? 0;
  const chart = nominalChart(model, start, bareRow);
  const brightest = straight(brightestOf(sample, pixels));
  const { whiteReflectance } = references;
  const clean = references.clean && { linear: references.clean.linear.map(straight) };
  const white = references.white && { linear: references.white.linear.map(straight) };
  const balance = white ? balanceOf(white.linear) : [0, 0, 0];
  let commonGain = 0.3;
  let channelGain = white ? 0.1 : 0.15;
  let byBrightBand = false;
  if (white && whiteReflectance !== null) {
    for (let c = 0; c < 3; c++) start[AT.logGain + c] = Math.log(white.linear[c]! / whiteReflectance);
    commonGain = 0.15;
  } else if (clean && chart.bare[0]! > 1e-4) {
    for (let c = 0; c < 3; c++) {
      const light = Math.max(1e-4, clean.linear[c]!);
      start[AT.logGain + c] = Math.log(((1 - VEIL_SHARE) * light) / chart.bare[c]!);
      start[AT.veil + c] = VEIL_SHARE * light;
    }
    channelGain = 0.2;
  } else {
    const level = Math.log(Math.max(1e-4, brightest) / chart.brightest);
    for (let c = 0; c < 3; c++) start[AT.logGain + c] = level + balance[c]!;
    byBrightBand = chart.bare[0]! < 1e-3;
  }
  const priorMean = start.slice();
  priorMean.fill(0, AT.veil, AT.veil + 3);
  const trials = byBrightBand ? BRIGHT_BAND_TRIALS : [1];
  return {
    starts: trials.map((factor) => {
      const moved = start.slice();
      for (let c = 0; c < 3; c++) moved[AT.logGain + c]! += Math.log(factor);
      return moved;
    }),
    priorMean,
    spread: {
      commonGain,
      channelGain,
      veil: Math.max(0.005, (clean ? 0.08 : 0.05) * Math.max(brightest, 0.1)),
    },
    byBrightBand,
  };
}

/** Logarithms of the channels' light against their geometric mean. */
function balanceOf(linear: readonly number[]): number[] {
  const logs = linear.map((v) => Math.log(Math.max(1e-4, v)));
  const mean = (logs[0]! + logs[1]! + logs[2]!) / 3;
  return logs.map((v) => v - mean);
}

/** Linear light that the camera saw before its tone curve, by bisection: tone curves rise. */
function withoutTone(linear: number, encoding: RgbEncoding, parameters: Float64Array): number {
  const code = encoding.encode(linear);
  let low = 0;
  let high = 1;
  for (let k = 0; k < 30; k++) {
    const middle = (low + high) / 2;
    if (toneOf(middle, parameters, AT.tone) < code) low = middle;
    else high = middle;
  }
  return encoding.decode((low + high) / 2);
}

/** Linear RGB of the camera at gain 1 at bare surface, and the brightest mean of channels over the chart. */
function nominalChart(
  model: CameraModel,
  start: Float64Array,
  bareRow: number,
): { bare: Float64Array; brightest: number } {
  const evaluator = modelEvaluator(model);
  const plain = start.slice();
  plain.fill(0, AT.tone, AT.tone + 3);
  evaluator.moveTo(plain, false);
  const codes = new Float64Array(3);
  const bare = new Float64Array(3);
  let brightest = 0;
  for (let j = 0; j < model.basis.count; j++) {
    evaluator.codesAt(j, codes, 0);
    let mean = 0;
    for (let c = 0; c < 3; c++) {
      const linear = model.encoding.decode(codes[c]! / 255);
      mean += linear / 3;
      if (j === bareRow) bare[c] = linear;
    }
    brightest = Math.max(brightest, mean);
  }
  return { bare, brightest };
}

function brightestOf(sample: FilmSample, pixels: PhotoPixels): number {
  if (sample.count === 0) return 0.5;
  const means = new Float64Array(sample.count);
  for (let i = 0; i < sample.count; i++) {
    for (let c = 0; c < 3; c++)
      means[i]! += pixels.encoding.decode(Math.max(0, sample.codes[3 * i + c]!) / 255) / 3;
  }
  means.sort();
  return means[Math.floor(SHARE_OF_BRIGHTEST * (sample.count - 1))]!;
}
