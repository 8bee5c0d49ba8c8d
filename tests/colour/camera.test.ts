import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { applyRows, applyWeights } from '../../src/colour/applyWeights.ts';
import { matrixMaker } from '../../src/colour/cameraMatrix.ts';
import { apply3, bradford, invert3, multiply3 } from '../../src/colour/matrix3.ts';
import { naturalReflectances } from '../../src/colour/naturalReflectances.ts';
import { colourMatchingFunctions, observerWeights, whiteOf } from '../../src/colour/observer.ts';
import { BASIS_ROWS, cameraBasis, cameraWeights, sensorRows } from '../../src/colour/photoCamera.ts';
import { DISPLAY_P3, SRGB } from '../../src/colour/rgb.ts';
import { FILM_WAVELENGTHS_NM } from '../../src/colour/sampled.ts';
import { SENSOR_COMPONENTS, sensorComponents, sensorCurves } from '../../src/colour/sensorFamily.ts';
import type { Light, RgbEncoding } from '../../src/colour/types.ts';
import { whitePreservingMatrix } from '../../src/colour/whitePreservingMatrix.ts';

const grid = FILM_WAVELENGTHS_NM;
const n = grid.length;
const cameras = fc.array(fc.double({ min: -2.5, max: 2.5, noNaN: true }), { minLength: 9, maxLength: 9 });
const lights: Light[] = [{ daylightK: 4200 }, { daylightK: 6500 }, { daylightK: 15000 }, { illuminant: 'A' }];
const encodings: RgbEncoding[] = [SRGB, DISPLAY_P3];

describe('photo camera', () => {
  test('white is (1, 1, 1) and the rows of the matrix sum to one, whatever the camera, light and encoding', () => {
    fc.assert(
      fc.property(
        cameras,
        fc.constantFrom(...lights),
        fc.constantFrom(...encodings),
        (a, light, encoding) => {
          const matrix = matrixMaker(light, encoding, grid).matrixFor(a);
          for (let row = 0; row < 3; row++)
            expect(matrix[3 * row]! + matrix[3 * row + 1]! + matrix[3 * row + 2]!).toBeCloseTo(1, 14);
          const white = applyWeights(cameraWeights(a, light, encoding, grid), new Float64Array(n).fill(1));
          for (const value of white) expect(value).toBeCloseTo(1, 12);
        },
      ),
      { numRuns: 25 },
    );
  });

  test('its weights are the matrix times the white-balanced sensor', () => {
    const a = [0.5, -1, 0.2, 1.1, 0, -0.4, -0.8, 0.3, 0.9];
    const light = { daylightK: 6000 };
    const film = Float64Array.from(grid, (l) => 0.02 + 0.02 * Math.cos((4 * Math.PI * 1.33 * 400) / l));
    const sensor = applyRows(sensorRows(sensorCurves(a, grid), light, grid), 3, n, film);
    const rgb = apply3(matrixMaker(light, SRGB, grid).matrixFor(a), sensor);
    applyWeights(cameraWeights(a, light, SRGB, grid), film).forEach((value, c) => {
      expect(value).toBeCloseTo(rgb[c]!, 14);
    });
  });

  test('its basis, mixed by the coefficients and divided by its white, is the white-balanced sensor', () => {
    const a = [0.5, -1, 0.2, 1.1, 0, -0.4, -0.8, 0.3, 0.9];
    const light: Light = { illuminant: 'FL11' };
    const basis = cameraBasis(light, grid);
    const rows = sensorRows(sensorCurves(a, grid), light, grid);
    for (let c = 0; c < 3; c++) {
      const mixed = new Float64Array(n);
      for (let k = 0; k < SENSOR_COMPONENTS; k++) {
        const weight = k === 0 ? 1 : a[3 * c + k - 1]!;
        for (let i = 0; i < n; i++) mixed[i]! += weight * basis[(c * BASIS_ROWS + k) * n + i]!;
      }
      const white = mixed.reduce((total, v) => total + v, 0);
      for (let i = 0; i < n; i++) expect(mixed[i]! / white).toBeCloseTo(rows[c * n + i]!, 14);
    }
  });
});

