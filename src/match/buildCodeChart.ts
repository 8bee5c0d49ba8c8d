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
 * thickness error that all pixels share. One chart for each kind of noise: what they have in common is worked out once.
 * @param orderOf interference order of a thickness in nm
 */
export function buildCodeCharts(
  model: CameraModel,
  fit: CameraFit,
  noises: readonly PixelNoise[],
  scale: ThicknessScale,
  orderOf: (thicknessNm: number) => number,
): CodeChart[] {
  const { count, stepNm } = model.basis;
  const evaluator = modelEvaluator(model);
  evaluator.moveTo(fit.parameters, true);
  const thicknessNm = Float64Array.from({ length: count }, (_, j) => j * stepNm * scale.factor);
  const codes = new Float64Array(3 * count);
  for (let j = 0; j < count; j++) evaluator.codesAt(j, codes, 3 * j);
  const order = Uint8Array.from(thicknessNm, orderOf);
  const charts = noises.map(() => ({
    count,
    thicknessNm,
    codes,
    precision: new Float64Array(6 * count),
    logDeterminant: new Float64Array(count),
    order,
    sharedSdNm: new Float64Array(count),
    noiseShare: new Float64Array(count),
  }));
  const jacobian = new Float64Array(3 * PARAMETERS);
  const spread = new Float64Array(3 * PARAMETERS);
  const left = new Float64Array(6);
  const s = new Float64Array(6);
  const u = new Float64Array(3);
  const indexVariance = fit.covariance[AT.index * PARAMETERS + AT.index]!;
  for (let j = 0; j < count; j++) {
    evaluator.jacobianAt(j, jacobian);
    spreadOf(jacobian, fit.covariance, spread);
    for (let k = 0; k < 6; k++) {
      const a = ROW_OF[k]! * PARAMETERS;
      const b = COLUMN_OF[k]! * PARAMETERS;
      let sum = 0;
      for (let p = 0; p < PARAMETERS; p++) sum += spread[a + p]! * jacobian[b + p]!;
      left[k] = sum;
    }
    const perIndex = scale.perIndex * thicknessNm[j]!;
    for (let n = 0; n < charts.length; n++) {
      const chart = charts[n]!;
      addNoise(left, noises[n]!, jacobian, s);
      invertCovariance(s, chart.precision, chart.logDeterminant, j);
      const along = pullOf(j, codes, chart.precision, thicknessNm, u);
      const fitted = variance(left, u);
      chart.noiseShare[j] = Math.max(0, 1 - fitted / Math.max(along, 1e-9));
      // The slide along the chart and the thickness by index go with the same index error: they add before they are squared.
      let together = 0;
      for (let c = 0; c < 3; c++) together -= u[c]! * spread[c * PARAMETERS + AT.index]!;
      const shared = fitted + 2 * perIndex * together + perIndex * perIndex * indexVariance;
      chart.sharedSdNm[j] = Math.sqrt(Math.max(0, shared) + (scale.relativeSd * thicknessNm[j]!) ** 2);
    }
  }
  return charts;
}

/** The same for one kind of noise. */
export function buildCodeChart(
  model: CameraModel,
  fit: CameraFit,
  noise: PixelNoise,
  scale: ThicknessScale,
  orderOf: (thicknessNm: number) => number,
): CodeChart {
  return buildCodeCharts(model, fit, [noise], scale, orderOf)[0]!;
}

/** Jacobian times covariance; most of a row of the Jacobian is zero only for what belongs to other channels. */
function spreadOf(jacobian: Float64Array, covariance: Float64Array, spread: Float64Array): void {
  spread.fill(0);
  for (let c = 0; c < 3; c++) {
    const row = c * PARAMETERS;
    for (let q = 0; q < PARAMETERS; q++) {
      const d = jacobian[row + q]!;
      if (d === 0) continue;
      const from = q * PARAMETERS;
      for (let p = 0; p < PARAMETERS; p++) spread[row + p]! += d * covariance[from + p]!;
    }
  }
}

/** What the fit leaves open plus what scatters a pixel, as xx yy zz xy xz yz. */
function addNoise(left: Float64Array, noise: PixelNoise, jacobian: Float64Array, s: Float64Array): void {
  const brighter2 = (noise.brightness ?? 0) ** 2;
  for (let k = 0; k < 6; k++) {
    const a = ROW_OF[k]!;
    const b = COLUMN_OF[k]!;
    let sum = left[k]! + noise.luma ** 2 + noise.chroma ** 2 * (CR[a]! * CR[b]! + CB[a]! * CB[b]!);
    if (a === b) sum += noise.codes[a]! ** 2;
    sum +=
      brighter2 * jacobian[a * PARAMETERS + AT.logGain + a]! * jacobian[b * PARAMETERS + AT.logGain + b]!;
    s[k] = sum;
  }
}

/** u' S u for a symmetric 3 x 3 given as xx yy zz xy xz yz. */
function variance(s: Float64Array, u: Float64Array): number {
  const [x, y, z] = [u[0]!, u[1]!, u[2]!];
  const sum =
    s[0]! * x * x + s[1]! * y * y + s[2]! * z * z + 2 * (s[3]! * x * y + s[4]! * x * z + s[5]! * y * z);
  return Math.max(0, sum);
}

/**
 * How thickness read at label j moves with each parameter: a colour error J dtheta is read as a slide of
 * -(t' W J dtheta)/(t' W t) along the chart. Fills `slide`.
 */
export function slideOf(
  j: number,
  codes: Float64Array,
  jacobian: Float64Array,
  precision: Float64Array,
  thicknessNm: Float64Array,
  slide: Float64Array,
): void {
  pullOf(j, codes, precision, thicknessNm, PULL);
  for (let p = 0; p < PARAMETERS; p++) {
    slide[p] = -(
      PULL[0]! * jacobian[p]! +
      PULL[1]! * jacobian[PARAMETERS + p]! +
      PULL[2]! * jacobian[2 * PARAMETERS + p]!
    );
  }
}

const PULL = new Float64Array(3);

/** Thickness by code at label j, nm: (t' W)/(t' W t) into `u`. Returns the variance of a reading, nm^2, all causes. */
function pullOf(
  j: number,
  codes: Float64Array,
  precision: Float64Array,
  thicknessNm: Float64Array,
  u: Float64Array,
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
  u[0] = w0 / curvature;
  u[1] = w1 / curvature;
  u[2] = w2 / curvature;
  return 1 / curvature;
}

const FLAT_NM = 100;
/** Places of a symmetric 3 x 3 kept as xx yy zz xy xz yz. */
const ROW_OF = [0, 1, 2, 0, 0, 1];
const COLUMN_OF = [0, 1, 2, 1, 2, 2];
/** How a chroma plane's error shows in red, green and blue (ITU-T T.871, the JPEG file interchange format). */
const CR = [1.402, -0.714136, 0];
const CB = [0, -0.344136, 1.772];
