import { describe, expect, test } from 'vitest';
import {
  DAYLIGHT_RANGE_K,
  daylightChromaticity,
  daylightSpectrum,
  ILLUMINANT_IDS,
  lightSpectrum,
} from '../../src/colour/light.ts';
import { FILM_WAVELENGTHS_NM, sampleAt, wavelengths } from '../../src/colour/sampled.ts';
import type { IlluminantId } from '../../src/colour/types.ts';

const largestStep = (a: Float64Array, b: Float64Array) =>
  a.reduce((most, value, i) => Math.max(most, Math.abs(value - b[i]!)), 0);

describe('sampling', () => {
  test('the film grid is 380 to 780 nm, every nanometre', () => {
    expect(FILM_WAVELENGTHS_NM.length).toBe(401);
    expect([FILM_WAVELENGTHS_NM[0], FILM_WAVELENGTHS_NM[1], FILM_WAVELENGTHS_NM[400]]).toEqual([
      380, 381, 780,
    ]);
  });

  test('nodes as they are, straight lines between, zero beyond', () => {
    const figures = { startNm: 400, stepNm: 5, values: [1, 3, 2] };
    const at = Float64Array.of(399, 400, 401, 405, 407.5, 410, 410.1);
    [0, 1, 1.4, 3, 2.5, 2, 0].forEach((expected, i) => {
      expect(sampleAt(figures, at)[i]).toBeCloseTo(expected, 14);
    });
  });
});

describe('daylight', () => {
  test('moves smoothly with temperature: a kelvin changes no sample by more than 0.1 of 100', () => {
    for (let kelvin = 4000; kelvin < 25000; kelvin += 37) {
      const step = largestStep(
        daylightSpectrum(kelvin, FILM_WAVELENGTHS_NM),
        daylightSpectrum(kelvin + 1, FILM_WAVELENGTHS_NM),
      );
      expect(step, `${kelvin} K`).toBeLessThan(0.1);
      expect(step, `${kelvin} K`).toBeGreaterThan(0);
    }
  });

  test('the two formulas of the CIE meet at 7000 K to 1e-6 in x', () => {
    expect(Math.abs(daylightChromaticity(7000)[0] - daylightChromaticity(7000.0001)[0])).toBeLessThan(1e-6);
  });

  test('hotter is bluer', () => {
    const ratio = (kelvin: number) => {
      const [blue, red] = daylightSpectrum(kelvin, Float64Array.of(450, 650));
      return blue! / red!;
    };
    expect(ratio(4000)).toBeLessThan(ratio(6500));
    expect(ratio(6500)).toBeLessThan(ratio(25000));
  });

  test.each([3999.9, 25000.1, 0, -5000, Number.NaN, Number.POSITIVE_INFINITY])(
    'a temperature of %d K is refused with what to do instead',
    (kelvin) => {
      expect(() => lightSpectrum({ daylightK: kelvin }, FILM_WAVELENGTHS_NM)).toThrow(RangeError);
      expect(() => lightSpectrum({ daylightK: kelvin }, FILM_WAVELENGTHS_NM)).toThrow(
        /4000 to 25000 K.*choose an illuminant/,
      );
    },
  );

  test('the ends of the range are inside it', () => {
    for (const kelvin of DAYLIGHT_RANGE_K)
      expect(daylightSpectrum(kelvin, FILM_WAVELENGTHS_NM).every((v) => v > 0)).toBe(true);
  });
});

describe('illuminants', () => {
  test.each(ILLUMINANT_IDS)('%s is nowhere negative, and dark at no wavelength from 420 to 700 nm', (id) => {
    const power = lightSpectrum({ illuminant: id }, FILM_WAVELENGTHS_NM);
    expect(power.every((v) => v >= 0)).toBe(true);
    expect(power.subarray(40, 320).every((v) => v > 0)).toBe(true);
  });

  test.each(['A', 'D50', 'D55', 'D65', 'D75'] as const)('%s is 100 at 560 nm', (id) => {
    expect(lightSpectrum({ illuminant: id }, Float64Array.of(560))[0]).toBeCloseTo(100, 10);
  });

  test('D65 and daylight of its temperature are the same light to 0.02 of 100', () => {
    const grid = wavelengths(380, 780, 5);
    const d65 = lightSpectrum({ illuminant: 'D65' }, grid);
    expect(largestStep(d65, daylightSpectrum((6500 * 1.4388) / 1.438, grid))).toBeLessThan(0.02);
  });

  test('an unknown name is refused, naming those there are', () => {
    for (const id of ['D60', 'toString'] as unknown as IlluminantId[]) {
      expect(() => lightSpectrum({ illuminant: id }, FILM_WAVELENGTHS_NM)).toThrow(/no illuminant.*FL11/);
    }
  });
});
