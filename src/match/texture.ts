import type { PhotoPixels } from '../photo/types.ts';

/** Blocks of a photo that are rough without the colours of a film: concrete, gravel, rope, foam. */
export interface TextureMap {
  /** Side of a block, pixels of the photo. */
  readonly side: number;
  readonly columns: number;
  /** One byte a block, row by row: 1 where it is no film. */
  readonly rough: Uint8Array;
}

/** Texture is judged at about this size of photo, so that grain counts the same in every photo. */
const LONGER_SIDE = 800;
/** Side of a block at that size. */
const SIDE = 8;
const PIXELS = SIDE * SIDE;
/** Least departure from a smooth surface that is texture, in multiples of the photo's own noise, and in codes of 255. */
const ROUGH_NOISE = 2.5;
const ROUGH_CODES = 2;
/** A film's brightness never changes that much without its colour: 98 in 100 blocks of the scenes' films are above 0.4. */
const CHROMA_SHARE = 0.2;
/** Share of a block's 7 x 7 surroundings that must be rough: edges of films are lines, textures are areas. */
const AREA_SHARE = 0.6;
const AREA_REACH = 3;

const SURFACE = makeSurface();

/** 1, x, y, xy, x^2, y^2 on a block, orthonormal: what is left after them is texture, not a gradient or a bent fringe. */
function makeSurface(): Float64Array {
  const middle = (SIDE - 1) / 2;
  const square = (SIDE * SIDE - 1) / 12;
  const surface = new Float64Array(6 * PIXELS);
  for (let k = 0; k < 6; k++) {
    let norm = 0;
    for (let i = 0; i < PIXELS; i++) {
      const x = (i % SIDE) - middle;
      const y = Math.floor(i / SIDE) - middle;
      const value = [1, x, y, x * y, x * x - square, y * y - square][k]!;
      surface[k * PIXELS + i] = value;
      norm += value * value;
    }
    for (let i = 0; i < PIXELS; i++) surface[k * PIXELS + i]! /= Math.sqrt(norm);
  }
  return surface;
}

/** Sum of squares left after the smooth surface, over the degrees of freedom left. */
function leftOver(values: Float64Array): number {
  let square = 0;
  for (let i = 0; i < PIXELS; i++) square += values[i]! * values[i]!;
  for (let k = 0; k < 6; k++) {
    let share = 0;
    for (let i = 0; i < PIXELS; i++) share += SURFACE[k * PIXELS + i]! * values[i]!;
    square -= share * share;
  }
  return Math.max(0, square) / (PIXELS - 6);
}

/** Finds the rough blocks. Blocks cut by the right or lower edge are never rough. */
export function textureMap(pixels: Omit<PhotoPixels, 'encoding'>): TextureMap {
  const { width, height } = pixels;
  const shrink = Math.max(1, Math.round(Math.max(width, height) / LONGER_SIDE));
  const side = SIDE * shrink;
  const columns = Math.floor(width / side);
  const rows = Math.floor(height / side);
  const luma = new Float64Array(columns * rows);
  const chroma = new Float64Array(columns * rows);
  const values = [new Float64Array(PIXELS), new Float64Array(PIXELS), new Float64Array(PIXELS)] as const;
  const clipped = new Uint8Array(columns * rows);
  for (let block = 0; block < luma.length; block++) {
    const row = Math.floor(block / columns);
    clipped[block] = average(pixels, (block - row * columns) * side, row * side, shrink, values);
    luma[block] = Math.sqrt(leftOver(values[0]));
    chroma[block] = Math.sqrt(leftOver(values[1]) + leftOver(values[2]));
  }
  // The calmest quarter shows the noise: most photos hold some water, sky or film that is smooth.
  const noise = luma.slice().sort()[luma.length >> 2] ?? 0;
  const least = Math.max(ROUGH_CODES, ROUGH_NOISE * noise);
  const own = Uint8Array.from(luma, (v, i) =>
    v > least && chroma[i]! < CHROMA_SHARE * v && !clipped[i] ? 1 : 0,
  );
  return { side, columns, rough: inAreas(own, columns, rows) };
}

/**
 * Brightness and two differences of colour of a block, each value the mean of shrink x shrink pixels, codes of 255. @returns 1 where a pixel is clipped: glint on a film is no texture
 */
function average(
  { width, codes, channels, maxCode }: Omit<PhotoPixels, 'encoding'>,
  left: number,
  top: number,
  shrink: number,
  [luma, red, blue]: readonly [Float64Array, Float64Array, Float64Array],
): 0 | 1 {
  let most = 0;
  const scale = 255 / (maxCode * shrink * shrink);
  for (let i = 0; i < PIXELS; i++) {
    const x = left + (i % SIDE) * shrink;
    const y = top + Math.floor(i / SIDE) * shrink;
    let r = 0;
    let g = 0;
    let b = 0;
    for (let dy = 0; dy < shrink; dy++) {
      let at = ((y + dy) * width + x) * channels;
      for (let dx = 0; dx < shrink; dx++, at += channels) {
        r += codes[at]!;
        g += codes[at + 1]!;
        b += codes[at + 2]!;
        most = Math.max(most, codes[at]!, codes[at + 1]!, codes[at + 2]!);
      }
    }
    // Weights of Rec. ITU-R BT.601, as JPEG has them.
    luma[i] = (0.299 * r + 0.587 * g + 0.114 * b) * scale;
    red[i] = (r - g) * scale;
    blue[i] = (b - g) * scale;
  }
  return most >= (maxCode * 254) / 255 ? 1 : 0;
}

/** Rough blocks whose surroundings are rough as well. */
function inAreas(own: Uint8Array, columns: number, rows: number): Uint8Array {
  const out = new Uint8Array(own.length);
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < columns; column++) {
      let rough = 0;
      let count = 0;
      for (let y = Math.max(0, row - AREA_REACH); y <= Math.min(rows - 1, row + AREA_REACH); y++) {
        for (let x = Math.max(0, column - AREA_REACH); x <= Math.min(columns - 1, column + AREA_REACH); x++) {
          rough += own[y * columns + x]!;
          count++;
        }
      }
      if (rough >= AREA_SHARE * count) out[row * columns + column] = 1;
    }
  }
  return out;
}
