import fc from 'fast-check';
import { expect, test } from 'vitest';
import { deltaE2000 } from '../../src/colour/deltaE2000.ts';
import { labFromXyz } from '../../src/colour/lab.ts';
import { oklabFromXyz } from '../../src/colour/oklab.ts';
import { SRGB } from '../../src/colour/rgb.ts';

const labColour = fc.tuple(
  fc.double({ min: 0, max: 100, noNaN: true }),
  fc.double({ min: -120, max: 120, noNaN: true }),
  fc.double({ min: -120, max: 120, noNaN: true }),
);

test('CIEDE2000 is never negative, zero for equal colours, and the same either way round', () => {
  fc.assert(
    fc.property(labColour, labColour, (first, second) => {
      const pair = Float64Array.from([...first, ...second]);
      const there = deltaE2000(pair, 0, pair, 1);
      expect(there).toBeGreaterThanOrEqual(0);
      expect(deltaE2000(pair, 1, pair, 0)).toBeCloseTo(there, 9);
      expect(deltaE2000(pair, 0, pair, 0)).toBe(0);
    }),
  );
});

test('the index picks the colour out of an array', () => {
  const many = Float64Array.of(50, 0, 0, 60, 10, -10, 70, 0, 5);
  const one = Float64Array.of(60, 10, -10);
  expect(deltaE2000(many, 1, one, 0)).toBe(0);
  expect(deltaE2000(many, 0, one, 0)).toBeGreaterThan(0);
});

test('arrays of colours come out like single ones, into an array that is given', () => {
  const xyz = Float64Array.of(0.2, 0.12, 0.05, 0.95, 1, 1.089, 0, 0, 0);
  for (const convert of [
    (values: ArrayLike<number>, out?: Float64Array) => labFromXyz(values, SRGB.whiteXyz, out),
    oklabFromXyz,
  ]) {
    const out = new Float64Array(9);
    expect(convert(xyz, out)).toBe(out);
    for (let k = 0; k < 3; k++) {
      expect([...out.subarray(3 * k, 3 * k + 3)]).toEqual([...convert(xyz.subarray(3 * k, 3 * k + 3))]);
    }
    expect([...out.subarray(6)].map(Math.abs)).toEqual([0, 0, 0]);
  }
});

test('CIELAB is continuous where its two branches meet', () => {
  const edge = 216 / 24389;
  const at = (y: number) => labFromXyz([y, y, y], [1, 1, 1])[0]!;
  expect(at(edge * (1 + 1e-12))).toBeCloseTo(at(edge), 9);
  expect(at(edge)).toBeCloseTo(8, 12);
});
