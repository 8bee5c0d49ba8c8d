import type { ModelEvaluator } from './cameraModel.ts';
import type { FitInput, ReferenceEvidence, Workspace } from './fitWorkspace.ts';
import { PARAMETERS } from './parameters.ts';

/** Prior spread of a sample's thickness about its assignment, nm: lets the fit slide samples along the chart. */
const SLIDE_NM = 60;

/**
 * Fills `hessian` and `gradient` at `parameters` (the evaluator must be there, with derivatives) for the present
 * assignment, the references and the prior. Returns prior and reference terms of minus twice the log posterior.
 */
export function normalEquations(
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

function addReference(work: Workspace, reference: ReferenceEvidence): number {
  const { evaluator } = work;
  const seen = reference.codes;
  const model = new Float64Array(3);
  let tangent: [number, number, number] = [0, 0, 0];
  let share = 0;
  if (reference.kind === 'clean') {
    evaluator.codesAt(reference.row ?? 0, model, 0);
    evaluator.jacobianAt(reference.row ?? 0, work.jacobian);
  } else {
    let level = reference.kind === 'dark' ? 0 : (reference.reflectance ?? work.cardLevel);
    if (reference.kind === 'card' && reference.reflectance === null) {
      level = work.cardLevel = cardLevelFor(evaluator, seen);
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
function cardLevelFor(evaluator: ModelEvaluator, seen: readonly number[]): number {
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
