import { BLOCK, type SearchChart } from './codeChart.ts';

/** Ways to read one colour that are kept: more than six orders never fit alike within the resolvable range. */
export const MAX_MODES = 6;
/** Numbers kept of a mode: thickness, low, high (nm), minus twice log evidence. */
export const MODE_FIELDS = 4;
/**
 * Prior density of thickness, proportional to (thickness + 100 nm) to the power of minus half of this: thin films cover
 * more area than thick ones, and a scale-free prior says so without favouring any order.
 */
const PRIOR = 3;
/** Labels whose cost is this far above the best have less than one part in 10^3 of its density. */
const DEPTH = 14;
/** Two dips of the cost are one mode when the ridge between them is lower than this (a factor 2.7 in density). */
const RIDGE = 2;
/** Tail left out on either side of the 90 % interval. */
const TAIL = 0.05;

/** The modes of one colour's posterior over thickness; reused from call to call. */
export interface Modes {
  count: number;
  /** MODE_FIELDS a mode, likeliest first. */
  readonly values: Float64Array;
  /** Squared Mahalanobis distance of the colour from the nearest chart colour. */
  distance: number;
}

export function makeModes(): Modes {
  return { count: 0, values: new Float64Array(MAX_MODES * MODE_FIELDS), distance: 0 };
}

/**
 * A reader of single colours: posterior over thickness for a flat prior and Gaussian codes, by exact search.
 *
 * Whole blocks of the chart are skipped when even the nearest point of their bounding ball could not come within
 * `DEPTH` of the best; the result is that of trying every label.
 */
