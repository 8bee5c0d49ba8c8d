import { converter } from 'culori';
import { expect, test } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { EXPOSURE, exposureMask } from '../../src/photo/exposure.ts';
import { linearLight } from '../../src/photo/linear.ts';
import { linearTable, nearestCode } from '../../src/photo/toneTable.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';

const pixelsOf = (codes: Uint8Array | Uint16Array, width: number, channels: 3 | 4 = 3): PhotoPixels => ({
  width,
  height: codes.length / channels / width,
  codes,
  channels,
  maxCode: codes instanceof Uint16Array ? 65535 : 255,
  encoding: SRGB,
});

test('linear light of sRGB codes is culori’s', () => {
  const toLinear = converter('lrgb');
  const codes = Uint8Array.from({ length: 256 * 3 }, (_, i) => Math.floor(i / 3));
  const light = linearLight(pixelsOf(codes, 16));
  for (let code = 0; code < 256; code++) {
    const { r } = toLinear({ mode: 'rgb', r: code / 255, g: 0, b: 0 });
    // Float32 keeps 24 bits.
    expect(Math.abs(light[code * 3]! - r)).toBeLessThan(6e-8);
  }
});

test('a rectangle is read row by row, and an ignored fourth channel is ignored', () => {
  const codes = Uint8Array.from({ length: 5 * 4 * 4 }, (_, i) => (i % 4 === 3 ? 7 : i));
  const out = new Float32Array(2 * 2 * 3);
  expect(linearLight(pixelsOf(codes, 5, 4), [1, 2, 2, 2], out)).toBe(out);
  const at = (x: number, y: number, c: number) => Math.fround(SRGB.decode(codes[(y * 5 + x) * 4 + c]! / 255));
  expect([...out]).toEqual([2, 3].flatMap((y) => [1, 2].flatMap((x) => [0, 1, 2].map((c) => at(x, y, c)))));
});

test('a rectangle that sticks out is clipped; one that misses is refused with its figures', () => {
  const pixels = pixelsOf(new Uint8Array(5 * 4 * 3), 5);
  expect(linearLight(pixels, [3, 3, 10, 10])).toHaveLength(2 * 3);
  expect(() => linearLight(pixels, [5, 0, 2, 2])).toThrow(/\[5, 0, 2, 2\] covers no pixel .*5 x 4/);
  expect(() => linearLight(pixels, [0, 0, Number.NaN, 2])).toThrow(/covers no pixel/);
});

test.each([255, 65535] as const)('every code of %i goes to light and back to itself', (maxCode) => {
  const table = linearTable(SRGB, maxCode);
  const toCode = nearestCode(SRGB, maxCode);
  for (let code = 0; code <= maxCode; code++) expect(toCode(table[code]!)).toBe(code);
  expect(toCode(Number.POSITIVE_INFINITY)).toBe(maxCode);
  expect(toCode(-1)).toBe(0);
});

test('clipped from 254/255 in any channel, too dark below 8/255 in all', () => {
  const mask = (codes: Uint8Array | Uint16Array) => exposureMask(pixelsOf(codes, 1))[0];
  expect(mask(Uint8Array.of(254, 10, 10))).toBe(EXPOSURE.clipped);
  expect(mask(Uint8Array.of(253, 253, 253))).toBe(0);
  expect(mask(Uint8Array.of(7, 7, 7))).toBe(EXPOSURE.tooDark);
  expect(mask(Uint8Array.of(0, 0, 8))).toBe(0);
  expect(mask(Uint16Array.of(254 * 257, 0, 0))).toBe(EXPOSURE.clipped);
  expect(mask(Uint16Array.of(8 * 257 - 1, 0, 0))).toBe(EXPOSURE.tooDark);
});
