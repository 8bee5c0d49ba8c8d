import { matrixMaker } from '../colour/cameraMatrix.ts';
import { FILM_WAVELENGTHS_NM } from '../colour/sampled.ts';
import { TARGET_COLUMNS, TARGET_PATCHES, TARGET_ROWS, targetReflectances } from '../colour/targetPatches.ts';
import type { Light } from '../colour/types.ts';
import { type CameraModel, modelEvaluator } from '../match/cameraModel.ts';
import { type CameraFit, fitCamera, type ReferenceEvidence } from '../match/fitCamera.ts';
import { AT, PARAMETERS, statedPrior } from '../match/parameters.ts';
import { patchBasis } from '../match/patchBasis.ts';
import { isConvex } from '../photo/homography.ts';
import { type FourCorners, type PatchColour, patchColours } from '../photo/targetColours.ts';
import type { PhotoPixels } from '../photo/types.ts';
import { type FittedCamera, fittedCamera } from './keptCamera.ts';
import { ASSUMED_LIGHT, SetupError } from './prepareScene.ts';

/** What a photo of a colour target tells of the camera. */
export interface TargetReading {
  readonly camera: FittedCamera;
  /** Patches that took part; clipped ones do not. */
  readonly patchesUsed: number;
  /** Root mean square distance of their colours from the fitted camera's, codes of 255. */
  readonly residualCodes: number;
  /** Light along the target's long side and its short side, right or lower edge against the other: 1.1 is a tenth more. */
  readonly unevenness: readonly [number, number];
  /** Quarter turns, clockwise, from the first corner given to the target's first patch (dark skin). */
  readonly quarterTurns: number;
  /** A plain sentence on what it told. */
  readonly advice: string;
}

/**
 * What a patch's colour may be off for reasons other than noise, codes of 255: targets differ from the one that was
 * measured, about as much as the maker's two editions (a CIEDE2000 of 1 on average), and surfaces are not quite matt.
 */
const PATCH_SD = 2.5;
const MOST_CLIPPED = 0.02;
const LEAST_ACROSS = 6;
const LEAST_PATCHES = 12;
/** A larger residual than this is not this target, or not these corners. */
const MOST_RESIDUAL = 14;
const GOOD_RESIDUAL = 5;
/** Patch that the exposure is first guessed from: the third grey, about a third of white. */
const GREY = 20;
/** Camera and slope of the light are fitted in turn; each turn halves what is left or better. */
const ROUNDS = 8;

/**
 * Fits the camera to a photo of the 24-patch colour target. The patches fix tone curve and matrix well; the sensor
 * only in part, because paints are smooth: the covariance says how far. Light that falls off evenly across the target
 * is fitted and taken out.
 * @param corners outer corners of the patches, going round, from any of the four
 * @throws SetupError with a sentence that says what to do
 */
export function measureTarget(
  pixels: PhotoPixels,
  corners: FourCorners,
  light: Light = ASSUMED_LIGHT,
): TargetReading {
  if (!isConvex(corners))
    throw new SetupError('The four corners cross over: drag each one to its own corner of the target.');
  const model: CameraModel = {
    basis: patchBasis(targetReflectances(FILM_WAVELENGTHS_NM), light, FILM_WAVELENGTHS_NM),
    encoding: pixels.encoding,
    matrixFor: matrixMaker(light, pixels.encoding, FILM_WAVELENGTHS_NM).matrixFor,
  };
  let best: Attempt | null = null;
  for (const turned of [false, true]) {
    for (let turn = 0; turn < 4; turn++) {
      // Corners may go round either way; the grid has a first patch in one of the four.
      const round = turned ? ([corners[0], corners[3], corners[2], corners[1]] as const) : corners;
      const from = [0, 1, 2, 3].map((k) => round[(k + turn) % 4]!) as unknown as FourCorners;
      const patches = patchColours(pixels, from, TARGET_COLUMNS, TARGET_ROWS);
      const misfit = roughMisfit(model, patches);
      if (!best || misfit < best.misfit) best = { patches, misfit, quarterTurns: turn };
    }
  }
  const { patches, quarterTurns } = best!;
  if (Math.min(...patches.map(({ across }) => across)) < LEAST_ACROSS)
    throw new SetupError(
      'The target is too small in this photo: go closer, so that it fills half the width.',
    );
  const used = patches.flatMap((patch, row) => (patch.clippedShare <= MOST_CLIPPED ? [row] : []));
  if (used.length < LEAST_PATCHES)
    throw new SetupError('Too many patches are clipped (too bright): take the target with less exposure.');
  const { fit, residualCodes, slope } = fitPatches(model, patches, used, light);
  if (residualCodes > MOST_RESIDUAL)
    throw new SetupError(
      'These colours are not those of the 24-patch target: check that the corners lie on its four outer patches, and that no glare or shadow falls on it.',
    );
  const determined = residualCodes <= GOOD_RESIDUAL && used.length >= 20 ? 'well' : 'partly';
  return {
    camera: fittedCamera(fit, pixels.encoding, 'target', determined),
    patchesUsed: used.length,
    residualCodes,
    unevenness: [Math.exp(slope[0]), Math.exp(slope[1])],
    quarterTurns,
    advice: adviceFor(determined, used.length, residualCodes),
  };
}

