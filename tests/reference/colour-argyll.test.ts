/**
 * Colour sums against spec2cie of ArgyllCMS (Debian package `argyll`), to the six significant digits that it prints.
 * It sums at 1 nm over the whole range of the observers, so the films are given from 360 to 830 nm here.
 */
import { describe, expect, test } from 'vitest';
import { applyWeights } from '../../src/colour/applyWeights.ts';
import { lightSpectrum } from '../../src/colour/light.ts';
import { colourMatchingFunctions, type ObserverId, observerWeights } from '../../src/colour/observer.ts';
import { FILM_WAVELENGTHS_NM, wavelengths } from '../../src/colour/sampled.ts';
import type { Light } from '../../src/colour/types.ts';
import { filmStackFor } from '../../src/optics/filmPresets.ts';
import { reflectanceTable } from '../../src/optics/reflectanceTable.ts';
import { argyllXyz, halfSixthDigit } from '../colour/argyll.ts';

const observers = [
  ['1931_2', 'cie1931'],
  ['1964_10', 'cie1964'],
] as const;
const lights: readonly (readonly [string, Light])[] = [
  ['daylight of 7000 K', { daylightK: 7000 }],
  ['daylight of 4500 K', { daylightK: 4500 }],
  ['illuminant A', { illuminant: 'A' }],
];
const FILMS = 32;

/** Soap films in air and diesel on water, 20 nm to 3 µm, in percent; one after the other. */
function filmSpectra(grid: Float64Array): Float64Array {
  const n = grid.length;
  const spectra = new Float64Array(2 * FILMS * n);
  ['soap', 'diesel'].forEach((name, k) => {
    const table = reflectanceTable(filmStackFor(name), {
      thicknessNm: Float64Array.from({ length: FILMS }, (_, j) => 20 + j * 97),
      wavelengthNm: grid,
      incidenceRad: (k + 1) * 0.4,
      polarisation: 'unpolarised',
    });
    spectra.set(
      table.map((value) => 100 * value),
      k * FILMS * n,
    );
  });
  return spectra;
}

function rowsOf(table: Float64Array, n: number): Float64Array[] {
  return Array.from({ length: table.length / n }, (_, j) => table.subarray(j * n, (j + 1) * n));
}

describe.each(observers)('observer %s', (argyllName, observer) => {
  test.each(lights)('64 films under %s: XYZ equal within the printed digits', (_name, light) => {
    const grid = wavelengths(360, 830, 1);
    const films = filmSpectra(grid);
    const printed = argyllXyz(argyllName, grid, lightSpectrum(light, grid), rowsOf(films, grid.length));
    const ours = applyWeights(observerWeights(observer, light, grid), films);
    expect(printed.length).toBe(2 * FILMS);
    expect(printed.flat().every((value) => Number(value) > 0)).toBe(true);
    printed.flat().forEach((value, i) => {
      const off = Math.abs(Number(value) - ours[i]!);
      expect(off, `film ${Math.floor(i / 3)}, channel ${i % 3}`).toBeLessThanOrEqual(
        1.0001 * halfSixthDigit(value),
      );
    });
  });

  test('colour-matching functions, wavelength by wavelength', () => {
    const grid = wavelengths(360, 830, 1);
    const n = grid.length;
    // Under an equal-energy light a surface that reflects at one wavelength only returns that wavelength's function,
    // up to one common factor: 100 over the sum of y.
    const single = rowsOf(
      Float64Array.from({ length: n * n }, (_, k) => (k % (n + 1) === 0 ? 1e6 : 0)),
      n,
    );
    const printed = argyllXyz(argyllName, grid, new Float64Array(n).fill(100), single);
    const ours = colourMatchingFunctions(observer, grid);
    const sum = ours.subarray(n, 2 * n).reduce((total, value) => total + value, 0);
    expect(printed.length).toBe(n);
    for (let i = 0; i < n; i++) {
      for (let c = 0; c < 3; c++) {
        const value = printed[i]![c]!;
        const expected = (1e6 * ours[c * n + i]!) / sum;
        const tolerance = Number(value) === 0 ? 0.5e-6 : halfSixthDigit(value);
        expect(Math.abs(Number(value) - expected), `${grid[i]} nm, ${'xyz'[c]}`).toBeLessThanOrEqual(
          1.0001 * tolerance,
        );
      }
    }
  });
});

test('the film grid, 380 to 780 nm, leaves out less than 0.03 of 100 of a film colour', () => {
  const whole = wavelengths(360, 830, 1);
  const light: Light = { daylightK: 6500 };
  const observer: ObserverId = 'cie1931';
  const full = applyWeights(observerWeights(observer, light, whole), filmSpectra(whole));
  const cut = applyWeights(
    observerWeights(observer, light, FILM_WAVELENGTHS_NM),
    filmSpectra(FILM_WAVELENGTHS_NM),
  );
  const off = full.map((value, i) => Math.abs(value - cut[i]!));
  expect(Math.max(...off)).toBeLessThan(0.03);
});
