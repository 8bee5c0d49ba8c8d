import { writeFileSync } from 'node:fs';
import sharp from 'sharp';
import { afterAll, expect, test } from 'vitest';
import { decodePhotoBytes, decodePhotoFile } from '../../src/cli/decodePhoto.ts';
import {
  asSharp,
  encode,
  encodePng16,
  type Kind,
  largestDifference,
  scratch,
  slopes,
  writeTagged,
} from './madePhotos.ts';
import { phoneP3 } from './madeProfile.ts';

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

// AVIF carries the turn as properties of the picture, which libheif writes and carries out; EXIF's copy is not applied again.
for (const orientation of [1, 2, 3, 4, 5, 6, 7, 8])
  test(`avif, turned by its own properties as orientation ${orientation} says`, async () => {
    const avif = await asSharp(picture)
      .withMetadata({ orientation })
      .avif({ quality: 95, chromaSubsampling: '4:4:4', effort: 2 })
      .toBuffer();
    const png = await asSharp(picture).withMetadata({ orientation }).png().toBuffer();
    const upright = await sharp(png).autoOrient().raw().toBuffer({ resolveWithObject: true });
    const { pixels, metadata } = await decodePhotoBytes(avif, 'a.avif');
    expect([pixels.width, pixels.height]).toEqual([upright.info.width, upright.info.height]);
    expect([metadata.originalWidth, metadata.originalHeight]).toEqual([pixels.width, pixels.height]);
    // Quality 95: a few codes of loss, against slopes of 180 codes that a wrong turn would show.
    expect(largestDifference(pixels.codes, 3, upright.data, 3, 48 * 32)).toBeLessThan(8);
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

test('an embedded profile changes the encoding, never the codes', async () => {
  const p3 = files.path('p3.icm');
  writeFileSync(p3, phoneP3());
  for (const kind of ['jpeg', 'png', 'webp', 'avif'] as Kind[]) {
    const tagged = await sharp(await encode(picture, 'png'))
      .keepIccProfile()
      .withIccProfile(p3, { attach: true })
      .toFormat(kind, kind === 'png' ? {} : { quality: 90 })
      .toBuffer();
    const { pixels, metadata } = await decodePhotoBytes(tagged, `a.${kind}`);
    expect(pixels.encoding.id, kind).toBe('display-p3');
    expect(metadata.profileName).toBe('Display P3');
    const stored = await sharp(tagged, { ignoreIcc: true }).raw().toBuffer();
    expect(Buffer.compare(Buffer.from(pixels.codes), stored), kind).toBe(0);
  }
});

test('a profile in several JPEG segments is put together in their order', async () => {
  const long = phoneP3('Display P3 '.padEnd(200, '-'));
  const jpeg = await encode(picture, 'jpeg');
  const half = Math.ceil(long.length / 2);
  const segment = (part: number, body: Uint8Array) => {
    const head = Buffer.from(`\xff\xe2\0\0ICC_PROFILE\0${String.fromCharCode(part)}\x02`, 'latin1');
    head.writeUInt16BE(head.length + body.length - 2, 2);
    return Buffer.concat([head, body]);
  };
  const parts = [segment(2, long.subarray(half)), segment(1, long.subarray(0, half))];
  const joined = Buffer.concat([jpeg.subarray(0, 2), ...parts, jpeg.subarray(2)]);
  expect((await decodePhotoBytes(joined, 'a.jpg')).pixels.encoding.id).toBe('display-p3');
  const missing = Buffer.concat([jpeg.subarray(0, 2), parts[0]!, jpeg.subarray(2)]);
  expect((await decodePhotoBytes(missing, 'a.jpg')).notices.join()).toMatch(/profile .* damaged/);
});

test('grey comes out as three equal channels, with a word on what that is worth', async () => {
  const grey = await asSharp(picture).toColourspace('b-w').png().toBuffer();
  const { pixels, notices } = await decodePhotoBytes(grey, 'a.png');
  expect(pixels.channels).toBe(3);
  for (let i = 0; i < pixels.codes.length; i += 3)
    expect([pixels.codes[i + 1], pixels.codes[i + 2]]).toEqual([pixels.codes[i], pixels.codes[i]]);
  expect(notices.join()).toMatch(/no colour/);
});

test('a photo above maxPixels is shrunk, and says so; the original size and hash stay', async () => {
  const png = await encode(slopes(120, 80), 'png');
  const whole = await decodePhotoBytes(png, 'a.png');
  const small = await decodePhotoBytes(png, 'a.png', { maxPixels: 2400 });
  expect([small.pixels.width, small.pixels.height]).toEqual([60, 40]);
  expect(small.scale).toBe(0.5);
  expect(small.notices.join()).toMatch(/60 x 40 of its 120 x 80/);
  expect(small.metadata).toEqual(whole.metadata);
});
