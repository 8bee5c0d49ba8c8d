import { squareTo } from './homography.ts';
import type { PhotoPixels } from './types.ts';

/** Four places on the photo, going round: upright photo pixels. */
export type FourCorners = readonly [
  readonly [number, number],
  readonly [number, number],
  readonly [number, number],
  readonly [number, number],
];

/** The colour of one patch: codes of 255. */
export interface PatchColour {
  readonly codes: readonly [number, number, number];
  /** Standard deviation of one pixel, all channels together. */
  readonly sd: number;
  /** Share of its pixels that are at the top of the file's range in a channel. */
  readonly clippedShare: number;
  /** Pixels across the part that was read, roughly. */
  readonly across: number;
}

/** Width of the gap between patches as a share of a patch; from common targets, and of no weight (see `INNER`). */
const GAP = 0.13;
/** Share of a patch, about its middle, that is read: corners may be off by a fifth of a patch. */
const INNER = 0.5;
/** Looks along each side of the part that is read. */
const LOOKS = 24;
const TRIM = 0.1;

/**
 * Mean colours of a grid of patches, row by row, without the lowest and highest tenth of each channel.
 * @param corners outer corners of the grid: of its first patch, the last of the first row, the last, the first of the last row
 */
export function patchColours(
  pixels: PhotoPixels,
  corners: FourCorners,
  columns: number,
  rows: number,
): PatchColour[] {
  const place = squareTo(corners);
  const middle = (k: number, count: number) => (k * (1 + GAP) + 0.5) / (count + (count - 1) * GAP);
  const reach = (count: number) => INNER / (count + (count - 1) * GAP);
  return Array.from({ length: columns * rows }, (_, patch) => {
    const u = middle(patch % columns, columns);
    const v = middle(Math.floor(patch / columns), rows);
    return readPatch(pixels, place, u, v, reach(columns), reach(rows));
  });
}

function readPatch(
  { codes, channels, maxCode, width, height }: PhotoPixels,
  place: (u: number, v: number) => readonly [number, number],
  u: number,
  v: number,
  spanU: number,
  spanV: number,
): PatchColour {
  const count = LOOKS * LOOKS;
  const seen = [new Float64Array(count), new Float64Array(count), new Float64Array(count)] as const;
  let clipped = 0;
  for (let k = 0; k < count; k++) {
    const [x, y] = place(
      u + spanU * (((k % LOOKS) + 0.5) / LOOKS - 0.5),
      v + spanV * ((Math.floor(k / LOOKS) + 0.5) / LOOKS - 0.5),
    );
    const column = Math.min(width - 1, Math.max(0, Math.floor(x)));
    const row = Math.min(height - 1, Math.max(0, Math.floor(y)));
    const at = (row * width + column) * channels;
    let most = 0;
    for (let c = 0; c < 3; c++) {
      const code = (255 * codes[at + c]!) / maxCode;
      seen[c]![k] = code;
      most = Math.max(most, code);
    }
    if (most >= 254) clipped++;
  }
  const [left, right] = [place(u - spanU / 2, v), place(u + spanU / 2, v)];
  const [top, bottom] = [place(u, v - spanV / 2), place(u, v + spanV / 2)];
  const means = seen.map(trimmed);
  return {
    codes: [means[0]!.mean, means[1]!.mean, means[2]!.mean],
    sd: Math.hypot(...means.map(({ sd }) => sd)) / Math.sqrt(3),
    clippedShare: clipped / count,
    across: Math.min(
      Math.hypot(right[0] - left[0], right[1] - left[1]),
      Math.hypot(bottom[0] - top[0], bottom[1] - top[1]),
    ),
  };
}

function trimmed(values: Float64Array): { readonly mean: number; readonly sd: number } {
  values.sort();
  const kept = values.subarray(Math.floor(TRIM * values.length), Math.ceil((1 - TRIM) * values.length));
  let sum = 0;
  let square = 0;
  for (const value of kept) {
    sum += value;
    square += value * value;
  }
  const mean = sum / kept.length;
  return { mean, sd: Math.sqrt(Math.max(0, square / kept.length - mean * mean)) };
}
