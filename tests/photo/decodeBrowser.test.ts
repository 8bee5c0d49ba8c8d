/** The real browser against libvips: two decoders that are not ours must give the same photo, code for code. */
import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { decodePhotoBytes } from '../../src/cli/decodePhoto.ts';
import { decodeInPage, openPhotoPage, type PhotoPage } from './browserPage.ts';
import { asSharp, encodePng16, largestDifference, scratch, slopes, speckle } from './madePhotos.ts';
import { phoneP3 } from './madeProfile.ts';
import { pngChunk, withChunks } from './pngChunks.ts';

const files = scratch();
let opened: PhotoPage;
beforeAll(async () => {
  opened = await openPhotoPage();
}, 60_000);
afterAll(async () => {
  await opened?.close();
  files.remove();
});

/** Decodes in both, expects all but the codes to be equal, and gives the largest difference of codes. */
async function difference(
  file: Uint8Array,
  options: { worker?: boolean; maxPixels?: number } = {},
): Promise<number> {
  const { answer, codes } = await decodeInPage(opened.page, file, options);
  if (answer.error) throw new Error(answer.error.message);
  const { pixels, metadata, scale, notices } = await decodePhotoBytes(file, 'photo', options);
  expect([answer.width, answer.height, answer.maxCode]).toEqual([
    pixels.width,
    pixels.height,
    pixels.maxCode,
  ]);
  expect([answer.encodingId, answer.scale]).toEqual([pixels.encoding.id, scale]);
  expect(answer.metadata).toEqual(metadata);
  expect(answer.notices).toEqual(notices);
  const own = pixels.maxCode === 65535 ? new Uint16Array(new Uint8Array(codes).buffer) : codes;
  return largestDifference(own, answer.channels, pixels.codes, 3, pixels.width * pixels.height);
}

test.each([1, 2, 3, 4, 5, 6, 7, 8])(
  'orientation %i: JPEG, PNG, WebP and AVIF upright alike',
  async (orientation) => {
    const turned = asSharp(slopes()).withMetadata({ orientation });
    expect(await difference(await turned.clone().jpeg({ quality: 97 }).toBuffer())).toBe(0);
    expect(await difference(await turned.clone().png().toBuffer())).toBe(0);
    expect(await difference(await turned.clone().webp({ lossless: true }).toBuffer())).toBe(0);
    // AV1 is exact, its step to RGB is not standardised: libyuv and libheif round apart by a code.
    const avif = await turned.clone().avif({ quality: 95, chromaSubsampling: '4:4:4', effort: 2 }).toBuffer();
    expect(await difference(avif)).toBeLessThanOrEqual(1);
  },
);

test('subsampled colour on hard edges', async () => {
  const picture = asSharp(speckle());
  expect(await difference(await picture.clone().jpeg({ quality: 90 }).toBuffer())).toBe(0);
  expect(await difference(await picture.clone().jpeg({ quality: 90, progressive: true }).toBuffer())).toBe(0);
  expect(await difference(await picture.clone().webp({ quality: 90 }).toBuffer())).toBe(0);
  expect(await difference(await picture.clone().avif({ lossless: true }).toBuffer())).toBe(0);
  // From 10 bits to 8 there is a second rounding.
  expect(await difference(await picture.clone().avif({ quality: 90 }).toBuffer())).toBeLessThanOrEqual(1);
  expect(await difference(await picture.clone().avif({ bitdepth: 10 }).toBuffer())).toBeLessThanOrEqual(2);
});

test('a profile, a gamma or code points in the file change no code', async () => {
  const path = files.path('p3.icm');
  writeFileSync(path, phoneP3());
  const tagged = asSharp(speckle()).withIccProfile(path, { attach: true });
  expect(await difference(await tagged.clone().jpeg({ quality: 90 }).toBuffer())).toBe(0);
  expect(await difference(await tagged.clone().png().toBuffer())).toBe(0);
  expect(await difference(await tagged.clone().webp({ lossless: true }).toBuffer())).toBe(0);
  const png = await asSharp(speckle()).png().toBuffer();
  const linear = pngChunk('gAMA', [0, 1, 0x86, 0xa0]);
  expect(await difference(withChunks(png, [linear]))).toBe(0);
  expect(await difference(withChunks(png, [pngChunk('cICP', [12, 13, 0, 1])]))).toBe(0);
});

test('16-bit PNG keeps every step, with a fourth channel or grey too', async () => {
  const codes = Uint16Array.from({ length: 60 * 40 * 4 }, (_, i) => (i * 7919) % 65536);
  expect(await difference(await encodePng16(codes.subarray(0, 60 * 40 * 3), 60, 40))).toBe(0);
  const withAlpha = sharp(codes, { raw: { width: 60, height: 40, channels: 4 } }).toColourspace('rgb16');
  expect(await difference(await withAlpha.png().toBuffer())).toBe(0);
  const grey = sharp(codes.subarray(0, 2400), { raw: { width: 60, height: 40, channels: 1 } });
  expect(await difference(await grey.toColourspace('grey16').png().toBuffer())).toBe(0);
});

test('see-through 8-bit PNG, indexed PNG and grey JPEG', async () => {
  const codes = Uint8Array.from({ length: 30 * 20 * 4 }, (_, i) => (i * 37) % 256);
  const seeThrough = sharp(codes, { raw: { width: 30, height: 20, channels: 4 } });
  expect(await difference(await seeThrough.png().toBuffer())).toBe(0);
  const picture = asSharp(slopes());
  expect(await difference(await picture.clone().png({ palette: true, colours: 64 }).toBuffer())).toBe(0);
  expect(await difference(await picture.clone().toColourspace('b-w').jpeg().toBuffer())).toBe(0);
});

