/** Photos made for the tests by libvips (sharp) and exiftool, neither of which is ours. */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import sharp from 'sharp';

/** A directory that goes away with `remove`. */
export function scratch(): { path: (name: string) => string; remove: () => void } {
  const directory = mkdtempSync(join(tmpdir(), 'photo-'));
  return {
    path: (name) => join(directory, name),
    remove: () => rmSync(directory, { recursive: true, force: true }),
  };
}

export interface Picture {
  readonly width: number;
  readonly height: number;
  readonly codes: Uint8Array;
}

/** Smooth colour slopes, different in each direction and channel: no turn or mirror leaves it unchanged. */
export function slopes(width = 48, height = 32): Picture {
  const codes = new Uint8Array(width * height * 3);
  for (let y = 0; y < height; y++)
    for (let x = 0; x < width; x++) {
      const at = (y * width + x) * 3;
      codes[at] = 40 + Math.round((180 * x) / (width - 1));
      codes[at + 1] = 30 + Math.round((200 * y) / (height - 1));
      codes[at + 2] = 60 + Math.round((90 * (x + 2 * y)) / (width + 2 * height));
    }
  return { width, height, codes };
}

/** Coarse coloured noise about grey: edges everywhere, which is where decoders may differ. */
export function speckle(width = 160, height = 120): Picture {
  let state = 1;
  const codes = Uint8Array.from({ length: width * height * 3 }, () => {
    // Lehmer generator (Park and Miller 1988).
    state = (state * 48271) % 2147483647;
    return 60 + (state % 140);
  });
  return { width, height, codes };
}

export const asSharp = ({ codes, width, height }: Picture) =>
  sharp(codes, { raw: { width, height, channels: 3 } });

export type Kind = 'jpeg' | 'png' | 'webp' | 'avif';

/** The picture in one of the formats: PNG and WebP lossless, JPEG and AVIF at high quality without chroma subsampling. */
export function encode(picture: Picture, kind: Kind): Promise<Buffer> {
  const image = asSharp(picture);
  if (kind === 'jpeg') return image.jpeg({ quality: 97, chromaSubsampling: '4:4:4' }).toBuffer();
  if (kind === 'png') return image.png().toBuffer();
  if (kind === 'webp') return image.webp({ lossless: true }).toBuffer();
  return image.avif({ quality: 95, chromaSubsampling: '4:4:4', effort: 2 }).toBuffer();
}

/** A 16-bit PNG of interleaved RGB codes. */
export function encodePng16(codes: Uint16Array, width: number, height: number): Promise<Buffer> {
  return sharp(codes, { raw: { width, height, channels: 3 } })
    .toColourspace('rgb16')
    .png()
    .toBuffer();
}

/** Writes bytes, then lets exiftool set tags (`-Tag=value`, with `#` for bare numbers). */
export function writeTagged(path: string, bytes: Uint8Array, tags: readonly string[]): string {
  writeFileSync(path, bytes);
  if (tags.length > 0) execFileSync('exiftool', ['-q', '-overwrite_original', ...tags, path]);
  return path;
}

/** exiftool's own reading of a file, as bare numbers. */
export function exiftoolSays(path: string): Record<string, string | number | undefined> {
  return JSON.parse(execFileSync('exiftool', ['-json', '-n', path], { encoding: 'utf8' }))[0];
}

/** Largest difference of two code arrays of `count` pixels with 3 or 4 channels each, over R, G and B. */
export function largestDifference(
  a: ArrayLike<number>,
  aChannels: number,
  b: ArrayLike<number>,
  bChannels: number,
  count: number,
): number {
  let largest = 0;
  for (let pixel = 0; pixel < count; pixel++)
    for (let c = 0; c < 3; c++)
      largest = Math.max(largest, Math.abs(a[pixel * aChannels + c]! - b[pixel * bChannels + c]!));
  return largest;
}
