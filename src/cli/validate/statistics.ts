/** How far a thickness map is from the truth. Every film pixel is counted; none is set aside. */

/** Errors of one map against its truth, kept a pixel at a time so that several maps can be pooled. */
export interface ErrorSample {
  /** |estimate - truth| of every film pixel, nm; Infinity where there was no answer. */
  readonly absoluteErrorNm: Float32Array;
  readonly withoutAnswer: number;
  /** Film pixels with an interval or a lower bound, and how many of those hold the truth. */
  readonly withInterval: number;
  readonly holding: number;
}

export interface ErrorStatistics {
  readonly filmPixels: number;
  /** Quantiles over all film pixels; a pixel without an answer counts as infinitely far off. */
  readonly medianNm: number;
  readonly p90Nm: number;
  /** Shares of all film pixels. */
  readonly offByMoreThan50: number;
  readonly withoutAnswer: number;
  /** Share of the pixels with an interval whose interval holds the truth; NaN where there are none. */
  readonly coverage: number;
}

export interface ErrorInput {
  readonly trueNm: Float32Array;
  /** 1 on pixels to be counted. */
  readonly isFilm: Uint8Array;
  readonly thicknessNm: Float32Array;
  readonly lowNm: Float32Array;
  readonly highNm: Float32Array;
  /** Factor on the true thickness, for figures with the index error divided out. */
  readonly trueScale?: number;
}

/**
 * Compares a map with its truth. NaN thickness is "no answer"; a lower bound (low given, thickness and high NaN) has no
 * thickness but holds the truth when the truth is at or above it. All arrays have one value a pixel.
 */
export function sampleErrors(input: ErrorInput): ErrorSample {
  const { trueNm, isFilm, thicknessNm, lowNm, highNm, trueScale = 1 } = input;
  const count = trueNm.length;
  if ([isFilm, thicknessNm, lowNm, highNm].some((array) => array.length !== count)) {
    throw new RangeError(`The map and its truth differ in size: the truth has ${count} pixels.`);
  }
  let film = 0;
  for (let i = 0; i < count; i++) {
    film += isFilm[i] === 1 ? 1 : 0;
  }
  const absoluteErrorNm = new Float32Array(film);
  let next = 0;
  let withoutAnswer = 0;
  let withInterval = 0;
  let holding = 0;
  for (let i = 0; i < count; i++) {
    if (isFilm[i] !== 1) {
      continue;
    }
    const truth = trueNm[i]! * trueScale;
    const error = Math.abs(thicknessNm[i]! - truth);
    if (Number.isNaN(error)) {
      withoutAnswer++;
    }
    absoluteErrorNm[next++] = Number.isNaN(error) ? Number.POSITIVE_INFINITY : error;
    const low = lowNm[i]!;
    if (!Number.isNaN(low)) {
      withInterval++;
      const high = highNm[i]!;
      holding += truth >= low && (Number.isNaN(high) || truth <= high) ? 1 : 0;
    }
  }
  return { absoluteErrorNm, withoutAnswer, withInterval, holding };
}

/**
 * The `share` quantile (0..1) of ascending values by linear interpolation between order statistics (Hyndman & Fan 1996,
 * definition 7); Infinity as soon as an infinite value takes part. NaN for no values.
 */
export function quantileOfSorted(ascending: ArrayLike<number>, share: number): number {
  if (ascending.length === 0) {
    return Number.NaN;
  }
  const place = share * (ascending.length - 1);
  const below = Math.floor(place);
  const low = ascending[below]!;
  const high = ascending[Math.min(ascending.length - 1, below + 1)]!;
  const part = place - below;
  return part === 0 || low === high ? low : low + part * (high - low);
}

/** Pools the pixels of one map or several into one set of figures. */
export function summariseErrors(samples: readonly ErrorSample[]): ErrorStatistics {
  let count = 0;
  let withoutAnswer = 0;
  let withInterval = 0;
  let holding = 0;
  for (const sample of samples) {
    count += sample.absoluteErrorNm.length;
    withoutAnswer += sample.withoutAnswer;
    withInterval += sample.withInterval;
    holding += sample.holding;
  }
  const all = new Float32Array(count);
  let at = 0;
  for (const sample of samples) {
    all.set(sample.absoluteErrorNm, at);
    at += sample.absoluteErrorNm.length;
  }
  all.sort();
  let far = 0;
  for (let i = 0; i < count - withoutAnswer; i++) {
    far += all[i]! > 50 ? 1 : 0;
  }
  return {
    filmPixels: count,
    medianNm: quantileOfSorted(all, 0.5),
    p90Nm: quantileOfSorted(all, 0.9),
    offByMoreThan50: far / count,
    withoutAnswer: withoutAnswer / count,
    coverage: withInterval > 0 ? holding / withInterval : Number.NaN,
  };
}
