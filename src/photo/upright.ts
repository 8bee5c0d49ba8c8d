import { type Orientation, swapsSides } from './exifOrientation.ts';

type Codes = Uint8Array | Uint8ClampedArray | Uint16Array;

/** Index of the first stored pixel in the upright grid, and the steps for one pixel right and one row down. */
function turn(width: number, height: number, orientation: Orientation): readonly [number, number, number] {
  switch (orientation) {
    case 1:
      return [0, 1, width];
    case 2:
      return [width - 1, -1, width];
    case 3:
      return [width * height - 1, -1, -width];
    case 4:
      return [width * (height - 1), 1, -width];
    case 5:
      return [0, height, 1];
    case 6:
      return [height - 1, height, -1];
    case 7:
      return [width * height - 1, -height, -1];
    case 8:
      return [height * (width - 1), -height, 1];
  }
}

/** Takes stored rows in any pieces and puts each pixel where it belongs in the upright photo. */
export interface UprightWriter<T extends Codes> {
  readonly width: number;
  readonly height: number;
  readonly codes: T;
  /** `rows` stored rows from `firstRow` on, interleaved. */
  write(source: ArrayLike<number>, firstRow: number, rows: number): void;
}

/**
 * @param codes empty, width * height * channels long; filled by `write`
 * @param width stored width in pixels
 * @param height stored height in pixels
 */
export function uprightWriter<T extends Codes>(
  codes: T,
  width: number,
  height: number,
  channels: 3 | 4,
  orientation: Orientation,
): UprightWriter<T> {
  const [origin, right, down] = turn(width, height, orientation);
  const swapped = swapsSides(orientation);
  return {
    width: swapped ? height : width,
    height: swapped ? width : height,
    codes,
    write(source, firstRow, rows) {
      if (orientation === 1 && ArrayBuffer.isView(source)) {
        codes.set(source as Codes, firstRow * width * channels);
        return;
      }
      let from = 0;
      for (let y = firstRow; y < firstRow + rows; y++) {
        let to = (origin + y * down) * channels;
        for (let x = 0; x < width; x++) {
          codes[to] = source[from]!;
          codes[to + 1] = source[from + 1]!;
          codes[to + 2] = source[from + 2]!;
          if (channels === 4) codes[to + 3] = source[from + 3]!;
          from += channels;
          to += right * channels;
        }
      }
    },
  };
}
