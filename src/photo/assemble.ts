import type { InspectedPhoto } from './inspect.ts';
import { areaShrinker, fittingSize } from './shrink.ts';
import type { DecodedPhoto } from './types.ts';
import { uprightWriter } from './upright.ts';

/** What a decoder is about to hand over: the stored pixel grid, row by row. */
export interface StoredSize {
  readonly width: number;
  readonly height: number;
  readonly channels: 3 | 4;
  readonly maxCode: 255 | 65535;
}

export interface PhotoAssembly {
  /** `rows` more stored rows, interleaved. */
  push(source: ArrayLike<number>, rows: number): void;
  /** Once every row has been pushed. */
  finish(): DecodedPhoto;
}

/** Turns decoded rows upright, shrinks them where the photo has more than `maxPixels`, and puts the result together. */
export function assemblePhoto(
  photo: InspectedPhoto,
  stored: StoredSize,
  maxPixels: number,
  encoding = photo.encoding,
): PhotoAssembly {
  const { channels, maxCode } = stored;
  const target = fittingSize(stored.width, stored.height, maxPixels);
  const length = target.width * target.height * channels;
  const codes = maxCode === 255 ? new Uint8Array(length) : new Uint16Array(length);
  const writer = uprightWriter(codes, target.width, target.height, channels, photo.orientation);
  const shrinks = target.width !== stored.width || target.height !== stored.height;
  let row = 0;
  const shrinker = shrinks
    ? areaShrinker(stored, target, channels, maxCode, encoding, (y, line) => writer.write(line, y, 1))
    : undefined;
  return {
    push(source, rows) {
      if (shrinker) shrinker.push(source, rows);
      else writer.write(source, row, rows);
      row += rows;
    },
    finish() {
      const { metadata } = photo;
      const scale = writer.width / metadata.originalWidth;
      return {
        pixels: { width: writer.width, height: writer.height, codes, channels, maxCode, encoding },
        metadata,
        scale,
        notices:
          scale < 1
            ? [
                ...photo.notices,
                `The photo was opened at ${writer.width} x ${writer.height} of its ${metadata.originalWidth} x ${metadata.originalHeight} pixels, so that it fits this device. The original file is unchanged.`,
              ]
            : photo.notices,
      };
    },
  };
}
