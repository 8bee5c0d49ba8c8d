import { type CameraModel, modelEvaluator } from './cameraModel.ts';
import { type CodeChart, invertCovariance } from './codeChart.ts';
import type { CameraFit } from './fitCamera.ts';
import { AT, PARAMETERS } from './parameters.ts';

/** What scatters a single pixel's code about the chart, one standard deviation, codes of 255. */
export interface PixelNoise {
  /** Shot, read and rounding noise together, a channel: measured on the photo itself where it could be. */
  readonly codes: readonly [number, number, number];
  /** What the model and compression leave out, one standard deviation: of luma, and of each chroma plane. */
  readonly luma: number;
  readonly chroma: number;
  /** How much brighter or darker a film may look than its chart, as a share: waves tilt a slanted surface. 0 if left out. */
  readonly brightness?: number;
}

export interface ThicknessScale {
  /** Thickness by nominal thickness, and how sure that ratio is (index and angle), relative. */
  readonly factor: number;
  /** Derivative of ln(factor) by the index shift. */
  readonly perIndex: number;
  /** Further relative standard deviation, from the incidence angle. */
  readonly relativeSd: number;
}

/**
 * The chart that this photo's pixels are matched against: codes at the fitted camera, with a covariance that holds
 * pixel noise and what the fit leaves open (law of propagation, JCGM 100:2008, 5.1.2), and the part of the
 * thickness error that all pixels share.
 * @param orderOf interference order of a thickness in nm
 */
export function buildCodeChart(
  model: CameraModel,
  fit: CameraFit,
  noise: PixelNoise,
  scale: ThicknessScale,
  orderOf: (thicknessNm: number) => number,
): CodeChart {
  const { count, stepNm } = model.basis;
  const evaluator = modelEvaluator(model);
  evaluator.moveTo(fit.parameters, true);
  const thicknessNm = Float64Array.from({ length: count }, (_, j) => j * stepNm * scale.factor);
  const codes = new Float64Array(3 * count);
  for (let j = 0; j < count; j++) evaluator.codesAt(j, codes, 3 * j);
  const precision = new Float64Array(6 * count);
  const logDeterminant = new Float64Array(count);
  const order = new Uint8Array(count);
  const sharedSdNm = new Float64Array(count);
  const noiseShare = new Float64Array(count);
  const jacobian = new Float64Array(3 * PARAMETERS);
  const spread = new Float64Array(3 * PARAMETERS);
  const slide = new Float64Array(PARAMETERS);
  const s = new Float64Array(6);
  const brighter2 = (noise.brightness ?? 0) ** 2;
  const pairs = [
    [0, 0],
    [1, 1],
    [2, 2],
    [0, 1],
    [0, 2],
    [1, 2],
  ] as const;
  for (let j = 0; j < count; j++) {
    order[j] = orderOf(thicknessNm[j]!);
    evaluator.jacobianAt(j, jacobian);
    // spread = jacobian * covariance
    for (let c = 0; c < 3; c++) {
      for (let p = 0; p < PARAMETERS; p++) {
        let sum = 0;
        for (let q = 0; q < PARAMETERS; q++)
          sum += jacobian[c * PARAMETERS + q]! * fit.covariance[q * PARAMETERS + p]!;
        spread[c * PARAMETERS + p] = sum;
      }
    }
    for (let k = 0; k < 6; k++) {
      const [a, b] = pairs[k]!;
      let sum = noise.luma ** 2 + noise.chroma ** 2 * (CR[a]! * CR[b]! + CB[a]! * CB[b]!);
      if (a === b) sum += noise.codes[a]! ** 2;
      sum +=
        brighter2 * jacobian[a * PARAMETERS + AT.logGain + a]! * jacobian[b * PARAMETERS + AT.logGain + b]!;
      for (let p = 0; p < PARAMETERS; p++) sum += spread[a * PARAMETERS + p]! * jacobian[b * PARAMETERS + p]!;
      s[k] = sum;
    }
    invertCovariance(s, precision, logDeterminant, j);
    const along = slideOf(j, codes, jacobian, precision, thicknessNm, slide);
    const fitted = quadratic(fit.covariance, slide);
    noiseShare[j] = Math.max(0, 1 - fitted / Math.max(along, 1e-9));
    slide[AT.index]! += scale.perIndex * thicknessNm[j]!;
    sharedSdNm[j] = Math.sqrt(quadratic(fit.covariance, slide) + (scale.relativeSd * thicknessNm[j]!) ** 2);
  }
  return { count, thicknessNm, codes, precision, logDeterminant, order, sharedSdNm, noiseShare };
}

/**
 * How thickness read at label j moves with each parameter: a colour error J dtheta is read as a slide of
 * -(t' W J dtheta)/(t' W t) along the chart. Fills `slide`; returns the variance of a reading, nm^2, all causes.
 */
export function slideOf(
  j: number,
  codes: Float64Array,
  jacobian: Float64Array,
  precision: Float64Array,
  thicknessNm: Float64Array,
  slide: Float64Array,
): number {
  const before = Math.max(0, j - 1);
  const after = Math.min(thicknessNm.length - 1, j + 1);
  const span = thicknessNm[after]! - thicknessNm[before]!;
  const t0 = (codes[3 * after]! - codes[3 * before]!) / span;
  const t1 = (codes[3 * after + 1]! - codes[3 * before + 1]!) / span;
  const t2 = (codes[3 * after + 2]! - codes[3 * before + 2]!) / span;
  const w = 6 * j;
  const w0 = precision[w]! * t0 + precision[w + 3]! * t1 + precision[w + 4]! * t2;
  const w1 = precision[w + 3]! * t0 + precision[w + 1]! * t1 + precision[w + 5]! * t2;
  const w2 = precision[w + 4]! * t0 + precision[w + 5]! * t1 + precision[w + 2]! * t2;
  // A weak flat prior keeps a stretch without colour change from an endless slide.
  const curvature = w0 * t0 + w1 * t1 + w2 * t2 + 1 / FLAT_NM ** 2;
  for (let p = 0; p < PARAMETERS; p++) {
    slide[p] =
      -(w0 * jacobian[p]! + w1 * jacobian[PARAMETERS + p]! + w2 * jacobian[2 * PARAMETERS + p]!) / curvature;
  }
  return 1 / curvature;
}

function quadratic(covariance: Float64Array, v: Float64Array): number {
  let sum = 0;
  for (let p = 0; p < PARAMETERS; p++) {
    for (let q = 0; q < PARAMETERS; q++) sum += v[p]! * covariance[p * PARAMETERS + q]! * v[q]!;
  }
  return Math.max(0, sum);
}

const FLAT_NM = 100;
/** How a chroma plane's error shows in red, green and blue (ITU-T T.871, the JPEG file interchange format). */
const CR = [1.402, -0.714136, 0];
const CB = [0, -0.344136, 1.772];
