import { slideOf, type ThicknessScale } from './buildCodeChart.ts';
import { type CameraModel, modelEvaluator } from './cameraModel.ts';
import type { CodeChart } from './codeChart.ts';
import type { CameraFit } from './fitCamera.ts';
import { AT, PARAMETERS } from './parameters.ts';

/**
 * The error of thickness that all pixels share, as independent parts: at label j (thickness `stepNm` j) an error of
 * `parts[j * count + k]` nm for one standard deviation of the k-th. Errors of the camera move some thicknesses up and
 * others down; a sum over a slick therefore errs less than its pixels do, and only the parts tell by how much.
 */
export interface CommonError {
  readonly stepNm: number;
  /** Parts a label, `PARAMETERS`. */
  readonly count: number;
  readonly parts: Float32Array;
  /** Besides: one standard deviation of a factor on all thicknesses. */
  readonly relativeSd: number;
}

/** Splits the common error of a chart's thicknesses by the factor of the fit's covariance (JCGM 102:2011, 6.2). */
export function commonError(
  model: CameraModel,
  fit: CameraFit,
  chart: CodeChart,
  scale: ThicknessScale,
): CommonError {
  const evaluator = modelEvaluator(model);
  evaluator.moveTo(fit.parameters, true);
  const factor = rootOf(fit.covariance);
  const jacobian = new Float64Array(3 * PARAMETERS);
  const slide = new Float64Array(PARAMETERS);
  const parts = new Float32Array(chart.count * PARAMETERS);
  for (let j = 0; j < chart.count; j++) {
    evaluator.jacobianAt(j, jacobian);
    slideOf(j, chart.codes, jacobian, chart.precision, chart.thicknessNm, slide);
    slide[AT.index]! += scale.perIndex * chart.thicknessNm[j]!;
    for (let k = 0; k < PARAMETERS; k++) {
      let sum = 0;
      for (let p = k; p < PARAMETERS; p++) sum += slide[p]! * factor[p * PARAMETERS + k]!;
      parts[j * PARAMETERS + k] = sum;
    }
  }
  return { stepNm: chart.thicknessNm[1]!, count: PARAMETERS, parts, relativeSd: scale.relativeSd };
}

/**
 * One standard deviation, in nm, that the common error puts on the mean thickness of film with this much area (any
 * unit) at each label; `relativeSd` is not in it. 0 without film.
 */
export function commonSdOfMean({ count, parts }: CommonError, areaAt: Float64Array): number {
  const sums = new Float64Array(count);
  let total = 0;
  for (let j = 0; j < areaAt.length; j++) {
    const area = areaAt[j]!;
    if (area === 0) continue;
    total += area;
    for (let k = 0; k < count; k++) sums[k]! += area * parts[j * count + k]!;
  }
  return total > 0 ? Math.sqrt(sums.reduce((square, sum) => square + sum * sum, 0)) / total : 0;
}

/** Lower triangle L with L L' the covariance; a parameter that is not in doubt has a column of zeros. */
function rootOf(covariance: Float64Array): Float64Array {
  const n = PARAMETERS;
  const root = new Float64Array(n * n);
  for (let j = 0; j < n; j++) {
    let pivot = covariance[j * n + j]!;
    for (let k = 0; k < j; k++) pivot -= root[j * n + k]! ** 2;
    // What rounding leaves of a variance that the others explain is no variance of its own.
    if (!(pivot > 1e-12 * covariance[j * n + j]!)) continue;
    root[j * n + j] = Math.sqrt(pivot);
    for (let i = j + 1; i < n; i++) {
      let sum = covariance[i * n + j]!;
      for (let k = 0; k < j; k++) sum -= root[i * n + k]! * root[j * n + k]!;
      root[i * n + j] = sum / root[j * n + j]!;
    }
  }
  return root;
}
