import { expect, test } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { regionMean } from '../../src/photo/regionMean.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';

/** Normal noise by Box and Muller over a small seeded generator (Steele and Vigna 2021, 32-bit mix). */
function normals(seed: number): () => number {
  let state = seed;
  const uniform = () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
  return () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
}

const patch = (side: number, code: (index: number, channel: number) => number): PhotoPixels => ({
  width: side,
  height: side,
  codes: Uint16Array.from({ length: side * side * 3 }, (_, i) => code(Math.floor(i / 3), i % 3)),
  channels: 3,
  maxCode: 65535,
  encoding: SRGB,
});

test('mean and spread of noise come back', () => {
  const normal = normals(7);
  const noisy = patch(200, (_, channel) => Math.round(20000 + 5000 * channel + 500 * normal()));
  const { mean, sd, median, count } = regionMean(noisy, [0, 0, 200, 200]);
  expect(count).toBe(40000);
  for (let c = 0; c < 3; c++) {
    // Standard error of a 10 % trimmed mean of n normals: about 1.06 sd / sqrt(n) = 2.7; four of them.
    expect(Math.abs(mean[c]! - (20000 + 5000 * c))).toBeLessThan(11);
    expect(Math.abs(median[c]! - (20000 + 5000 * c))).toBeLessThan(13);
    expect(Math.abs(sd[c]! / 500 - 1)).toBeLessThan(0.02);
  }
});

test('a glint on a twentieth of the card moves neither mean nor spread', () => {
  const clean = patch(100, (index) => 20000 + (index % 9) * 50);
  const glint = patch(100, (index) => (index % 20 === 0 ? 65535 : 20000 + (index % 9) * 50));
  const whole: [number, number, number, number] = [0, 0, 100, 100];
  const [a, b] = [regionMean(clean, whole), regionMean(glint, whole)];
  // Losing the top twentieth of 401 evenly spread codes moves their middle by at most a twentieth of them.
  expect(Math.abs(a.mean[0] - b.mean[0])).toBeLessThan(20);
  expect(Math.abs(a.sd[0] / b.sd[0] - 1)).toBeLessThan(0.1);
  expect(b.clippedShare).toBe(0.05);
  expect(a.clippedShare).toBe(0);
});

test('trimming is exact through ties: half 10, half 30 has the mean 20', () => {
  const pixels: PhotoPixels = {
    width: 10,
    height: 2,
    codes: Uint8Array.from({ length: 60 }, (_, i) => (i < 30 ? 10 : 30)),
    channels: 3,
    maxCode: 255,
    encoding: SRGB,
  };
  const region = regionMean(pixels, [0, 0, 10, 2]);
  expect(region.mean[0]).toBeCloseTo(20, 12);
  // The mean of light, not the light of the mean code.
  expect(region.linear[0]).toBeCloseTo((SRGB.decode(10 / 255) + SRGB.decode(30 / 255)) / 2, 7);
  expect(regionMean(pixels, [0, 0, 1, 1]).sd[0]).toBe(0);
});

test('dark and clipped shares count pixels', () => {
  const pixels = patch(4, (index) => (index < 4 ? 65535 : index < 8 ? 100 : 30000));
  const region = regionMean(pixels, [0, 0, 4, 4]);
  expect([region.clippedShare, region.darkShare, region.count]).toEqual([0.25, 0.25, 16]);
});
