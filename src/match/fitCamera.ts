import { type CameraModel, type ModelEvaluator, modelEvaluator } from './cameraModel.ts';
import { PARAMETERS, type Prior } from './parameters.ts';
import { choleskyInPlace, choleskySolve, inverseOf } from './symmetric.ts';

/** A colour marked on the photo whose film is known: bare surface, a card, black. Codes of 255. */
export interface ReferenceEvidence {
  readonly kind: 'clean' | 'card' | 'dark';
  readonly codes: readonly [number, number, number];
  /** Standard deviation of that mean colour, with what the marked patch itself may vary. */
  readonly sd: number;
  /** Of a card: its reflectance, or null where only its colour counts. */
  readonly reflectance: number | null;
}

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

export interface FitInput {
  readonly model: CameraModel;
  readonly prior: Prior;
  readonly start: Float64Array;
  /** Film colours, 3 a sample; may be empty: then only the references speak. */
  readonly samples: Float64Array;
  /** Standard deviation of a sample's colour, codes, all causes but the fitted ones. */
  readonly sampleSd: number;
  /** What one sample counts for, 0..1: samples of one photo share errors of compression and processing. */
  readonly sampleWeight: number;
  readonly references: readonly ReferenceEvidence[];
  /** True when `start` is already near: the annealing is skipped. */
  readonly near?: boolean;
  /** Allowed labels of each sample as [from, to) rows, or null for all: orders already settled by neighbours or pins. */
  readonly allowed?: Uint32Array | null;
}

/** Noise scales of the annealed assignment, codes; after Ueda & Nakano 1998 (deterministic annealing EM). */
const ANNEALING = [16, 12, 9, 7, 5, 4, 3, 2.5, 2, 1.5];
/** A sample this many standard deviations off the chart is as likely an outlier as film. */
const OUTLIER_DISTANCE = 4;
/** Beyond this squared distance (in standard deviations) a sample is surely no film. */
const DISTANT = 400;
/** Labels this much less likely than the best (minus twice the log) are left out of the soft assignment. */
const NEGLIGIBLE = 30;
/** Rounds at the final noise, and the round from which samples slide along the chart. */
const SETTLING_ROUNDS = 8;
const SLIDE_FROM_ROUND = 5;
const NEAR_FROM_ROUND = 7;
const DAMPING = 0.02;
const SETTLED_DAMPING = 1e-4;
/** Labels within this many standard deviations of the nearest are looked at closely. */
const WINDOW = 5.5;
/** Longest step, in prior standard deviations of any one parameter. */
const LONGEST_STEP = 1.5;
/** Prior spread of a sample's thickness about its assignment, nm: lets the fit slide samples along the chart. */
const SLIDE_NM = 60;

/** Working arrays of one fit. */
interface Workspace {
  readonly evaluator: ModelEvaluator;
  readonly chart: Float64Array;
  /** Change of the codes a label, and half its length: the stretch a label stands for. */
  readonly tangent: Float64Array;
  readonly reach: Float64Array;
  /** Soft count of samples assigned to each label, and the sum of their codes. */
  readonly weight: Float64Array;
  readonly sum: Float64Array;
  readonly cost: Float64Array;
  readonly jacobian: Float64Array;
  readonly hessian: Float64Array;
  readonly gradient: Float64Array;
  /** Fitted level of a card whose reflectance is not stated. */
  cardLevel: number;
}

