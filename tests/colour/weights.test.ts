import { describe, expect, test } from 'vitest';
import { applyRows, applyWeights } from '../../src/colour/applyWeights.ts';
import { ILLUMINANT_IDS } from '../../src/colour/light.ts';
import { observerWeights, whiteOf } from '../../src/colour/observer.ts';
import { FILM_WAVELENGTHS_NM } from '../../src/colour/sampled.ts';
import type { Light } from '../../src/colour/types.ts';

const n = FILM_WAVELENGTHS_NM.length;

describe('observer', () => {
  const lights: Light[] = [{ daylightK: 7321 }, ...ILLUMINANT_IDS.map((illuminant) => ({ illuminant }))];
  test.each(lights)('a perfect white has Y = 1 under %j, for both observers', (light) => {
    for (const observer of ['cie1931', 'cie1964'] as const) {
      const weights = observerWeights(observer, light, FILM_WAVELENGTHS_NM);
      const xyz = applyWeights(weights, new Float64Array(n).fill(1));
      expect(xyz[1]).toBeCloseTo(1, 12);
      whiteOf(observer, light, FILM_WAVELENGTHS_NM).forEach((value, c) => {
        expect(xyz[c]).toBeCloseTo(value, 12);
      });
    }
  });

  test('a grey of a fifth is a fifth of white', () => {
    const weights = observerWeights('cie1931', { illuminant: 'D65' }, FILM_WAVELENGTHS_NM);
    const white = applyWeights(weights, new Float64Array(n).fill(1));
    applyWeights(weights, new Float64Array(n).fill(0.2)).forEach((value, c) => {
      expect(value).toBeCloseTo(0.2 * white[c]!, 12);
    });
  });
});

describe('sums', () => {
  // Small whole numbers, so that every sum is exact.
  const table = Float64Array.of(1, 2, 3, 4, 5, 6, 7, 8);
  const rows = Float64Array.of(1, 0, 0, 0, 0, 1, 0, 0, 1, 1, 1, 1, 0, 0, 2, -1);

  test('channels come out spectrum by spectrum', () => {
    const weights = { wavelengthNm: Float64Array.of(1, 2, 3, 4), weights: rows.subarray(0, 12) };
    expect([...applyWeights(weights, table)]).toEqual([1, 2, 10, 5, 6, 26]);
  });

  test.each([1, 2, 3, 4])('%i rows', (count) => {
    const all = [
      [1, 2, 10, 2],
      [5, 6, 26, 6],
    ];
    expect([...applyRows(rows.subarray(0, 4 * count), count, 4, table)]).toEqual(
      all.flatMap((spectrum) => spectrum.slice(0, count)),
    );
  });

  test('an output array is filled and returned', () => {
    const out = new Float64Array(8);
    expect(applyRows(rows, 4, 4, table, out)).toBe(out);
    expect([...out]).toEqual([1, 2, 10, 2, 5, 6, 26, 6]);
  });

  test('a table of broken spectra and a short output are refused', () => {
    expect(() => applyRows(rows, 4, 3, table)).toThrow(/does not hold spectra of 3 samples/);
    expect(() => applyRows(rows, 4, 4, table, new Float64Array(7))).toThrow(/do not fit/);
  });
});
