/** Random numbers from outside, so that a result can be had again from its seed. */
export interface RandomNumbers {
  /** Uniform in [0, 1). */
  readonly next: () => number;
  /** Normal with mean 0 and standard deviation 1. */
  readonly normal: () => number;
}

export interface CoverageInterval {
  readonly low: number;
  readonly high: number;
}

/** What the trials say about the output quantity. */
export interface MonteCarloResult {
  readonly trials: number;
  /** Mean and standard deviation of the trials: estimate and standard uncertainty (JCGM 101:2008, 7.6). */
  readonly mean: number;
  readonly standardUncertainty: number;
  readonly coverage: number;
  /** As much probability below as above (7.7.2 with 5.3.3). */
  readonly symmetric: CoverageInterval;
  /** The narrowest with that coverage (7.7.3). */
  readonly shortest: CoverageInterval;
  /** Values of all trials in ascending order. */
  readonly sorted: Float64Array;
}

/**
 * Propagates distributions by a stated number of trials (JCGM 101:2008, clause 7). `model` draws its inputs from the
 * numbers it is given and returns one value of the output.
 * @throws RangeError where there are too few trials for the coverage, or a trial gives no number
 */
export function monteCarlo(
  model: (random: RandomNumbers) => number,
  random: RandomNumbers,
  trials: number,
  coverage = 0.95,
): MonteCarloResult {
  mustBeCoverage(coverage);
  const values = new Float64Array(trials);
  for (let i = 0; i < trials; i++) {
    values[i] = model(random);
  }
  return summarise(values, coverage);
}

/** The same from values at hand, in any order; they are copied. */
export function summarise(values: Float64Array, coverage: number): MonteCarloResult {
  mustBeCoverage(coverage);
  const trials = values.length;
  if (!(trials * (1 - coverage) >= 2)) {
    throw new RangeError(`${trials} trials are too few for a coverage of ${coverage}.`);
  }
  let mean = 0;
  for (let i = 0; i < trials; i++) {
    mean += (values[i]! - mean) / (i + 1);
  }
  let squares = 0;
  for (let i = 0; i < trials; i++) {
    squares += (values[i]! - mean) ** 2;
  }
  if (!Number.isFinite(squares)) {
    throw new RangeError('A Monte Carlo trial gave no number: check the ranges of the inputs.');
  }
  const sorted = values.slice().sort();
  return {
    trials,
    mean,
    standardUncertainty: Math.sqrt(squares / (trials - 1)),
    coverage,
    symmetric: symmetricInterval(sorted, coverage),
    shortest: shortestInterval(sorted, coverage),
    sorted,
  };
}

/** Ordered values q = pM apart, as many left out below as above (JCGM 101:2008, 7.7.2). */
export function symmetricInterval(sorted: Float64Array, coverage: number): CoverageInterval {
  const held = heldTrials(sorted.length, coverage);
  const first = Math.floor((sorted.length - held + 1) / 2);
  return { low: sorted[first - 1]!, high: sorted[first - 1 + held]! };
}

/** The pair of ordered values q = pM apart that lie closest together (JCGM 101:2008, 7.7.3). */
export function shortestInterval(sorted: Float64Array, coverage: number): CoverageInterval {
  const held = heldTrials(sorted.length, coverage);
  let best = 0;
  for (let first = 1; first + held < sorted.length; first++) {
    if (sorted[first + held]! - sorted[first]! < sorted[best + held]! - sorted[best]!) {
      best = first;
    }
  }
  return { low: sorted[best]!, high: sorted[best + held]! };
}

/** q of 7.7.1: pM where that is whole, else its integer part after half is added. */
function heldTrials(trials: number, coverage: number): number {
  return Math.min(trials - 1, Math.floor(trials * coverage + 0.5));
}

export interface AdaptiveOptions {
  readonly coverage?: number;
  /** Significant digits of the standard uncertainty to settle, 1 or 2. */
  readonly digits?: 1 | 2;
  readonly maxTrials?: number;
}

/**
 * Adds blocks of trials until mean, standard uncertainty and both ends of the symmetric interval are steady to half a
 * unit in the last of `digits` significant digits of the standard uncertainty (JCGM 101:2008, 7.9.4). `settled` is
 * false where `maxTrials` came first.
 */
export function adaptiveMonteCarlo(
  model: (random: RandomNumbers) => number,
  random: RandomNumbers,
  { coverage = 0.95, digits = 2, maxTrials = 2_000_000 }: AdaptiveOptions = {},
): MonteCarloResult & { readonly settled: boolean } {
  mustBeCoverage(coverage);
  const block = Math.max(10_000, Math.ceil(100 / (1 - coverage)));
  const blocks: MonteCarloResult[] = [];
  for (;;) {
    blocks.push(monteCarlo(model, random, block, coverage));
    const means = blocks.map(({ mean }) => mean);
    const uncertainties = blocks.map(({ standardUncertainty }) => standardUncertainty);
    const tolerance = numericalTolerance(pooled(means, uncertainties, block), digits);
    const settled =
      blocks.length > 1 &&
      [
        means,
        uncertainties,
        blocks.map(({ symmetric }) => symmetric.low),
        blocks.map(({ symmetric }) => symmetric.high),
      ].every((values) => 2 * standardDeviationOfMean(values) < tolerance);
    if (settled || (blocks.length + 1) * block > maxTrials) {
      const all = new Float64Array(blocks.length * block);
      blocks.forEach(({ sorted }, i) => {
        all.set(sorted, i * block);
      });
      return { ...summarise(all, coverage), settled };
    }
  }
}

/** Standard deviation of all trials from the means and standard deviations of equal blocks. */
function pooled(means: readonly number[], deviations: readonly number[], block: number): number {
  const mean = means.reduce((sum, m) => sum + m, 0) / means.length;
  const within = deviations.reduce((sum, s) => sum + s * s, 0) * (block - 1);
  const between = means.reduce((sum, m) => sum + (m - mean) ** 2, 0) * block;
  return Math.sqrt((within + between) / (means.length * block - 1));
}

/** Half a unit in the last of `digits` significant digits (JCGM 101:2008, 7.9.2). */
export function numericalTolerance(uncertainty: number, digits: number): number {
  return uncertainty > 0 ? 0.5 * 10 ** (Math.floor(Math.log10(uncertainty)) - digits + 1) : Number.MIN_VALUE;
}

function standardDeviationOfMean(values: readonly number[]): number {
  const mean = values.reduce((sum, v) => sum + v, 0) / values.length;
  const squares = values.reduce((sum, v) => sum + (v - mean) ** 2, 0);
  return Math.sqrt(squares / (values.length * (values.length - 1)));
}

function mustBeCoverage(coverage: number): void {
  if (!(coverage > 0 && coverage < 1)) {
    throw new RangeError('The coverage probability must lie between 0 and 1.');
  }
}
