/** CIE daylight (CIE 15:2018, 4.1.2): locus, weights and spectra against the CIE's own tables of D50 and D65. */
import { describe, expect, test } from 'vitest';
import { D50, D65 } from '../../src/colour/data/standardIlluminants.ts';
import {
  daylightChromaticity,
  daylightFromWeights,
  daylightSpectrum,
  daylightWeights,
} from '../../src/colour/light.ts';
import { whiteOf } from '../../src/colour/observer.ts';
import { wavelengths } from '../../src/colour/sampled.ts';

/** The nominal names were given before c2 changed from 1.4380e-2 to 1.4388e-2 m K. */
const NOMINAL = 1.4388 / 1.438;

// Recomputed from the printed equations outside this repository, six decimals.
test.each([
  [5000, 0.345659, 0.358601, -1.03867, 0.362659],
  [5500, 0.332429, 0.347544, -0.784789, -0.19798],
  [6500, 0.31272, 0.329125, -0.294649, -0.689128],
  [7500, 0.299043, 0.314973, 0.145295, -0.759744],
])('D%i: chromaticity and weights', (nominal, x, y, m1, m2) => {
  const chromaticity = daylightChromaticity(nominal * NOMINAL);
  expect(chromaticity[0]).toBeCloseTo(x, 6);
  expect(chromaticity[1]).toBeCloseTo(y, 6);
  const weights = daylightWeights(chromaticity);
  expect(Math.abs(weights[0] - m1)).toBeLessThan(6e-7);
  expect(Math.abs(weights[1] - m2)).toBeLessThan(6e-7);
});

describe.each([
  // The CIE made its tables with M1 and M2 rounded to three decimals and S0, S1, S2 in steps of 10 nm; what is left is
  // the rounding of the tables themselves.
  ['D50', D50, 5000, 0.0005],
  ['D65', D65, 6500, 0.00085],
] as const)('%s', (_name, table, nominal, tolerance) => {
  const grid = wavelengths(300, 780, 5);
  const largest = (spectrum: Float64Array) =>
    spectrum.reduce((most, value, i) => Math.max(most, Math.abs(value - table[i]!)), 0);
  const [m1, m2] = daylightWeights(daylightChromaticity(nominal * NOMINAL));

  test('made of S0, S1, S2 it is the table', () => {
    const rounded = daylightFromWeights(Math.round(m1 * 1000) / 1000, Math.round(m2 * 1000) / 1000, grid);
    expect(largest(rounded)).toBeLessThanOrEqual(tolerance + 1e-9);
  });

  test('without the rounding of the weights it is off by no more than 0.016 of 100', () => {
    const smooth = daylightSpectrum(nominal * NOMINAL, grid);
    expect(largest(smooth)).toBeLessThanOrEqual(0.0165);
    expect(largest(smooth)).toBeGreaterThan(tolerance);
  });
});

test('sums of the spectra fall on the locus that they were made for, 4000 to 25000 K', () => {
  const grid = wavelengths(380, 780, 5);
  for (let kelvin = 4000; kelvin <= 25000; kelvin += 250) {
    const [X, Y, Z] = whiteOf('cie1931', { daylightK: kelvin }, grid);
    const [x, y] = daylightChromaticity(kelvin);
    const off = Math.hypot(X / (X + Y + Z) - x, Y / (X + Y + Z) - y);
    // The CIE's own D65 is 0.00010 off its locus point, D55 0.00010: the printed equations go no further.
    expect(off, `${kelvin} K`).toBeLessThan(0.00015);
  }
});
