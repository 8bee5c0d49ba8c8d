import { describe, expect, it } from 'vitest';
import { wavelengths } from '../../src/colour/sampled.ts';
import { angleBasis, bareRow, stackBases } from '../../src/match/angleBasis.ts';
import { angleCursor } from '../../src/match/angleCharts.ts';
import { COMPONENTS, filmBasis, ROW } from '../../src/match/filmBasis.ts';
import { SHARP } from '../../src/optics/blur.ts';
import { filmStackFor } from '../../src/optics/filmPresets.ts';

const DEGREE = Math.PI / 180;
const stack = filmStackFor('diesel');
const basisAt = (incidenceRad: number) =>
  filmBasis(
    { stack, incidenceRad, polarisation: 'unpolarised', blur: SHARP },
    { daylightK: 6500 },
    10,
    121,
    wavelengths(380, 780, 5),
  );

describe('bases between computed angles', () => {
  it('are the computed ones to 2 parts in a thousand, up to 75 degrees', () => {
    const between = angleBasis(basisAt, 20 * DEGREE, 75 * DEGREE);
    for (const degrees of [20, 37.5, 52.5, 62.4, 67.5, 72.5, 75]) {
      const exact = basisAt(degrees * DEGREE);
      const mixed = between.at(degrees * DEGREE);
      // Component 0 of each channel is its mean sensitivity: a positive sum, unlike the family's components.
      for (let at = 0; at < exact.table.length; at += COMPONENTS) {
        expect(Math.abs(mixed.table[at]! / exact.table[at]! - 1)).toBeLessThan(2.5e-3);
      }
    }
  });

  it('stacked, keep their rows and say how many belong to one angle', () => {
    const one = basisAt(0.3);
    const other = basisAt(0.9);
    const stacked = stackBases([one, other], bareRow(other));
    expect(stacked.count).toBe(243);
    expect(stacked.rowsPerAngle).toBe(121);
    expect(stacked.table.slice(121 * ROW, 122 * ROW)).toEqual(other.table.slice(0, ROW));
    expect(stacked.table.slice(242 * ROW)).toEqual(other.table.slice(0, ROW));
  });
});

describe('where among the angles a pixel lies', () => {
  const angles = { incidenceRad: Float64Array.of(0.4, 0.6, 0.9), filmIndex: 1.45, ambientIndex: 1 };

  it('scales thickness by the optical path, by the law of refraction', () => {
    const cursor = angleCursor(angles, () => Math.cos(0.7));
    cursor.moveTo(0, 0);
    expect([cursor.near, cursor.beside]).toEqual([1, 2]);
    // Path in a film is 2 n d cos(angle inside); equal paths at two angles.
    const inside = (angle: number) => Math.cos(Math.asin(Math.sin(angle) / 1.45));
    expect(cursor.scale).toBeCloseTo(inside(0.6) / inside(0.7), 9);
    expect(cursor.scaleBeside).toBeCloseTo(inside(0.9) / inside(0.7), 9);
  });

  it('changes its nearest angle where both have the same say, and never leaps in between', () => {
    let angle = 0.3;
    const cursor = angleCursor(angles, () => Math.cos(angle));
    const shareOfThird = () => {
      cursor.moveTo(0, 0);
      return cursor.near === 2 ? 1 - cursor.share : cursor.beside === 2 ? cursor.share : 0;
    };
    let before = shareOfThird();
    for (; angle < 1; angle += 1e-3) {
      const now = shareOfThird();
      expect(Math.abs(now - before)).toBeLessThan(0.005);
      expect(cursor.share).toBeLessThanOrEqual(0.5);
      before = now;
    }
    expect(before).toBe(1);
  });
});
