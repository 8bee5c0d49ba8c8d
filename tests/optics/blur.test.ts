import { describe, expect, it } from 'vitest';
import { blurredReflectanceTable, incidenceSpread, SHARP } from '../../src/optics/blur.ts';
import { filmStackFor } from '../../src/optics/filmPresets.ts';
import { filmReflectance } from '../../src/optics/filmReflectance.ts';
import { reflectanceTable } from '../../src/optics/reflectanceTable.ts';

const stack = filmStackFor('diesel');
const axes = {
  thicknessNm: Float64Array.from({ length: 26 }, (_, j) => 80 * j),
  wavelengthNm: Float64Array.of(420, 550, 680),
  incidenceRad: 0.5,
  polarisation: 'unpolarised' as const,
};

describe('averages inside a pixel', () => {
  it('is the plain table without blur', () => {
    expect(blurredReflectanceTable(stack, axes, SHARP)).toEqual(reflectanceTable(stack, axes));
  });

  it('is the weighted sum of reflectances over an incidence distribution', () => {
    const incidence = { angleRad: Float64Array.of(0.2, 0.5, 0.9), weight: Float64Array.of(0.25, 0.5, 0.25) };
    const table = blurredReflectanceTable(stack, axes, { incidence, relativeThicknessSpread: 0 });
    for (const [j, i] of [
      [0, 0],
      [7, 1],
      [25, 2],
    ] as const) {
      const sum = [0, 1, 2].reduce(
        (total, k) =>
          total +
          incidence.weight[k]! *
            filmReflectance(
              stack,
              axes.thicknessNm[j]!,
              axes.wavelengthNm[i]!,
              incidence.angleRad[k]!,
              'unpolarised',
            ),
        0,
      );
      expect(table[3 * j + i]!).toBeCloseTo(sum, 12);
    }
  });

  it.each([0.02, 0.05, 0.15])(
    'averages a relative thickness spread of %f as a fine numerical integral does',
    (spread) => {
      const table = blurredReflectanceTable(stack, axes, {
        incidence: null,
        relativeThicknessSpread: spread,
      });
      for (let j = 0; j < axes.thicknessNm.length; j += 5) {
        for (let i = 0; i < 3; i++) {
          let sum = 0;
          let total = 0;
          for (let x = -5; x <= 5; x += 0.01) {
            const weight = Math.exp((-x * x) / 2);
            const d = axes.thicknessNm[j]! * (1 + spread * x);
            if (d < 0) continue;
            sum +=
              weight * filmReflectance(stack, d, axes.wavelengthNm[i]!, axes.incidenceRad, 'unpolarised');
            total += weight;
          }
          expect(Math.abs(table[3 * j + i]! - sum / total)).toBeLessThan(2e-5);
        }
      }
    },
  );

  it('refuses a spread that is no spread', () => {
    expect(() =>
      blurredReflectanceTable(stack, axes, { incidence: null, relativeThicknessSpread: 0.5 }),
    ).toThrow(/between 0 and 0.35/);
  });

  it('spreads angles with weights that add to one, folded at the vertical', () => {
    const { angleRad, weight } = incidenceSpread(0.05, 0.1);
    expect(weight.reduce((a, b) => a + b)).toBeCloseTo(1, 12);
    expect(Math.min(...angleRad)).toBeGreaterThanOrEqual(0);
  });
});