interface Attempt {
  readonly patches: readonly PatchColour[];
  readonly misfit: number;
  readonly quarterTurns: number;
}

/** First guess of the gains: each channel's grey. */
function startFor(model: CameraModel, patches: readonly PatchColour[]): Float64Array {
  const parameters = new Float64Array(PARAMETERS);
  const evaluator = modelEvaluator(model);
  evaluator.moveTo(parameters, false);
  const grey = new Float64Array(3);
  evaluator.codesAt(GREY, grey, 0);
  for (let c = 0; c < 3; c++) {
    const seen = model.encoding.decode(Math.max(1, patches[GREY]!.codes[c]!) / 255);
    parameters[AT.logGain + c] = Math.log(seen / model.encoding.decode(grey[c]! / 255));
  }
  return parameters;
}

/** Mean distance of the patches from a typical camera's, whatever the exposure: tells which way round the target lies. */
function roughMisfit(model: CameraModel, patches: readonly PatchColour[]): number {
  const evaluator = modelEvaluator(model);
  evaluator.moveTo(startFor(model, patches), false);
  const codes = new Float64Array(3);
  let sum = 0;
  patches.forEach((patch, row) => {
    evaluator.codesAt(row, codes, 0);
    sum += Math.hypot(codes[0]! - patch.codes[0], codes[1]! - patch.codes[1], codes[2]! - patch.codes[2]);
  });
  return sum / patches.length;
}

/** Fits camera and slope of the light in turn. */
function fitPatches(
  model: CameraModel,
  patches: readonly PatchColour[],
  used: readonly number[],
  light: Light,
): { readonly fit: CameraFit; readonly residualCodes: number; readonly slope: readonly [number, number] } {
  const start = startFor(model, patches);
  const prior = statedPrior(
    { commonGain: 0.5, channelGain: 0.3, veil: 0.03, index: 1e-6, mired: 'daylightK' in light ? 25 : 0 },
    start.slice(),
  );
  let slope: [number, number] = [0, 0];
  let parameters = start;
  for (let round = 0; ; round++) {
    const evidence = used.map((row): ReferenceEvidence => {
      const shift = shiftOf(model, parameters, row, slope);
      const { codes, sd } = patches[row]!;
      return {
        kind: 'clean',
        codes: [codes[0] - shift[0]!, codes[1] - shift[1]!, codes[2] - shift[2]!],
        sd: Math.hypot(PATCH_SD, sd / 10),
        reflectance: null,
        row,
      };
    });
    const fit = fitCamera({
      model,
      prior,
      start: parameters,
      samples: new Float64Array(0),
      sampleSd: 1,
      sampleWeight: 1,
      references: evidence,
      near: round > 0,
    });
    parameters = fit.parameters;
    if (round === ROUNDS) return { fit, residualCodes: residualOf(model, parameters, evidence), slope };
    slope = slopeOf(model, parameters, patches, used);
  }
}

