import { deltaE2000 } from '../../colour/deltaE2000.ts';
import type { ChartView } from '../../engine/contract.ts';

/** Noise of an eye or a phone on one patch, CIEDE2000: the figure for which the chart states its resolvable range. */
export const NOISE_DELTA_E = 2;
/** Two patches of that noise that differ by no more than this are hard to tell apart. */
export const LIKE_DELTA_E = 2 * NOISE_DELTA_E;
/** Thicknesses closer than this share a colour because they are neighbours, not because orders repeat. */
const LEAST_APART_NM = 60;
/** Half-width of a 90 % interval in standard deviations of a normal distribution. */
const COVER_90 = 1.6449;

export interface LikeColour {
  readonly thicknessNm: number;
  readonly order: number;
  /** CIEDE2000. */
  readonly deltaE: number;
}

/** Order of a thickness, 1 from the first bright band. */
export function orderAt(nm: number, boundariesNm: readonly number[]): number {
  return 1 + boundariesNm.filter((boundary) => boundary <= nm).length;
}

/** The chart's row nearest to a thickness. */
export function rowAt({ stepNm, count }: Pick<ChartView, 'stepNm' | 'count'>, nm: number): number {
  return Math.min(count - 1, Math.max(0, Math.round(nm / stepNm)));
}

/**
 * Thicknesses of other orders whose colour is hard to tell from the one at `nm`: of each order the likest, if within
 * `LIKE_DELTA_E`; likest first.
 */
export function likeColours(view: ChartView, nm: number): LikeColour[] {
  const own = rowAt(view, nm);
  const ownOrder = orderAt(own * view.stepNm, view.orderBoundariesNm);
  const best = new Map<number, LikeColour>();
  for (let j = 0; j < view.count; j++) {
    const thicknessNm = j * view.stepNm;
    if (Math.abs(thicknessNm - own * view.stepNm) < LEAST_APART_NM) continue;
    const order = orderAt(thicknessNm, view.orderBoundariesNm);
    if (order === ownOrder) continue;
    const deltaE = deltaE2000(view.lab, own, view.lab, j);
    if (deltaE <= LIKE_DELTA_E && deltaE < (best.get(order)?.deltaE ?? Number.POSITIVE_INFINITY)) {
      best.set(order, { thicknessNm, order, deltaE });
    }
  }
  return [...best.values()].sort((a, b) => a.deltaE - b.deltaE);
}

/** The pairs worth marking on a ruler: of each two orders the likest, no pair of mere neighbours. */
export function markedPairs(view: ChartView): ChartView['lookAlikes'] {
  const best = new Map<string, ChartView['lookAlikes'][number]>();
  for (const pair of view.lookAlikes) {
    if (pair.bNm - pair.aNm < LEAST_APART_NM || pair.bNm > view.resolvableNm.toNm) continue;
    const key = `${orderAt(pair.aNm, view.orderBoundariesNm)}-${orderAt(pair.bNm, view.orderBoundariesNm)}`;
    if (pair.deltaE < (best.get(key)?.deltaE ?? Number.POSITIVE_INFINITY)) best.set(key, pair);
  }
  return [...best.values()].sort((p, q) => p.deltaE - q.deltaE);
}

/**
 * What the stated noise leaves of a reading at `nm`, the order given: the stretch around it whose colours lie within
 * 1.645 standard deviations of the noise. Walked colour by colour, because the chart turns back at its extremes, where a
 * slope would promise nothing or too much. An end at the chart's own end means: or beyond.
 */
export function intervalAt(view: ChartView, nm: number): { lowNm: number; highNm: number } {
  const own = rowAt(view, nm);
  const walk = (step: number) => {
    let j = own;
    while (
      j + step >= 0 &&
      j + step < view.count &&
      deltaE2000(view.lab, own, view.lab, j + step) <= COVER_90 * NOISE_DELTA_E
    ) {
      j += step;
    }
    return j * view.stepNm;
  };
  return { lowNm: walk(-1), highNm: walk(1) };
}

/** Whether a colour alone can tell this thickness, given its order. */
export function placeInRange(
  { resolvableNm: { fromNm, toNm } }: Pick<ChartView, 'resolvableNm'>,
  nm: number,
): 'tooThin' | 'within' | 'tooThick' {
  if (nm < fromNm) return 'tooThin';
  return nm > toNm ? 'tooThick' : 'within';
}
