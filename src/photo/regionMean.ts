import { brightFrom, clippedFrom } from './exposure.ts';
import { pixelsOf, type Rectangle } from './rectangle.ts';
import { linearTable } from './toneTable.ts';
import type { PhotoPixels } from './types.ts';

type Three = readonly [number, number, number];

/** What a reference rectangle holds. Each triple is R, G, B. */
export interface RegionMean {
  /** Code values 0..maxCode: mean without the lowest and the highest tenth, so that a speck or a glint does not count. */
  readonly mean: Three;
  readonly median: Three;
  /** Standard deviation of one pixel, in codes: winsorised by the same tenths, made consistent for normal noise. */
  readonly sd: Three;
  /** Linear light 0..1 in the photo's own primaries, mean over the same pixels as `mean`. */
  readonly linear: Three;
  /** Share of the pixels with a channel at or above 254/255 of the largest code. */
  readonly clippedShare: number;
  /** Share of the pixels with every channel below 8/255. */
  readonly darkShare: number;
  /** Pixels of the rectangle that lie on the photo. */
  readonly count: number;
}

const TRIM = 0.1;
/**
 * Standard deviation of a unit normal after its outer tenths are drawn in to the 10 % and 90 % points z = 1.28155:
 * sqrt(0.8 - 2 z phi(z) + 0.2 z^2). (Wilcox 2012, Introduction to Robust Estimation, 3.3; evaluated here.)
 */
const WINSORISED_SD = 0.823805;

/**
 * Robust mean and spread of a rectangle, by a histogram of each channel.
 * @throws PhotoError where the rectangle misses the photo
 */
export function regionMean(pixels: PhotoPixels, rectangle: Rectangle): RegionMean {
  const { codes, channels, width, maxCode } = pixels;
  const [left, top, right, bottom] = pixelsOf(rectangle, pixels);
  const clippedCode = clippedFrom(maxCode);
  const brightCode = brightFrom(maxCode);
  const histograms = [0, 1, 2].map(() => new Uint32Array(maxCode + 1));
  const [red, green, blue] = histograms as [Uint32Array, Uint32Array, Uint32Array];
  let clipped = 0;
  let dark = 0;
  for (let y = top; y < bottom; y++) {
    const end = (y * width + right) * channels;
    for (let at = (y * width + left) * channels; at < end; at += channels) {
      const r = codes[at]!;
      const g = codes[at + 1]!;
      const b = codes[at + 2]!;
      red[r]!++;
      green[g]!++;
      blue[b]!++;
      const brightest = Math.max(r, g, b);
      if (brightest >= clippedCode) clipped++;
      if (brightest < brightCode) dark++;
    }
  }
  const count = (right - left) * (bottom - top);
  const table = linearTable(pixels.encoding, maxCode);
  const [r, g, b] = histograms.map((histogram) => summary(histogram, count, table)) as [
    Summary,
    Summary,
    Summary,
  ];
  return {
    mean: [r.mean, g.mean, b.mean],
    median: [r.median, g.median, b.median],
    sd: [r.sd, g.sd, b.sd],
    linear: [r.linear, g.linear, b.linear],
    clippedShare: clipped / count,
    darkShare: dark / count,
    count,
  };
}

interface Summary {
  readonly mean: number;
  readonly median: number;
  readonly sd: number;
  readonly linear: number;
}

function summary(histogram: Uint32Array, count: number, table: Float32Array): Summary {
  const low = codeAtRank(histogram, TRIM * count);
  const high = codeAtRank(histogram, (1 - TRIM) * count);
  let sum = 0;
  let light = 0;
  let first = 0;
  let second = 0;
  let below = 0;
  for (let code = 0; code < histogram.length; code++) {
    const here = histogram[code]!;
    if (here === 0) continue;
    // The part of this code's pixels whose rank lies between the tenths: exact, ties and all.
    const kept = Math.min(below + here, (1 - TRIM) * count) - Math.max(below, TRIM * count);
    if (kept > 0) {
      sum += kept * code;
      light += kept * table[code]!;
    }
    const drawnIn = Math.min(Math.max(code, low), high);
    first += here * drawnIn;
    second += here * drawnIn * drawnIn;
    below += here;
  }
  const share = (1 - 2 * TRIM) * count;
  const variance = Math.max(0, second / count - (first / count) ** 2);
  return {
    mean: sum / share,
    median: codeAtRank(histogram, count / 2),
    sd: Math.sqrt(variance) / WINSORISED_SD,
    linear: light / share,
  };
}

/** Smallest code with at least `rank` pixels at or below it. */
function codeAtRank(histogram: Uint32Array, rank: number): number {
  let below = 0;
  for (let code = 0; code < histogram.length; code++) {
    below += histogram[code]!;
    if (below >= rank && below > 0) return code;
  }
  return histogram.length - 1;
}