/** Place of a patch on the target, -1/2 to 1/2 along each side. */
const placeOf = (row: number): readonly [number, number] => [
  (row % TARGET_COLUMNS) / (TARGET_COLUMNS - 1) - 0.5,
  Math.floor(row / TARGET_COLUMNS) / (TARGET_ROWS - 1) - 0.5,
];

/** Codes of a patch with `ln light` more than in the middle, less those without. */
function shiftOf(
  model: CameraModel,
  parameters: Float64Array,
  row: number,
  slope: readonly [number, number],
): Float64Array {
  const [x, y] = placeOf(row);
  return lighter(model, parameters, row, slope[0] * x + slope[1] * y);
}

function lighter(model: CameraModel, parameters: Float64Array, row: number, by: number): Float64Array {
  const evaluator = modelEvaluator(model);
  const codes = new Float64Array(6);
  evaluator.moveTo(parameters, false);
  evaluator.codesAt(row, codes, 0);
  const moved = parameters.slice();
  for (let c = 0; c < 3; c++) moved[AT.logGain + c]! += by;
  evaluator.moveTo(moved, false);
  evaluator.codesAt(row, codes, 3);
  return Float64Array.of(codes[3]! - codes[0]!, codes[4]! - codes[1]!, codes[5]! - codes[2]!);
}

/** Least-squares slope of ln light along the two sides, from what the camera leaves unexplained; a mean is the camera's. */
function slopeOf(
  model: CameraModel,
  parameters: Float64Array,
  patches: readonly PatchColour[],
  used: readonly number[],
): [number, number] {
  const evaluator = modelEvaluator(model);
  evaluator.moveTo(parameters, false);
  const codes = new Float64Array(3);
  const step = 0.05;
  const m = [0, 0, 0, 0, 0, 0];
  const t = [0, 0, 0];
  for (const row of used) {
    evaluator.codesAt(row, codes, 0);
    const by = lighter(model, parameters, row, step);
    const at = [1, ...placeOf(row)];
    for (let c = 0; c < 3; c++) {
      const rate = by[c]! / step;
      const left = patches[row]!.codes[c]! - codes[c]!;
      for (let i = 0; i < 3; i++) t[i]! += at[i]! * rate * left;
      m[0]! += rate * rate;
      m[1]! += rate * rate * at[1]!;
      m[2]! += rate * rate * at[2]!;
      m[3]! += rate * rate * at[1]! * at[1]!;
      m[4]! += rate * rate * at[1]! * at[2]!;
      m[5]! += rate * rate * at[2]! * at[2]!;
    }
  }
  // Common part out, then two unknowns.
  const a = m[3]! - (m[1]! * m[1]!) / m[0]!;
  const b = m[4]! - (m[1]! * m[2]!) / m[0]!;
  const d = m[5]! - (m[2]! * m[2]!) / m[0]!;
  const x = t[1]! - (m[1]! * t[0]!) / m[0]!;
  const y = t[2]! - (m[2]! * t[0]!) / m[0]!;
  const determinant = a * d - b * b;
  return [(d * x - b * y) / determinant, (a * y - b * x) / determinant];
}

function residualOf(
  model: CameraModel,
  parameters: Float64Array,
  evidence: readonly ReferenceEvidence[],
): number {
  const evaluator = modelEvaluator(model);
  evaluator.moveTo(parameters, false);
  const codes = new Float64Array(3);
  let square = 0;
  for (const patch of evidence) {
    evaluator.codesAt(patch.row ?? 0, codes, 0);
    for (let c = 0; c < 3; c++) square += (codes[c]! - patch.codes[c]!) ** 2;
  }
  return Math.sqrt(square / (3 * evidence.length));
}

function adviceFor(determined: FittedCamera['determined'], used: number, residualCodes: number): string {
  const told =
    'It fixes this phone’s tone curve and how it mixes colours; its sensor only in part, because paints are smooth.';
  if (determined === 'well') return `${used} patches agree with one camera. ${told}`;
  const why =
    used < 20
      ? `only ${used} of ${TARGET_PATCHES} patches could be read, the others are too bright`
      : `the patches are off by ${residualCodes.toFixed(0)} codes: glare, shadow or a faded target`;
  return `The target gives this camera in part: ${why}. ${told}`;
}