interface Assignment {
  /** Minus twice the log likelihood of the samples, outlier class included. */
  readonly cost: number;
  /** Squared distance from the chart, weighed by film membership. */
  readonly square: number;
  readonly film: number;
}

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
    evaluator: modelEvaluator(input.model),
    chart: new Float64Array(3 * labels),
    tangent: new Float64Array(3 * labels),
    reach: new Float64Array(labels),
    weight: new Float64Array(labels),
    sum: new Float64Array(3 * labels),
    cost: new Float64Array(labels),
    jacobian: new Float64Array(3 * PARAMETERS),
    hessian: new Float64Array(PARAMETERS * PARAMETERS),
    gradient: new Float64Array(PARAMETERS),
    cardLevel: 0.5,
  };
  const sampleNm = new Float64Array(count);
  const parameters = Float64Array.from(input.start);
  const rounds = ANNEALING.length + SETTLING_ROUNDS;
  for (let round = input.near ? NEAR_FROM_ROUND : 0; round < rounds; round++) {
    const sd = Math.max(input.sampleSd, ANNEALING[round] ?? 0);
    drawChart(work, parameters);
    assign(work, input, sd, sampleNm);
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
  const end = assign(work, input, input.sampleSd, sampleNm);
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

function drawChart(work: Workspace, parameters: Float64Array): void {
  const { chart, tangent, reach, evaluator } = work;
  const labels = reach.length;
  evaluator.moveTo(parameters, false);
  for (let j = 0; j < labels; j++) evaluator.codesAt(j, chart, 3 * j);
  for (let j = 0; j < labels; j++) {
    const before = Math.max(0, j - 1);
    const after = Math.min(labels - 1, j + 1);
    let square = 0;
    for (let c = 0; c < 3; c++) {
      const t = (chart[3 * after + c]! - chart[3 * before + c]!) / (after - before);
      tangent[3 * j + c] = t;
      square += t * t;
    }
    reach[j] = Math.sqrt(square) / 2;
  }
}

/** Where in its stretch (-1/2 .. 1/2 label) label j comes nearest to a colour. */
function slideOf(work: Workspace, j: number, r: number, g: number, b: number): number {
  const { chart, tangent, reach } = work;
  const along =
    (r - chart[3 * j]!) * tangent[3 * j]! +
    (g - chart[3 * j + 1]!) * tangent[3 * j + 1]! +
    (b - chart[3 * j + 2]!) * tangent[3 * j + 2]!;
  const s = along / (4 * reach[j]! * reach[j]! + 1e-12);
  return s < -0.5 ? -0.5 : Math.min(s, 0.5);
}

/** Soft assignment of every sample to the labels at noise `sd`; fills `weight`, `sum` and `sampleNm`. */
function assign(work: Workspace, input: FitInput, sd: number, sampleNm: Float64Array): Assignment {
  const { chart, weight, sum, cost, tangent, reach } = work;
  const { samples } = input;
  const labels = weight.length;
  const perCode = 1 / (sd * sd);
  const outlier = Math.exp(-(OUTLIER_DISTANCE ** 2) / 2);
  weight.fill(0);
  sum.fill(0);
  let total = 0;
  let square = 0;
  let film = 0;
  for (let i = 0; i < sampleNm.length; i++) {
    const r = samples[3 * i]!;
    const g = samples[3 * i + 1]!;
    const b = samples[3 * i + 2]!;
    const from = input.allowed ? input.allowed[2 * i]! : 0;
    const to = input.allowed ? input.allowed[2 * i + 1]! : labels;
    let least = Number.POSITIVE_INFINITY;
    for (let j = from; j < to; j++) {
      const dr = r - chart[3 * j]!;
      const dg = g - chart[3 * j + 1]!;
      const db = b - chart[3 * j + 2]!;
      const d = dr * dr + dg * dg + db * db;
      cost[j] = d;
      const gap = Math.sqrt(d) - reach[j]!;
      const bound = gap > 0 ? gap * gap : 0;
      if (bound < least) least = bound;
    }
    // Labels stand for stretches of the chart: where one could matter, its distance is that of the stretch.
    const window = (Math.sqrt(least) + sd * WINDOW) ** 2;
    least = Number.POSITIVE_INFINITY;
    for (let j = from; j < to; j++) {
      const gap = Math.sqrt(cost[j]!) - reach[j]!;
      if (gap > 0 && gap * gap > window) {
        cost[j] = Number.POSITIVE_INFINITY;
        continue;
      }
      const s = slideOf(work, j, r, g, b);
      const dr = r - chart[3 * j]! - s * tangent[3 * j]!;
      const dg = g - chart[3 * j + 1]! - s * tangent[3 * j + 1]!;
      const db = b - chart[3 * j + 2]! - s * tangent[3 * j + 2]!;
      const d = (dr * dr + dg * dg + db * db) * perCode;
      cost[j] = d;
      if (d < least) least = d;
    }
    if (!(least < DISTANT)) {
      total += OUTLIER_DISTANCE ** 2;
      sampleNm[i] = Number.NaN;
      continue;
    }
    let evidence = 0;
    let moment = 0;
    let distance = 0;
    for (let j = from; j < to; j++) {
      const excess = cost[j]! - least;
      if (excess > NEGLIGIBLE) continue;
      const w = Math.exp(-excess / 2);
      evidence += w;
      moment += w * (j + slideOf(work, j, r, g, b));
      distance += w * cost[j]!;
    }
    const likelihood = Math.exp(-least / 2);
    const membership = likelihood / (likelihood + outlier);
    for (let j = from; j < to; j++) {
      const excess = cost[j]! - least;
      if (excess > NEGLIGIBLE) continue;
      const w = (membership * Math.exp(-excess / 2)) / evidence;
      const s = slideOf(work, j, r, g, b);
      weight[j]! += w;
      sum[3 * j]! += w * (r - s * tangent[3 * j]!);
      sum[3 * j + 1]! += w * (g - s * tangent[3 * j + 1]!);
      sum[3 * j + 2]! += w * (b - s * tangent[3 * j + 2]!);
    }
    total -= 2 * Math.log(likelihood + outlier);
    square += (membership * (distance / evidence)) / perCode;
    film += membership;
    sampleNm[i] = membership > 0.5 ? (moment / evidence) * input.model.basis.stepNm : Number.NaN;
  }
  return { cost: total, square, film };
}

/**
 * Adds the evidence of codes seen against the model row in `work.jacobian`, with precision `weight / sd^2` a channel,
 * less what sliding along (t0, t1, t2) can explain. Returns the weighted squared residual.
 */
function addEvidence(
  work: Workspace,
  residual: readonly [number, number, number],
  weight: number,
  tangent: readonly [number, number, number],
  share: number,
): number {
  const { jacobian, hessian, gradient } = work;
  const [t0, t1, t2] = tangent;
  const along = share * (t0 * residual[0] + t1 * residual[1] + t2 * residual[2]);
  const r0 = residual[0] - along * t0;
  const r1 = residual[1] - along * t1;
  const r2 = residual[2] - along * t2;
  for (let p = 0; p < PARAMETERS; p++) {
    const j0 = jacobian[p]!;
    const j1 = jacobian[PARAMETERS + p]!;
    const j2 = jacobian[2 * PARAMETERS + p]!;
    const slide = share * (t0 * j0 + t1 * j1 + t2 * j2);
    const p0 = weight * (j0 - slide * t0);
    const p1 = weight * (j1 - slide * t1);
    const p2 = weight * (j2 - slide * t2);
    gradient[p]! += weight * (j0 * r0 + j1 * r1 + j2 * r2);
    const row = p * PARAMETERS;
    for (let q = 0; q <= p; q++) {
      hessian[row + q]! +=
        p0 * jacobian[q]! + p1 * jacobian[PARAMETERS + q]! + p2 * jacobian[2 * PARAMETERS + q]!;
    }
  }
  return weight * (residual[0] * r0 + residual[1] * r1 + residual[2] * r2);
}

/**
 * Fills `hessian` and `gradient` at `parameters` (the evaluator must be there, with derivatives) for the present
 * assignment, the references and the prior. Returns prior and reference terms of minus twice the log posterior.
 */
function normalEquations(
  work: Workspace,
  input: FitInput,
  parameters: Float64Array,
  sd: number,
  slide: boolean,
): number {
  const { hessian, gradient, chart, tangent, weight, sum, evaluator } = work;
  const labels = weight.length;
  hessian.fill(0);
  gradient.fill(0);
  const step = input.model.basis.stepNm;
  for (let j = 0; j < labels; j++) {
    const w = weight[j]!;
    if (w < 1e-3) continue;
    evaluator.jacobianAt(j, work.jacobian);
    const t0 = tangent[3 * j]! / step;
    const t1 = tangent[3 * j + 1]! / step;
    const t2 = tangent[3 * j + 2]! / step;
    const share = slide ? 1 / (t0 * t0 + t1 * t1 + t2 * t2 + (sd / SLIDE_NM) ** 2) : 0;
    addEvidence(
      work,
      [
        chart[3 * j]! - sum[3 * j]! / w,
        chart[3 * j + 1]! - sum[3 * j + 1]! / w,
        chart[3 * j + 2]! - sum[3 * j + 2]! / w,
      ],
      (input.sampleWeight * w) / (sd * sd),
      [t0, t1, t2],
      share,
    );
  }
  let cost = 0;
  for (const reference of input.references) cost += addReference(work, reference);
  const { mean, precision } = input.prior;
  for (let p = 0; p < PARAMETERS; p++) {
    let pull = 0;
    for (let q = 0; q < PARAMETERS; q++) {
      pull += precision[p * PARAMETERS + q]! * (parameters[q]! - mean[q]!);
      if (q <= p) hessian[p * PARAMETERS + q]! += precision[p * PARAMETERS + q]!;
    }
    gradient[p]! += pull;
    cost += pull * (parameters[p]! - mean[p]!);
  }
  for (let p = 0; p < PARAMETERS; p++) {
    for (let q = 0; q < p; q++) hessian[q * PARAMETERS + p] = hessian[p * PARAMETERS + q]!;
  }
  return cost;
}

function addReference(work: Workspace, reference: ReferenceEvidence): number {
  const { evaluator } = work;
  const seen = reference.codes;
  const model = new Float64Array(3);
  let tangent: [number, number, number] = [0, 0, 0];
  let share = 0;
  if (reference.kind === 'clean') {
    evaluator.codesAt(0, model, 0);
    evaluator.jacobianAt(0, work.jacobian);
  } else {
    let level = reference.kind === 'dark' ? 0 : (reference.reflectance ?? work.cardLevel);
    if (reference.kind === 'card' && reference.reflectance === null) {
      level = work.cardLevel = cardLevelFor(evaluator, seen, level);
      const above = new Float64Array(3);
      evaluator.codesOfLevel(level * 1.01, above, 0);
      evaluator.codesOfLevel(level, model, 0);
      tangent = [above[0]! - model[0]!, above[1]! - model[1]!, above[2]! - model[2]!];
      share = 1 / (tangent[0] ** 2 + tangent[1] ** 2 + tangent[2] ** 2 + 1e-9);
    }
    evaluator.codesOfLevel(level, model, 0);
    evaluator.jacobianOfLevel(level, work.jacobian);
  }
  const residual: [number, number, number] = [model[0]! - seen[0], model[1]! - seen[1], model[2]! - seen[2]];
  return addEvidence(work, residual, 1 / reference.sd ** 2, tangent, share);
}

/** Level of a card of unknown reflectance that comes closest to the codes seen (bisection on the sum of channels). */
function cardLevelFor(evaluator: ModelEvaluator, seen: readonly number[], _start: number): number {
  const model = new Float64Array(3);
  let low = 0;
  let high = 4;
  for (let k = 0; k < 40; k++) {
    const level = (low + high) / 2;
    evaluator.codesOfLevel(level, model, 0);
    if (model[0]! + model[1]! + model[2]! < seen[0]! + seen[1]! + seen[2]!) low = level;
    else high = level;
  }
  return (low + high) / 2;
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
