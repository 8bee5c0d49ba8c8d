import { deltaE2000 } from '../colour/deltaE2000.ts';
import { labFromXyz } from '../colour/lab.ts';
import { apply3, bradford, invert3, multiply3 } from '../colour/matrix3.ts';
import { observerWeights, whiteOf } from '../colour/observer.ts';
import { cameraWeights } from '../colour/photoCamera.ts';
import { SRGB } from '../colour/rgb.ts';
import { FILM_WAVELENGTHS_NM } from '../colour/sampled.ts';
import type { Light } from '../colour/types.ts';
import type { Blur, FilmStack } from '../optics/types.ts';
import { filmChart } from './filmChart.ts';
import { type LookAlike, lookAlikes } from './lookAlikes.ts';
import { orderBoundaries } from './orders.ts';

/** Set-up of a chart to look at. */
export interface ChartViewRequest {
  readonly stack: FilmStack;
  readonly light: Light;
  /** The eye, or the mean camera of the sensor family. */
  readonly observer: 'cie1931' | 'phone';
  readonly incidenceRad: number;
  readonly blur: Blur;
  readonly maxThicknessNm: number;
}

/** Figures of a chart, ready to draw; index j is thickness j * stepNm. */
export interface FilmChartFigures {
  readonly stepNm: number;
  readonly count: number;
  readonly displayRgb: Uint8Array;
  readonly xyz: Float32Array;
  readonly lab: Float32Array;
  readonly linearRgb: Float32Array;
  readonly sensitivityPerNm: Float32Array;
  readonly orderBoundariesNm: readonly number[];
  readonly resolvableNm: { readonly fromNm: number; readonly toNm: number };
  readonly lookAlikes: readonly LookAlike[];
}

/** The brightest film is shown at this luminance: as a photo is exposed for the film, not for white paper. */
const BRIGHTEST_Y = 0.8;
/** Stated noise of an eye or a phone on one patch, CIEDE2000, and the interval width that counts as resolved. */
export const STATED_NOISE_DELTA_E = 2;
export const STATED_WIDTH_NM = 60;
const COVER_90 = 1.6449;
const LOOK_ALIKE_DELTA_E = 4;

/**
 * Draws up a chart at 1 nm: XYZ, CIELAB, linear sRGB and display bytes, all exposed so that the brightest film has
 * luminance 0.8; sensitivity; order boundaries; the resolvable range; look-alikes between orders.
 */
export function chartView(request: ChartViewRequest): FilmChartFigures {
  const stepNm = 1;
  const count = Math.floor(request.maxThicknessNm / stepNm) + 1;
  const { stack, light, incidenceRad, blur } = request;
  const draw = (weights: Parameters<typeof filmChart>[0]['weights']) =>
    filmChart({ stack, weights, incidenceRad, polarisation: 'unpolarised', blur, stepNm, count });
  const linear = new Float64Array(3 * count);
  const xyz = new Float64Array(3 * count);
  if (request.observer === 'phone') {
    linear.set(draw(cameraWeights(new Float64Array(9), light, SRGB, FILM_WAVELENGTHS_NM)));
    for (let j = 0; j < count; j++) xyz.set(apply3(SRGB.toXyz, linear.subarray(3 * j, 3 * j + 3)), 3 * j);
  } else {
    const adapt = bradford(whiteOf('cie1931', light, FILM_WAVELENGTHS_NM), SRGB.whiteXyz);
    const raw = draw(observerWeights('cie1931', light, FILM_WAVELENGTHS_NM));
    const toRgb = multiply3(invert3(SRGB.toXyz), adapt);
    for (let j = 0; j < count; j++) {
      xyz.set(apply3(adapt, raw.subarray(3 * j, 3 * j + 3)), 3 * j);
      linear.set(apply3(toRgb, raw.subarray(3 * j, 3 * j + 3)), 3 * j);
    }
  }
  let brightest = 0;
  for (let j = 0; j < count; j++) brightest = Math.max(brightest, xyz[3 * j + 1]!);
  const exposure = brightest > 0 ? BRIGHTEST_Y / brightest : 1;
  for (let i = 0; i < 3 * count; i++) {
    xyz[i]! *= exposure;
    linear[i]! *= exposure;
  }
  const lab = labFromXyz(xyz, SRGB.whiteXyz);
  const sensitivityPerNm = sensitivity(lab, stepNm);
  const boundaries = orderBoundaries(stack, incidenceRad, request.maxThicknessNm);
  const resolvableNm = resolvable(sensitivityPerNm, stepNm);
  return {
    stepNm,
    count,
    displayRgb: Uint8Array.from(linear, (v) => Math.round(255 * SRGB.encode(Math.min(1, Math.max(0, v))))),
    xyz: Float32Array.from(xyz),
    lab: Float32Array.from(lab),
    linearRgb: Float32Array.from(linear),
    sensitivityPerNm,
    orderBoundariesNm: boundaries,
    resolvableNm,
    lookAlikes: lookAlikes(lab, stepNm, boundaries, LOOK_ALIKE_DELTA_E, Math.min(resolvableNm.toNm, 2000)),
  };
}

/** Colour difference a nanometre, by central differences of CIEDE2000. */
export function sensitivity(lab: ArrayLike<number>, stepNm: number): Float32Array {
  const count = lab.length / 3;
  const out = new Float32Array(count);
  for (let j = 0; j < count; j++) {
    const before = Math.max(0, j - 1);
    const after = Math.min(count - 1, j + 1);
    if (after > before) out[j] = deltaE2000(lab, before, lab, after) / ((after - before) * stepNm);
  }
  return out;
}

/**
 * Thicknesses over which noise of the stated size leaves a 90 % interval narrower than the stated width, the order
 * given: from the first thickness whose sensitivity is enough to where it first fails for longer than half that width
 * (short turns of the colour path, where it stands still for a few nanometres, do not end the range).
 */
export function resolvable(
  sensitivityPerNm: ArrayLike<number>,
  stepNm: number,
  noiseDeltaE = STATED_NOISE_DELTA_E,
  widthNm = STATED_WIDTH_NM,
): { fromNm: number; toNm: number } {
  const enough = (2 * COVER_90 * noiseDeltaE) / widthNm;
  const longest = widthNm / 2 / stepNm;
  let from = -1;
  let to = 0;
  for (let j = 0; j < sensitivityPerNm.length; j++) {
    if (sensitivityPerNm[j]! >= enough) {
      if (from < 0) from = j;
      to = j;
    } else if (from >= 0 && j - to > longest) break;
  }
  return { fromNm: Math.max(0, from) * stepNm, toNm: to * stepNm };
}