describe('colour matrix', () => {
  test('a camera that sees as the CIE observer does gets the exact matrix (Luther condition)', () => {
    // Any mixture of the colour-matching functions will do for a sensor; scale is for white balance to remove.
    const mixture = [2, -0.4, 0.1, -0.3, 1.5, 0.2, 0.05, -0.1, 0.7];
    const functions = colourMatchingFunctions('cie1931', grid);
    const sensor = Float64Array.from({ length: 3 * n }, (_, k) => {
      const c = Math.floor(k / n);
      const i = k % n;
      return (
        mixture[3 * c]! * functions[i]! +
        mixture[3 * c + 1]! * functions[n + i]! +
        mixture[3 * c + 2]! * functions[2 * n + i]!
      );
    });
    for (const light of lights) {
      for (const encoding of encodings) {
        const matrix = whitePreservingMatrix(sensor, light, encoding, grid);
        const rows = sensorRows(sensor, light, grid);
        const observer = observerWeights('cie1931', light, grid).weights;
        const toRgb = multiply3(
          invert3(encoding.toXyz),
          bradford(whiteOf('cie1931', light, grid), encoding.whiteXyz),
        );
        for (let i = 0; i < n; i += 20) {
          const camera = apply3(matrix, [rows[i]!, rows[n + i]!, rows[2 * n + i]!]);
          const eye = apply3(toRgb, [observer[i]!, observer[n + i]!, observer[2 * n + i]!]);
          camera.forEach((value, c) => {
            expect(value).toBeCloseTo(eye[c]!, 11);
          });
        }
      }
    }
  });

  test('of a camera of the family is the same by sums taken beforehand and from its curves', () => {
    const a = [1, -1, 0.5, 0.2, 0.7, -1.2, 0.4, -0.6, 1.3];
    for (const light of lights) {
      const fast = matrixMaker(light, DISPLAY_P3, grid).matrixFor(a);
      whitePreservingMatrix(sensorCurves(a, grid), light, DISPLAY_P3, grid).forEach((value, k) => {
        expect(value).toBeCloseTo(fast[k]!, 10);
      });
    }
  });

  test('is the least-squares one: no small change that keeps white comes closer', () => {
    const surfaces = naturalReflectances(grid);
    const light = { daylightK: 6500 };
    const a = new Float64Array(9);
    const matrix = matrixMaker(light, SRGB, grid).matrixFor(a);
    const table = new Float64Array(surfaces.length * n);
    surfaces.forEach((row, k) => {
      table.set(row, k * n);
    });
    const toRgb = multiply3(invert3(SRGB.toXyz), bradford(whiteOf('cie1931', light, grid), SRGB.whiteXyz));
    const xyz = applyWeights(observerWeights('cie1931', light, grid), table);
    const sensor = applyRows(sensorRows(sensorCurves(a, grid), light, grid), 3, n, table);
    const misfit = (m: Float64Array) => {
      let total = 0;
      for (let k = 0; k < sensor.length; k += 3) {
        const ours = apply3(m, sensor.subarray(k, k + 3));
        const wanted = apply3(toRgb, xyz.subarray(k, k + 3));
        ours.forEach((value, c) => {
          total += (value - wanted[c]!) ** 2;
        });
      }
      return total;
    };
    const least = misfit(matrix);
    for (let row = 0; row < 3; row++) {
      for (let from = 0; from < 3; from++) {
        const moved = matrix.slice();
        moved[3 * row + from]! += 1e-3;
        moved[3 * row + ((from + 1) % 3)]! -= 1e-3;
        expect(misfit(moved)).toBeGreaterThan(least);
      }
    }
  });

  test('of a camera with two channels alike is refused', () => {
    const curves = sensorCurves(new Float64Array(9), grid);
    curves.copyWithin(n, 0, n);
    expect(() => whitePreservingMatrix(curves, { daylightK: 6500 }, SRGB, grid)).toThrow(/same sensitivity/);
  });
});

describe('sensor family', () => {
  test('no coefficients is the mean, and each coefficient adds its component', () => {
    const components = sensorComponents(grid);
    const mean = sensorCurves(new Float64Array(9), grid);
    for (let c = 0; c < 3; c++) {
      for (let k = 0; k < 3; k++) {
        const a = new Float64Array(9);
        a[3 * c + k] = 1.5;
        const moved = sensorCurves(a, grid);
        for (let i = 0; i < 3 * n; i++) {
          const inChannel = Math.floor(i / n) === c;
          const expected = inChannel ? 1.5 * components[(c * SENSOR_COMPONENTS + k + 1) * n + (i % n)]! : 0;
          expect(moved[i]! - mean[i]!).toBeCloseTo(expected, 15);
        }
      }
    }
  });
});

describe('natural reflectances', () => {
  const surfaces = naturalReflectances(grid);
  test('there are at least 60, the same every time, all of them reflectances', () => {
    expect(surfaces.length).toBeGreaterThanOrEqual(60);
    expect(naturalReflectances(grid)).toEqual(surfaces);
    for (const row of surfaces) expect(row.every((v) => v > 0 && v < 1)).toBe(true);
  });

  test('they are smooth: no more than 0.03 from one nanometre to the next', () => {
    for (const row of surfaces) {
      for (let i = 1; i < n; i++) expect(Math.abs(row[i]! - row[i - 1]!)).toBeLessThan(0.03);
    }
  });
});
