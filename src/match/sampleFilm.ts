import type { PhotoPixels } from '../photo/types.ts';

/** Film colours taken from a photo for fitting the camera: noise averaged down, edges and texture left out. */
export interface FilmSample {
  readonly count: number;
  /** Smoothed code values on the 0..255 scale, 3 a sample. */
  readonly codes: Float64Array;
  /** Pixel positions, x then y. */
  readonly at: Float64Array;
  /** Standard deviation of a single pixel about its smooth neighbourhood, a channel, codes of 255. */
  readonly pixelNoise: Float64Array;
}

const REACH = 2;
const WINDOW = 25;
/** Centre value of a least-squares quadratic over 5 x 5: weight (27 - 5 r^2) / 175 (Savitzky & Golay 1964, in two dimensions). */
const CENTRE_VARIANCE = 27 / 175;

/** Variance of a sampled colour relative to a single pixel's. */
export const SAMPLE_VARIANCE_SHARE = CENTRE_VARIANCE;

const ORTHOGONAL = makeOrthogonalBasis();

/** 1, x, y, xy, x^2-2, y^2-2 on the 5 x 5 grid: orthogonal there, divided by their norms. */
function makeOrthogonalBasis(): Float64Array {
  const basis = new Float64Array(6 * WINDOW);
  for (let i = 0; i < WINDOW; i++) {
    const x = (i % 5) - REACH;
    const y = Math.floor(i / 5) - REACH;
    const values = [1, x, y, x * y, x * x - 2, y * y - 2];
    const norms = [25, 50, 50, 100, 70, 70];
    for (let k = 0; k < 6; k++) basis[k * WINDOW + i] = values[k]! / Math.sqrt(norms[k]!);
  }
  return basis;
}

const CENTRE_WEIGHTS = Float64Array.from({ length: WINDOW }, (_, i) => {
  const x = (i % 5) - REACH;
  const y = Math.floor(i / 5) - REACH;
  return (27 - 5 * (x * x + y * y)) / 175;
});

/** Small seeded generator (mulberry32), so that a photo always gives the same fit. */
function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/**
 * Draws up to `wanted` film colours, spread over the photo and over the colours that occur in it.
 *
 * A position counts when its whole 5 x 5 window is usable (`usable` non-zero) and a quadratic surface describes it to
 * within the photo's own noise: edges, glint and texture drop out. Colours that occur everywhere are thinned, so that
 * the rare thicknesses weigh in too.
 * @param usable one byte a pixel, or null for all
 */
export function sampleFilm(
  pixels: PhotoPixels,
  usable: Uint8Array | null,
  wanted: number,
  seed = 20261201,
): FilmSample {
  const { width, height, codes, channels } = pixels;
  const scale = 255 / pixels.maxCode;
  const random = seeded(seed);
  const tries = Math.min(width * height, wanted * 10);
  // A jittered grid of candidates covers the photo evenly.
  const spacing = Math.max(1, Math.sqrt((width * height) / tries));
  const columns = Math.floor(width / spacing);
  const rows = Math.floor(height / spacing);
  const most = columns * rows;
  const colour = new Float64Array(3 * most);
  const at = new Float64Array(2 * most);
  const residual = new Float64Array(3 * most);
  const window = new Float64Array(WINDOW);
  let count = 0;
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < columns; column++) {
      const x = Math.floor((column + random()) * spacing);
      const y = Math.floor((row + random()) * spacing);
      if (x < REACH || y < REACH || x >= width - REACH || y >= height - REACH) continue;
      if (usable && !windowUsable(usable, width, x, y)) continue;
      let clipped = false;
      for (let c = 0; c < 3; c++) {
        let i = 0;
        let square = 0;
        let centre = 0;
        for (let dy = -REACH; dy <= REACH; dy++) {
          for (let dx = -REACH; dx <= REACH; dx++) {
            const v = codes[((y + dy) * width + x + dx) * channels + c]! * scale;
            if (v >= 254) clipped = true;
            window[i] = v;
            square += v * v;
            centre += CENTRE_WEIGHTS[i]! * v;
            i++;
          }
        }
        for (let k = 0; k < 6; k++) {
          let projection = 0;
          for (i = 0; i < WINDOW; i++) projection += ORTHOGONAL[k * WINDOW + i]! * window[i]!;
          square -= projection * projection;
        }
        colour[count * 3 + c] = centre;
        residual[count * 3 + c] = Math.sqrt(Math.max(0, square) / (WINDOW - 6));
      }
      if (clipped) continue;
      at[count * 2] = x;
      at[count * 2 + 1] = y;
      count++;
    }
  }
  return thin(colour, at, residual, count, wanted, random);
}

function windowUsable(usable: Uint8Array, width: number, x: number, y: number): boolean {
  for (let dy = -REACH; dy <= REACH; dy++) {
    for (let dx = -REACH; dx <= REACH; dx++) {
      if (!usable[(y + dy) * width + x + dx]) return false;
    }
  }
  return true;
}

function medianOf(values: Float64Array): number {
  if (values.length === 0) return 0;
  const sorted = values.slice().sort();
  return sorted[sorted.length >> 1]!;
}

/** Keeps the smooth windows, thins crowded colours (cells of 6 codes) and reports the noise seen. */
function thin(
  colour: Float64Array,
  at: Float64Array,
  residual: Float64Array,
  count: number,
  wanted: number,
  random: () => number,
): FilmSample {
  const pixelNoise = new Float64Array(3);
  for (let c = 0; c < 3; c++) {
    const column = new Float64Array(count);
    for (let i = 0; i < count; i++) column[i] = residual[i * 3 + c]!;
    pixelNoise[c] = Math.max(0.3, medianOf(column));
  }
  const order = Uint32Array.from({ length: count }, (_, i) => i);
  for (let i = count - 1; i > 0; i--) {
    const j = Math.floor(random() * (i + 1));
    const keep = order[i]!;
    order[i] = order[j]!;
    order[j] = keep;
  }
  const cells = new Map<number, number>();
  const kept: number[] = [];
  for (let crowd = 1; crowd <= 64 && kept.length < wanted; crowd *= 4) {
    kept.length = 0;
    cells.clear();
    for (let n = 0; n < count && kept.length < wanted; n++) {
      const i = order[n]!;
      let smooth = true;
      for (let c = 0; c < 3; c++) if (residual[i * 3 + c]! > 2 * pixelNoise[c]!) smooth = false;
      if (!smooth) continue;
      const key =
        Math.floor(colour[i * 3]! / 6) * 10000 +
        Math.floor(colour[i * 3 + 1]! / 6) * 100 +
        Math.floor(colour[i * 3 + 2]! / 6);
      const already = cells.get(key) ?? 0;
      if (already >= crowd) continue;
      cells.set(key, already + 1);
      kept.push(i);
    }
  }
  const codes = new Float64Array(kept.length * 3);
  const places = new Float64Array(kept.length * 2);
  kept.forEach((i, n) => {
    codes.set(colour.subarray(i * 3, i * 3 + 3), n * 3);
    places.set(at.subarray(i * 2, i * 2 + 2), n * 2);
  });
  return { count: kept.length, codes, at: places, pixelNoise };
}
