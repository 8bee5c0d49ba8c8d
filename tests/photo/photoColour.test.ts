import { afterAll, expect, test } from 'vitest';
import { decodePhotoBytes, decodePhotoFile } from '../../src/cli/decodePhoto.ts';
import { apply3 } from '../../src/colour/matrix3.ts';
import type { DecodedPhoto } from '../../src/photo/types.ts';
import { asSharp, encode, scratch, slopes, writeTagged } from './madePhotos.ts';
import { pngChunk, withChunks } from './pngChunks.ts';

const files = scratch();
afterAll(files.remove);
const picture = slopes();
const png = await encode(picture, 'png');
// Lossless, because libheif then states its code points.
const avif = await asSharp(picture).avif({ lossless: true }).toBuffer();

const u32 = (value: number) => [(value >>> 24) & 255, (value >>> 16) & 255, (value >>> 8) & 255, value & 255];
const gamma = (value: number) => pngChunk('gAMA', u32(Math.round(value * 100000)));
const chromaticities = (...values: number[]) =>
  pngChunk(
    'cHRM',
    values.flatMap((value) => u32(Math.round(value * 100000))),
  );
const encodingOf = ({ pixels }: DecodedPhoto) => pixels.encoding.id;

const openPng = (...chunks: Buffer[]) => decodePhotoBytes(withChunks(png, chunks), 'a.png');
/** The AVIF with other code points (ITU-T H.273) in its `nclx` box. */
const openAvif = (primaries: number, transfer: number) => {
  const bytes = Buffer.from(avif);
  const at = bytes.indexOf('nclx');
  expect(at).toBeGreaterThan(0);
  bytes.writeUInt16BE(primaries, at + 4);
  bytes.writeUInt16BE(transfer, at + 6);
  return decodePhotoBytes(bytes, 'a.avif');
};

test('PNG: no word, sRGB chunk, and gamma 1/2.2 all mean sRGB', async () => {
  expect(encodingOf(await openPng())).toBe('srgb');
  expect(encodingOf(await openPng(pngChunk('sRGB', [0])))).toBe('srgb');
  expect(encodingOf(await openPng(gamma(0.45455)))).toBe('srgb');
  expect(
    encodingOf(
      await openPng(gamma(0.45455), chromaticities(0.3127, 0.329, 0.64, 0.33, 0.3, 0.6, 0.15, 0.06)),
    ),
  ).toBe('srgb');
});

test('PNG: a gamma of 1 is linear light, and stated primaries are used', async () => {
  const { pixels } = await openPng(
    gamma(1),
    chromaticities(0.3127, 0.329, 0.68, 0.32, 0.265, 0.69, 0.15, 0.06),
  );
  expect(pixels.encoding.decode(0.5)).toBeCloseTo(0.5, 9);
  expect(pixels.encoding.encode(0.25)).toBeCloseTo(0.25, 9);
  // Display P3's red in XYZ: SMPTE EG 432-1 primaries with D65, as the CSS Color 4 specification prints it.
  [0.4865709, 0.2289746, 0].forEach((value, index) => {
    expect(apply3(pixels.encoding.toXyz, [1, 0, 0])[index]).toBeCloseTo(value, 4);
  });
});

test('PNG: an impossible gamma, white or set of primaries is read as sRGB, with a notice', async () => {
  for (const chunks of [
    [gamma(0)],
    [gamma(0.5), chromaticities(0, 0, 0.64, 0.33, 0.3, 0.6, 0.15, 0.06)],
    [gamma(0.5), chromaticities(0.3127, 0.329, 0.3, 0.3, 0.3, 0.3, 0.3, 0.3)],
  ]) {
    const photo = await openPng(...chunks);
    expect(encodingOf(photo)).toBe('srgb');
    expect(photo.notices.join()).toMatch(/impossible gamma/);
  }
});

test('code points: P3 and sRGB are known, PQ and HLG are refused, others are named', async () => {
  expect(encodingOf(await openPng(pngChunk('cICP', [12, 13, 0, 1])))).toBe('display-p3');
  expect(encodingOf(await openAvif(1, 13))).toBe('srgb');
  expect(encodingOf(await openAvif(12, 13))).toBe('display-p3');
  await expect(openAvif(9, 16)).rejects.toThrow(/high dynamic range.*ordinary JPEG/);
  await expect(openAvif(9, 18)).rejects.toThrow(/high dynamic range/);
  const other = await openAvif(9, 13);
  expect(encodingOf(other)).toBe('srgb');
  expect(other.notices.join()).toMatch(/code points 9 and 13/);
});

test('a camera that marks Adobe RGB only by the DCF option-file mark', async () => {
  const path = writeTagged(files.path('r03.jpg'), await encode(picture, 'jpeg'), ['-InteropIndex=R03']);
  const { pixels, metadata } = await decodePhotoFile(path);
  expect(metadata.profileName).toBe('Adobe RGB (1998)');
  // Adobe RGB (1998) encoding, 4.3.5.3: green is (0.18556, 0.62736, 0.07069).
  [0.18556, 0.62736, 0.07069].forEach((value, index) => {
    expect(apply3(pixels.encoding.toXyz, [0, 1, 0])[index]).toBeCloseTo(value, 4);
  });
});

test('printing inks are refused', async () => {
  const cmyk = await asSharp(picture).toColourspace('cmyk').jpeg().toBuffer();
  await expect(decodePhotoBytes(cmyk, 'a.jpg')).rejects.toThrow(/printing inks/);
});
