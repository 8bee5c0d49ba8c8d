import type { PhotoPixels } from '../photo/types.ts';

/** Side of the squares that activity is judged on: the block of JPEG and its kin. */
export const BLOCK_SIDE = 8;
/**
 * Change of code across two pixels (of 255) from which a block counts as changing, and as lively. In a lively block
 * compression has thinned out the colour: chroma is kept at half size and its fine detail is rounded away.
 */
const LIMITS = [18, 48] as const;

/** Activity class of each 8 x 8 block: 0 calm, 1 changing, 2 lively. */
export interface ActivityMap {
  readonly columns: number;
  readonly classOf: Uint8Array;
}

/** Judges each block by the largest change seen at every second pixel; next to a lively block nothing is calm. */
export function activityMap(pixels: Omit<PhotoPixels, 'encoding'>): ActivityMap {
  const { width, height, codes, channels, maxCode } = pixels;
  const columns = Math.ceil(width / BLOCK_SIDE);
  const rows = Math.ceil(height / BLOCK_SIDE);
  const largest = new Float64Array(columns * rows);
  const down = width * channels;
  for (let y = 1; y < height - 1; y += 2) {
    const row = (y / BLOCK_SIDE) | 0;
    for (let x = 1; x < width - 1; x += 2) {
      const at = (y * width + x) * channels;
      let most = 0;
      for (let c = 0; c < 3; c++) {
        const across = Math.abs(codes[at + channels + c]! - codes[at - channels + c]!);
        const along = Math.abs(codes[at + down + c]! - codes[at - down + c]!);
        if (across > most) most = across;
        if (along > most) most = along;
      }
      const block = row * columns + ((x / BLOCK_SIDE) | 0);
      if (most > largest[block]!) largest[block] = most;
    }
  }
  const scale = 255 / maxCode;
  const own = Uint8Array.from(largest, (v) => (v * scale < LIMITS[0] ? 0 : v * scale < LIMITS[1] ? 1 : 2));
  const classOf = own.slice();
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < columns; column++) {
      if (own[row * columns + column] !== 2) continue;
      for (let y = Math.max(0, row - 1); y <= Math.min(rows - 1, row + 1); y++) {
        for (let x = Math.max(0, column - 1); x <= Math.min(columns - 1, column + 1); x++) {
          if (classOf[y * columns + x] === 0) classOf[y * columns + x] = 1;
        }
      }
    }
  }
  return { columns, classOf };
}