test('in a worker, turned and shrunk: the same pixels', async () => {
  const turned = asSharp(speckle(301, 200)).withMetadata({ orientation: 6 });
  const jpeg = await turned.jpeg({ quality: 90 }).toBuffer();
  expect(await difference(jpeg, { worker: true, maxPixels: 20_000 })).toBe(0);
});

test('progress rises to 1, and an abort ends it with an AbortError', async () => {
  const jpeg = await asSharp(slopes(2000, 1500)).jpeg().toBuffer();
  const { answer } = await decodeInPage(opened.page, jpeg);
  if (answer.error) throw new Error(answer.error.message);
  const shares = answer.steps.map(([share]) => share);
  expect(shares).toEqual([...shares].sort((a, b) => a - b));
  expect(shares.at(-1)).toBe(1);
  for (const abortAt of [0, 0.1, 0.15, 0.6]) {
    const aborted = await decodeInPage(opened.page, jpeg, { abortAt });
    expect(aborted.answer.error?.name, String(abortAt)).toBe('AbortError');
  }
});

test('50 megapixels open at 12.6, and say so', async () => {
  const [width, height] = [8160, 6120];
  const jpeg = await sharp({ create: { width, height, channels: 3, background: { r: 90, g: 120, b: 60 } } })
    .jpeg({ quality: 80 })
    .toBuffer();
  const { answer, codes } = await decodeInPage(opened.page, jpeg, { worker: true });
  if (answer.error) throw new Error(answer.error.message);
  expect(answer.width * answer.height).toBeLessThanOrEqual(12.6e6);
  expect(answer.width * answer.height).toBeGreaterThan(12.5e6);
  expect(answer.notices.join()).toMatch(/of its 8160 x 6120 pixels/);
  expect(answer.metadata).toMatchObject({ originalWidth: width, originalHeight: height });
  const { data } = await sharp(jpeg, { ignoreIcc: true })
    .extract({ left: 0, top: 0, width: 1, height: 1 })
    .raw()
    .toBuffer({ resolveWithObject: true });
  const last = codes.length - 4;
  for (const at of [0, last]) expect([...codes.subarray(at, at + 3)]).toEqual([...data.subarray(0, 3)]);
});

test('HEIC, which this browser cannot open, says what to do on the phone', async () => {
  const heic = readFileSync(join(import.meta.dirname, 'data/gradient.heic'));
  const { answer } = await decodeInPage(opened.page, heic);
  expect(answer.error?.name).toBe('PhotoError');
  expect(answer.error?.message).toMatch(/HEIC.*most compatible.*JPEG/);
});

test('damaged and cut files give a PhotoError, never another', async () => {
  const whole = await asSharp(speckle()).jpeg({ quality: 80 }).toBuffer();
  const files = [new Uint8Array(), whole.subarray(0, 3000)];
  // Ruin of many kinds, from the header to the scan; some of it opens all the same.
  for (let i = 0; i < 60; i++) {
    const ruined = Uint8Array.from(whole);
    for (let k = 0; k <= i % 5; k++)
      ruined[2 + ((i * 7919 + k * 104729) % (i < 40 ? 620 : whole.length - 2))] = (i * 31) & 255;
    files.push(ruined);
  }
  let refused = 0;
  for (const file of files) {
    const { answer } = await decodeInPage(opened.page, file);
    if (!answer.error) continue;
    refused++;
    expect(answer.error.name, answer.error.message).toBe('PhotoError');
  }
  expect(refused).toBeGreaterThan(2);
});

test('the self-test passes here, and tells of a browser that adds noise', async () => {
  const { page } = opened;
  expect(await page.evaluate(() => photoTests.selfTest())).toEqual({ ok: true });
  const noisy = await page.evaluate(async () => {
    const prototype = OffscreenCanvasRenderingContext2D.prototype;
    const original = prototype.getImageData;
    prototype.getImageData = function (...rest: Parameters<typeof original>) {
      const image = original.apply(this, rest);
      image.data[4000] = image.data[4000]! ^ 1;
      return image;
    };
    try {
      return await photoTests.selfTest();
    } finally {
      prototype.getImageData = original;
    }
  });
  expect(noisy).toMatchObject({ ok: false, sentence: expect.stringMatching(/by up to 1 of 255/) });
});

test('a browser that converts colours whatever it is told: Display P3 comes out, and a notice', async () => {
  const path = files.path('p3.icm');
  writeFileSync(path, phoneP3());
  const jpeg = await asSharp(slopes())
    .withIccProfile(path, { attach: true })
    .jpeg({ quality: 97 })
    .toBuffer();
  const stubborn = await openPhotoPage();
  try {
    await stubborn.page.evaluate(() => {
      const original = globalThis.createImageBitmap;
      globalThis.createImageBitmap = ((source: ImageBitmapSource) => original(source)) as typeof original;
    });
    const { answer, codes } = await decodeInPage(stubborn.page, jpeg);
    if (answer.error) throw new Error(answer.error.message);
    expect(answer.encodingId).toBe('display-p3');
    expect(answer.notices.join()).toMatch(/converts the photo's colours/);
    const { pixels } = await decodePhotoBytes(jpeg, 'photo');
    // Through the browser's conversion and back to P3: a code of rounding.
    expect(largestDifference(codes, 4, pixels.codes, 3, 48 * 32)).toBeLessThanOrEqual(1);
  } finally {
    await stubborn.close();
  }
});