export function posteriorReader(chart: SearchChart): (r: number, g: number, b: number, out: Modes) => void {
  const { count, codes, precision, logDeterminant, thicknessNm, blocks, balls, leastPrecision } = chart;
  // What a label costs whatever the colour: its covariance's size, and the prior.
  const constant = Float64Array.from(logDeterminant, (v, j) => v + PRIOR * Math.log(thicknessNm[j]! + 100));
  const leastConstant = new Float64Array(blocks).fill(Number.POSITIVE_INFINITY);
  for (let j = 0; j < count; j++) {
    const block = Math.floor(j / BLOCK);
    leastConstant[block] = Math.min(leastConstant[block]!, constant[j]!);
  }
  const cost = new Float64Array(count + 2);
  const weight = new Float64Array(count);
  const bound = new Float64Array(blocks);
  const open = new Int32Array(blocks);
  const startOf = new Int32Array(64);
  const endOf = new Int32Array(64);
  const bestOf = new Float64Array(64);
  let bestLabel = 0;

  function tryBlock(block: number, r: number, g: number, b: number): number {
    const to = Math.min(count, (block + 1) * BLOCK);
    let least = Number.POSITIVE_INFINITY;
    for (let j = block * BLOCK; j < to; j++) {
      const x = r - codes[3 * j]!;
      const y = g - codes[3 * j + 1]!;
      const z = b - codes[3 * j + 2]!;
      const w = 6 * j;
      const d =
        precision[w]! * x * x +
        precision[w + 1]! * y * y +
        precision[w + 2]! * z * z +
        2 * (precision[w + 3]! * x * y + precision[w + 4]! * x * z + precision[w + 5]! * y * z) +
        constant[j]!;
      cost[j] = d;
      if (d < least) least = d;
    }
    return least;
  }

  return (r, g, b, out) => {
    let nearest = 0;
    let nearestBound = Number.POSITIVE_INFINITY;
    for (let block = 0; block < blocks; block++) {
      const at = 4 * block;
      const x = r - balls[at]!;
      const y = g - balls[at + 1]!;
      const z = b - balls[at + 2]!;
      const gap = Math.max(0, Math.sqrt(x * x + y * y + z * z) - balls[at + 3]!);
      const least = gap * gap * leastPrecision[block]! + leastConstant[block]!;
      bound[block] = least;
      if (least < nearestBound) {
        nearestBound = least;
        nearest = block;
      }
    }
    let best = tryBlock(nearest, r, g, b);
    for (let block = 0; block < blocks; block++) {
      if (block === nearest || bound[block]! > best) continue;
      best = Math.min(best, tryBlock(block, r, g, b));
      bound[block] = Number.NEGATIVE_INFINITY;
    }
    bound[nearest] = Number.NEGATIVE_INFINITY;
    let opened = 0;
    for (let block = 0; block < blocks; block++) {
      if (bound[block]! > best + DEPTH) continue;
      if (bound[block]! > Number.NEGATIVE_INFINITY) tryBlock(block, r, g, b);
      open[opened++] = block;
    }
    const found = findDips(opened, best);
    collect(found, best, out);
    out.distance = Math.max(0, distanceAt(r, g, b));
  };

  /** Splits the labels within DEPTH of the best into dips. */
  function findDips(opened: number, best: number): number {
    let found = 0;
    let inside = false;
    let dipBest = 0;
    let ridge = 0;
    let previous = -2;
    let leastCost = Number.POSITIVE_INFINITY;
    let ridgeAt = 0;
    for (let k = 0; k < opened; k++) {
      const from = open[k]! * BLOCK;
      const to = Math.min(count, from + BLOCK);
      for (let j = from; j < to; j++) {
        const c = cost[j]!;
        if (c < leastCost) {
          leastCost = c;
          bestLabel = j;
        }
        if (c > best + DEPTH || j !== previous + 1) {
          if (inside) {
            inside = false;
            bestOf[found - 1] = dipBest;
          }
          if (c > best + DEPTH) {
            previous = j;
            continue;
          }
        }
        previous = j;
        if (!inside) {
          if (found >= 64) return found;
          inside = true;
          startOf[found] = j;
          endOf[found] = j + 1;
          dipBest = c;
          ridge = c;
          ridgeAt = j;
          found++;
          continue;
        }
        endOf[found - 1] = j + 1;
        if (c > ridge) {
          ridge = c;
          ridgeAt = j;
        }
        if (ridge > dipBest + RIDGE && c < ridge - RIDGE && found < 64) {
          // A new dip beyond a real ridge: cut at the ridge.
          endOf[found - 1] = ridgeAt;
          bestOf[found - 1] = dipBest;
          startOf[found] = ridgeAt;
          endOf[found] = j + 1;
          found++;
          dipBest = c;
          ridge = c;
          ridgeAt = j;
        } else if (c < dipBest) {
          dipBest = c;
          ridge = c;
          ridgeAt = j;
        }
      }
    }
    if (inside) bestOf[found - 1] = dipBest;
    return found;
  }

  function collect(found: number, best: number, out: Modes): void {
    out.count = 0;
    for (let k = 0; k < found; k++) {
      const from = startOf[k]!;
      const to = endOf[k]!;
      let mass = 0;
      let moment = 0;
      for (let j = from; j < to; j++) {
        const w = Math.exp((best - cost[j]!) / 2);
        weight[j] = w;
        mass += w;
        moment += w * thicknessNm[j]!;
      }
      const evidence = best - 2 * Math.log(mass);
      insertMode(
        out,
        moment / mass,
        quantile(from, to, mass * TAIL),
        quantile(from, to, mass * (1 - TAIL)),
        evidence,
      );
    }
  }

  /** Thickness below which `part` of the dip's mass lies; labels stand for cells about themselves. */
  function quantile(from: number, to: number, part: number): number {
    const step = thicknessNm[1]! - thicknessNm[0]!;
    let sum = 0;
    for (let j = from; j < to; j++) {
      const w = weight[j]!;
      if (sum + w >= part) return Math.max(0, thicknessNm[j]! + step * ((part - sum) / w - 0.5));
      sum += w;
    }
    return thicknessNm[to - 1]!;
  }

  function distanceAt(r: number, g: number, b: number): number {
    const j = bestLabel;
    const x = r - codes[3 * j]!;
    const y = g - codes[3 * j + 1]!;
    const z = b - codes[3 * j + 2]!;
    const w = 6 * j;
    return (
      precision[w]! * x * x +
      precision[w + 1]! * y * y +
      precision[w + 2]! * z * z +
      2 * (precision[w + 3]! * x * y + precision[w + 4]! * x * z + precision[w + 5]! * y * z)
    );
  }
}

/** Keeps `out` sorted by evidence, likeliest first. */
function insertMode(out: Modes, thickness: number, low: number, high: number, evidence: number): void {
  const { values } = out;
  let place = out.count;
  while (place > 0 && values[(place - 1) * MODE_FIELDS + 3]! > evidence) place--;
  if (place >= MAX_MODES) return;
  const last = Math.min(out.count, MAX_MODES - 1);
  for (let k = last; k > place; k--)
    values.copyWithin(k * MODE_FIELDS, (k - 1) * MODE_FIELDS, k * MODE_FIELDS);
  values[place * MODE_FIELDS] = thickness;
  values[place * MODE_FIELDS + 1] = low;
  values[place * MODE_FIELDS + 2] = high;
  values[place * MODE_FIELDS + 3] = evidence;
  out.count = Math.min(MAX_MODES, out.count + 1);
}
