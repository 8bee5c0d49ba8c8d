import { execFileSync } from 'node:child_process';
import { readFileSync, writeFileSync } from 'node:fs';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { areaShrinker, fittingSize } from '../../src/photo/shrink.ts';
import { scratch } from './madePhotos.ts';

function shrink(
  codes: Uint8Array,
  width: number,
  height: number,
  to: { width: number; height: number },
  rowsAtOnce = 1,
) {
  const out = new Uint8Array(to.width * to.height * 3);
  const shrinker = areaShrinker({ width, height }, to, 3, 255, SRGB, (row, line) =>
    out.set(line, row * to.width * 3),
  );
  for (let y = 0; y < height; y += rowsAtOnce) {
    const rows = Math.min(rowsAtOnce, height - y);
    shrinker.push(codes.subarray(y * width * 3, (y + rows) * width * 3), rows);
  }
  return out;
}

test('black and white lines mix as light does: code 188, not 128', () => {
  // 0.5 in linear light is sRGB code 187.5 (IEC 61966-2-1); full white is clipped, so 253 stands in for it.
  const codes = Uint8Array.from({ length: 4 * 4 * 3 }, (_, i) => (Math.floor(i / 3) % 2 === 0 ? 0 : 253));
  const half = SRGB.encode(SRGB.decode(253 / 255) / 2) * 255;
  expect([...shrink(codes, 4, 4, { width: 2, height: 2 })]).toEqual(new Array(12).fill(Math.round(half)));
});

test('a clipped channel anywhere in the area stays clipped', () => {
  const codes = new Uint8Array(4 * 3).fill(100);
  codes[1] = 255;
  expect([...shrink(codes, 2, 2, { width: 1, height: 1 })]).toEqual([100, 255, 100]);
});

test('an even area keeps its code, at any ratio and in any pieces', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 1, max: 60 }),
      fc.integer({ min: 1, max: 60 }),
      fc.integer({ min: 1, max: 60 }),
      fc.integer({ min: 1, max: 60 }),
      fc.integer({ min: 0, max: 253 }),
      fc.integer({ min: 1, max: 20 }),
      (width, height, a, b, code, rows) => {
        const to = { width: Math.min(a, width), height: Math.min(b, height) };
        const out = shrink(new Uint8Array(width * height * 3).fill(code), width, height, to, rows);
        expect(out.every((value) => value === code)).toBe(true);
      },
    ),
    { numRuns: 300 },
  );
});

test('fractional ratios agree with the area average of GDAL on the same light', () => {
  const files = scratch();
  const [width, height] = [90, 70];
  const to = { width: 37, height: 23 };
  const codes = Uint8Array.from({ length: width * height * 3 }, (_, i) => {
    const x = Math.floor(i / 3) % width;
    const y = Math.floor(i / 3 / width);
    return 120 + Math.round(40 * Math.sin(x * 1.7 + (i % 3)) + 60 * Math.sin(y * 2.3));
  });
  const ours = shrink(codes, width, height, to);
  writeFileSync(
    files.path('light'),
    Float32Array.from(codes, (code) => SRGB.decode(code / 255)),
  );
  writeFileSync(
    files.path('light.hdr'),
    `ENVI\nsamples = ${width}\nlines = ${height}\nbands = 3\ndata type = 4\ninterleave = bip\nbyte order = 0\n`,
  );
  const size = ['-outsize', String(to.width), String(to.height)];
  const format = ['-of', 'ENVI', '-co', 'INTERLEAVE=BIP'];
  execFileSync('gdal_translate', [
    '-q',
    '-r',
    'average',
    ...size,
    ...format,
    files.path('light'),
    files.path('small'),
  ]);
  const theirs = new Float32Array(new Uint8Array(readFileSync(files.path('small'))).buffer);
  files.remove();
  expect(theirs).toHaveLength(ours.length);
  let largest = 0;
  for (let i = 0; i < ours.length; i++)
    largest = Math.max(largest, Math.abs(ours[i]! - SRGB.encode(theirs[i]!) * 255));
  // Ours is a whole code: half a code, and the other's single precision.
  expect(largest).toBeLessThan(0.501);
});

test('the size that fits keeps the ratio and never exceeds the limit', () => {
  expect(fittingSize(4000, 3000, 12e6)).toEqual({ width: 4000, height: 3000 });
  const { width, height } = fittingSize(8160, 6120, 12.6e6);
  expect(width * height).toBeLessThanOrEqual(12.6e6);
  expect(width * height).toBeGreaterThan(12.5e6);
  expect(width / height).toBeCloseTo(8160 / 6120, 3);
});
