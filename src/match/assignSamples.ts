import type { FitInput, Workspace } from './fitWorkspace.ts';

/** A sample this many standard deviations off the chart is as likely an outlier as film. */
const OUTLIER_DISTANCE = 4;
/** Beyond this squared distance (in standard deviations) a sample is surely no film. */
const DISTANT = 400;
/** Labels this much less likely than the best (minus twice the log) are left out of the soft assignment. */
const NEGLIGIBLE = 30;
/** Labels within this many standard deviations of the nearest are looked at closely. */
const WINDOW = 5.5;

export interface Assignment {
  /** Minus twice the log likelihood of the samples, outlier class included. */
  readonly cost: number;
  /** Squared distance from the chart, weighed by film membership. */
  readonly square: number;
  readonly film: number;
}

/** Soft assignment of every sample to the labels at noise `sd`; fills `weight`, `sum` and `sampleNm`. */
export function assignSamples(
  work: Workspace,
  input: FitInput,
  sd: number,
  sampleNm: Float64Array,
): Assignment {
  const { chart, weight, sum, cost, tangent, bend, reach, open, slide } = work;
  const { samples } = input;
  const labels = weight.length;
  const perAngle = work.basis.rowsPerAngle ?? labels;
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
    // Distance of the nearest label's stretch, codes; a label can be nearer only within that and its own reach.
    let nearest = Number.POSITIVE_INFINITY;
    for (let j = from; j < to; j++) {
      const dr = r - chart[3 * j]!;
      const dg = g - chart[3 * j + 1]!;
      const db = b - chart[3 * j + 2]!;
      const d = dr * dr + dg * dg + db * db;
      cost[j] = d;
      const within = nearest + reach[j]!;
      if (d < within * within) nearest = Math.max(0, Math.sqrt(d) - reach[j]!);
    }
    // Labels stand for stretches of the chart: where one could matter, its distance is that of the stretch.
    const window = nearest + sd * WINDOW;
    let least = Number.POSITIVE_INFINITY;
    let opened = 0;
    for (let j = from; j < to; j++) {
      const within = window + reach[j]!;
      if (cost[j]! > within * within) continue;
      const s = slideOf(work, j, r, g, b);
      const dr = r - chart[3 * j]! - s * (tangent[3 * j]! + s * bend[3 * j]!);
      const dg = g - chart[3 * j + 1]! - s * (tangent[3 * j + 1]! + s * bend[3 * j + 1]!);
      const db = b - chart[3 * j + 2]! - s * (tangent[3 * j + 2]! + s * bend[3 * j + 2]!);
      const d = (dr * dr + dg * dg + db * db) * perCode;
      cost[opened] = d;
      open[opened] = j;
      slide[opened] = s;
      opened++;
      if (d < least) least = d;
    }
    if (!(least < DISTANT)) {
      total += OUTLIER_DISTANCE ** 2;
      sampleNm[i] = Number.NaN;
      continue;
    }
    const first = from - (from % perAngle);
    let evidence = 0;
    let moment = 0;
    let distance = 0;
    for (let k = 0; k < opened; k++) {
      const excess = cost[k]! - least;
      const w = excess > NEGLIGIBLE ? 0 : Math.exp(-excess / 2);
      evidence += w;
      moment += w * (open[k]! - first + slide[k]!);
      distance += w * cost[k]!;
      cost[k] = w;
    }
    const likelihood = Math.exp(-least / 2);
    const membership = likelihood / (likelihood + outlier);
    for (let k = 0; k < opened; k++) {
      if (cost[k] === 0) continue;
      const j = open[k]!;
      const w = (membership * cost[k]!) / evidence;
      const s = slide[k]!;
      weight[j]! += w;
      sum[3 * j]! += w * (r - s * (tangent[3 * j]! + s * bend[3 * j]!));
      sum[3 * j + 1]! += w * (g - s * (tangent[3 * j + 1]! + s * bend[3 * j + 1]!));
      sum[3 * j + 2]! += w * (b - s * (tangent[3 * j + 2]! + s * bend[3 * j + 2]!));
    }
    total -= 2 * Math.log(likelihood + outlier);
    square += (membership * (distance / evidence)) / perCode;
    film += membership;
    sampleNm[i] = membership > 0.5 ? (moment / evidence) * input.model.basis.stepNm : Number.NaN;
  }
  return { cost: total, square, film };
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
