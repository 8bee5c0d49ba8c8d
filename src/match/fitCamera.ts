import { assignSamples } from './assignSamples.ts';
import { modelEvaluator } from './cameraModel.ts';
import { normalEquations } from './fitEquations.ts';
import { drawChart, type FitInput, type Workspace } from './fitWorkspace.ts';
import { PARAMETERS } from './parameters.ts';
import { choleskyInPlace, choleskySolve, inverseOf } from './symmetric.ts';

export type { FitInput, ReferenceEvidence } from './fitWorkspace.ts';

export interface CameraFit {
  readonly parameters: Float64Array;
  /** Row-major PARAMETERS x PARAMETERS, after the fit. */
  readonly covariance: Float64Array;
  /** Root mean square distance of film samples from the chart, codes of 255, outliers weighed down. */
  readonly residualCodes: number;
  /** Minus twice the log posterior at the end, for comparing starts. */
  readonly objective: number;
  /** Share of samples that look like film. */
  readonly filmShare: number;
  /** Nominal thickness of each sample at the end (NaN for outliers). */
  readonly sampleNm: Float64Array;
}

/** Noise scales of the annealed assignment, codes; after Ueda & Nakano 1998 (deterministic annealing EM). */
const ANNEALING = [16, 12, 9, 7, 5, 4, 3, 2.5, 2, 1.5];
/** Rounds at the final noise, and the round from which samples slide along the chart. */
const SETTLING_ROUNDS = 16;
const SLIDE_FROM_ROUND = 5;
/** Round at which a fit begins that starts near its end. */
const NEAR_FROM_ROUND = 7;
/** Marquardt damping, relative to the diagonal, while annealing and after: weak directions must move freely at the end. */
const DAMPING = 0.02;
const SETTLED_DAMPING = 1e-4;
/** Longest step, in prior standard deviations of any one parameter. */
const LONGEST_STEP = 1.5;

/**
 * Fits the camera to the photo's own film colours by expectation-maximisation: a soft, annealed assignment of samples
 * to thickness, then a damped Gauss-Newton step on the parameters in which every sample may slide along the chart
 * (so that the step is that of an orthogonal-distance fit once the assignment has settled; Boggs, Byrd, Schnabel 1987).
 * @throws RangeError when the prior's precision is not positive definite
 */
export function fitCamera(input: FitInput): CameraFit {
  const labels = input.model.basis.count;
  const count = input.samples.length / 3;
  const work: Workspace = {
    basis: input.model.basis,
    evaluator: modelEvaluator(input.model),
    chart: new Float64Array(3 * labels),
    tangent: new Float64Array(3 * labels),
    bend: new Float64Array(3 * labels),
    reach: new Float64Array(labels),
    weight: new Float64Array(labels),
    sum: new Float64Array(3 * labels),
    cost: new Float64Array(labels),
    open: new Int32Array(labels),
    slide: new Float64Array(labels),
    jacobian: new Float64Array(3 * PARAMETERS),
    hessian: new Float64Array(PARAMETERS * PARAMETERS),
    gradient: new Float64Array(PARAMETERS),
    cardLevel: 0.5,
  };
  const sampleNm = new Float64Array(count);
  const parameters = Float64Array.from(input.start);
  const rounds = ANNEALING.length + (input.scout ? 0 : SETTLING_ROUNDS);
  for (let round = input.near ? NEAR_FROM_ROUND : 0; round < rounds; round++) {
    const sd = Math.max(input.sampleSd, ANNEALING[round] ?? 0);
    drawChart(work, parameters);
    assignSamples(work, input, sd, sampleNm);
    step(
      work,
      input,
      parameters,
      sd,
      round >= SLIDE_FROM_ROUND,
      round < ANNEALING.length ? DAMPING : SETTLED_DAMPING,
    );
  }
  drawChart(work, parameters);
  const end = assignSamples(work, input, input.sampleSd, sampleNm);
  work.evaluator.moveTo(parameters, true);
  const rest = normalEquations(work, input, parameters, input.sampleSd, true);
  return {
    parameters,
    covariance: inverseOf(work.hessian, PARAMETERS),
    residualCodes: end.film > 0 ? Math.sqrt(end.square / (3 * end.film)) : 0,
    objective: input.sampleWeight * end.cost + rest,
    filmShare: count > 0 ? end.film / count : 0,
    sampleNm,
  };
}

/** One damped Gauss-Newton step on `parameters`, in place. */
function step(
  work: Workspace,
  input: FitInput,
  parameters: Float64Array,
  sd: number,
  slide: boolean,
  damping: number,
): void {
  work.evaluator.moveTo(parameters, true);
  normalEquations(work, input, parameters, sd, slide);
  const factor = work.hessian.slice();
  // Marquardt's damping keeps a step from leaving the region where the chart is linear.
  for (let p = 0; p < PARAMETERS; p++) factor[p * PARAMETERS + p]! *= 1 + damping;
  choleskyInPlace(factor, PARAMETERS);
  const move = work.gradient.slice();
  choleskySolve(factor, PARAMETERS, move);
  let largest = 0;
  for (let p = 0; p < PARAMETERS; p++) {
    const own = Math.sqrt(input.prior.precision[p * PARAMETERS + p]!);
    largest = Math.max(largest, Math.abs(move[p]!) * own);
  }
  const shrink = largest > LONGEST_STEP ? LONGEST_STEP / largest : 1;
  for (let p = 0; p < PARAMETERS; p++) parameters[p]! -= shrink * move[p]!;
}
