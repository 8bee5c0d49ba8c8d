import {
  converter,
  filterDeficiencyDeuter,
  filterDeficiencyProt,
  filterDeficiencyTrit,
  type Rgb,
} from 'culori';
import sharp from 'sharp';
import { expect, test } from 'vitest';
import { PIXEL_STATUS } from '../../src/match/types.ts';
import { encodeRgbPng } from '../../src/record/png.ts';
import { mapKeyColours, niceTop, paintMap, thicknessRamp } from '../../src/record/thicknessColours.ts';

const toLab = converter('lab65');
const ramp = thicknessRamp();
const rgbAt = (i: number): Rgb => ({
  mode: 'rgb',
  r: ramp[3 * i]! / 255,
  g: ramp[3 * i + 1]! / 255,
  b: ramp[3 * i + 2]! / 255,
});

test('a picture comes back through libvips, every byte', async () => {
  const [width, height] = [37, 23];
  const rgb = Uint8Array.from({ length: 3 * width * height }, (_, i) => (i * 7919) & 255);
  const { data, info } = await sharp(encodeRgbPng({ width, height, rgb }))
    .raw()
    .toBuffer({ resolveWithObject: true });
  expect([info.width, info.height, info.channels]).toEqual([width, height, 3]);
  expect(data.equals(Buffer.from(rgb))).toBe(true);
});

// Simulations: culori, after Machado, Oliveira and Fernandes 2009.
test.each([
  ['as it is', (c: Rgb) => c],
  ['without long-wave cones', filterDeficiencyProt(1)],
  ['without middle-wave cones', filterDeficiencyDeuter(1)],
  ['without short-wave cones', filterDeficiencyTrit(1)],
] as const)('%s, the ramp grows lighter all the way: thickness is read by lightness alone', (_, seen) => {
  let before = -1;
  // Steps of 8: single steps are within the rounding of 8 bits.
  for (let i = 0; i < 256; i += 8) {
    const { l } = toLab(seen(rgbAt(i)))!;
    expect(l).toBeGreaterThan(before + 0.5);
    before = l;
  }
});

test('lightness rises evenly: no stretch looks steeper than another by more than half', () => {
  const light = Array.from({ length: 256 }, (_, i) => toLab(rgbAt(i))!.l);
  const rises = Array.from({ length: 8 }, (_, k) => light[Math.min(255, 32 * (k + 1))]! - light[32 * k]!);
  const mean = (light[255]! - light[0]!) / 8;
  for (const rise of rises) expect(Math.abs(rise / mean - 1)).toBeLessThan(0.5);
});

test('whatever has no thickness looks unlike any other such and is in the key', () => {
  const status = Uint8Array.from(Object.values(PIXEL_STATUS));
  const map = {
    width: 6,
    height: 1,
    thicknessNm: new Float32Array(6).fill(300),
    lowNm: new Float32Array(6),
    highNm: new Float32Array(6),
    order: status,
    status,
  };
  const { rgb } = paintMap(map, 600);
  const shown = Array.from({ length: 6 }, (_, i) => `rgb(${[...rgb.subarray(3 * i, 3 * i + 3)].join(',')})`);
  expect(new Set(shown).size).toBe(6);
  const key = mapKeyColours().flatMap(({ colours }) => colours);
  for (const [name, value] of Object.entries(PIXEL_STATUS)) {
    if (name !== 'measured' && name !== 'ambiguous') expect(key).toContain(shown[value]);
  }
});

test.each([
  [0, 25],
  [12, 25],
  [190, 200],
  [431, 500],
  [1001, 1250],
])('a map that reaches %d nm has its ramp to %d nm', (largest, top) => {
  const thicknessNm = Float32Array.of(Number.NaN, largest, largest / 2);
  expect(niceTop({ width: 3, height: 1, thicknessNm } as never)).toBe(top);
});
