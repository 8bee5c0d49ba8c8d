import sharp from 'sharp';
import { afterAll, expect, test } from 'vitest';
import { decodePhotoBytes, decodePhotoFile } from '../../src/cli/decodePhoto.ts';
import {
  encode,
  encodePng16,
  type Kind,
  largestDifference,
  scratch,
  slopes,
  writeTagged,
} from './madePhotos.ts';

const files = scratch();
afterAll(files.remove);
const picture = slopes();

// libvips turns the picture by its own reading of the tag: an outside check of ours.
for (const kind of ['jpeg', 'png', 'webp'] as Kind[])
  for (const orientation of [1, 2, 3, 4, 5, 6, 7, 8])
    test(`${kind}, orientation ${orientation}: upright as libvips turns it, code for code`, async () => {
      const path = files.path(`${orientation}.${kind}`);
      writeTagged(path, await encode(picture, kind), [`-Orientation#=${orientation}`]);
      const decoded = await decodePhotoFile(path);
      const { data, info } = await sharp(path)
        .autoOrient()
        .removeAlpha()
        .raw()
        .toBuffer({ resolveWithObject: true });
      expect([decoded.pixels.width, decoded.pixels.height]).toEqual([info.width, info.height]);
      expect([decoded.metadata.originalWidth, decoded.metadata.originalHeight]).toEqual([
        info.width,
        info.height,
      ]);
      expect(Buffer.compare(Buffer.from(decoded.pixels.codes), data)).toBe(0);
      expect(decoded.scale).toBe(1);
    });

test('lossless formats give back the codes that went in', async () => {
  for (const kind of ['png', 'webp'] as Kind[]) {
    const { pixels } = await decodePhotoBytes(await encode(picture, kind), `a.${kind}`);
    expect(largestDifference(pixels.codes, 3, picture.codes, 3, 48 * 32), kind).toBe(0);
  }
});

test('16-bit PNG keeps every step', async () => {
  const codes = Uint16Array.from({ length: 40 * 30 * 3 }, (_, i) => (i * 7919) % 65536);
  const { pixels } = await decodePhotoBytes(await encodePng16(codes, 40, 30), 'a.png');
  expect(pixels.maxCode).toBe(65535);
  expect(pixels.codes).toEqual(codes);
});
