import type { CameraModel, ModelEvaluator } from './cameraModel.ts';
import type { FilmBasis } from './filmBasis.ts';
import type { Prior } from './parameters.ts';

/** A colour marked on the photo whose film is known: bare surface, a card, black. Codes of 255. */
export interface ReferenceEvidence {
  readonly kind: 'clean' | 'card' | 'dark';
  readonly codes: readonly [number, number, number];
  /** Standard deviation of that mean colour, with what the marked patch itself may vary. */
  readonly sd: number;
  /** Of a card: its reflectance, or null where only its colour counts. */
  readonly reflectance: number | null;
  /** Row of the basis that a clean surface shows: thickness 0 at the angle it is seen at; 0 where left out. */
  readonly row?: number;
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
  /** True to stop after the annealing: enough to tell which of several starts leads somewhere. */
  readonly scout?: boolean;
  /** Allowed labels of each sample as [from, to) rows, or null for all: orders already settled by neighbours or pins. */
  readonly allowed?: Uint32Array | null;
}

/** Working arrays of one fit. */
export interface Workspace {
  readonly basis: FilmBasis;
  readonly evaluator: ModelEvaluator;
  readonly chart: Float64Array;
  /** Change of the codes a label, and half its length: the stretch a label stands for. */
  readonly tangent: Float64Array;
  readonly reach: Float64Array;
  /** Half the second difference of the codes: a stretch is an arc, and its chord would lie to one side of the colours. */
  readonly bend: Float64Array;
  /** Soft count of samples assigned to each label, and the sum of their codes. */
  readonly weight: Float64Array;
  readonly sum: Float64Array;
  readonly cost: Float64Array;
  /** Labels that could matter to a sample, and where in their stretch it comes nearest. */
  readonly open: Int32Array;
  readonly slide: Float64Array;
  readonly jacobian: Float64Array;
  readonly hessian: Float64Array;
  readonly gradient: Float64Array;
  /** Fitted level of a card whose reflectance is not stated. */
  cardLevel: number;
}

/** Draws the chart at a parameter vector, with the stretch that each label stands for. */
export function drawChart(work: Workspace, parameters: Float64Array): void {
  const { chart, tangent, bend, reach, evaluator } = work;
  const labels = reach.length;
  const { basis } = work;
  const perAngle = basis.rowsPerAngle ?? basis.count;
  evaluator.moveTo(parameters, false);
  for (let j = 0; j < labels; j++) evaluator.codesAt(j, chart, 3 * j);
  for (let j = 0; j < labels; j++) {
    const first = j - (j % perAngle);
    const before = Math.max(first, j - 1);
    const after = Math.min(labels - 1, first + perAngle - 1, j + 1);
    let square = 0;
    for (let c = 0; c < 3; c++) {
      const t = (chart[3 * after + c]! - chart[3 * before + c]!) / Math.max(1, after - before);
      tangent[3 * j + c] = t;
      bend[3 * j + c] =
        after - before === 2
          ? (chart[3 * after + c]! - 2 * chart[3 * j + c]! + chart[3 * before + c]!) / 2
          : 0;
      square += t * t;
    }
    reach[j] = Math.sqrt(square) / 2;
  }
}
