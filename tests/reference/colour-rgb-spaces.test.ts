/** sRGB (IEC 61966-2-1), Display P3, Bradford, CIELAB and OKLab against published constants and worked values. */
import { describe, expect, test } from 'vitest';
import { labFromXyz } from '../../src/colour/lab.ts';
import { apply3, bradford, invert3, multiply3 } from '../../src/colour/matrix3.ts';
import { oklabFromXyz } from '../../src/colour/oklab.ts';
import { DISPLAY_P3, decodeSrgb, encodeSrgb, SRGB, xyzOfChromaticity } from '../../src/colour/rgb.ts';

function expectWithin(ours: ArrayLike<number>, published: ArrayLike<number>, tolerance: number): void {
  expect(ours.length).toBe(published.length);
  Array.from(published).forEach((value, i) => {
    expect(Math.abs(ours[i]! - value), `entry ${i}`).toBeLessThanOrEqual(tolerance);
  });
}

describe('matrices', () => {
  // CSS Color 4, sample code: exact fractions.
  test('sRGB is the set derived from the primaries', () => {
    expectWithin(
      SRGB.toXyz,
      [
        506752 / 1228815,
        87881 / 245763,
        12673 / 70218,
        87098 / 409605,
        175762 / 245763,
        12673 / 175545,
        7918 / 409605,
        87881 / 737289,
        1001167 / 1053270,
      ],
      1e-15,
    );
  });

  test('Display P3 likewise', () => {
    expectWithin(
      DISPLAY_P3.toXyz,
      [
        608311 / 1250200,
        189793 / 714400,
        198249 / 1000160,
        35783 / 156275,
        247089 / 357200,
        198249 / 2500400,
        0,
        32229 / 714400,
        5220557 / 5000800,
      ],
      1e-15,
    );
  });

  test('sRGB is the four-digit matrix of IEC 61966-2-1 to within that one rounding', () => {
    // The standard rounds the primaries' luminances first; 3.9e-5 is the difference that is known between the two sets.
    const printed = [0.4124, 0.3576, 0.1805, 0.2126, 0.7152, 0.0722, 0.0193, 0.1192, 0.9505];
    expectWithin(SRGB.toXyz, printed, 0.5e-4);
    expectWithin(
      invert3(Float64Array.from(printed)),
      // Amendment 1 prints the inverse of the four-digit matrix to seven.
      [3.2406255, -1.537208, -0.4986286, -0.9689307, 1.8757561, 0.0415175, 0.0557101, -0.2040211, 1.0569959],
      0.5e-7 + 1e-9,
    );
  });

  test('between sRGB and Display P3, ten digits', () => {
    // CSS Color 4, computed outside this repository.
    expectWithin(
      multiply3(invert3(SRGB.toXyz), DISPLAY_P3.toXyz),
      [
        1.2249401763, -0.2249401763, 0, -0.0420569547, 1.0420569547, 0, -0.0196375546, -0.0786360456,
        1.0982736001,
      ],
      0.6e-10,
    );
  });

  test('Display P3 adapted to D50 holds the colourants of the profile that Apple ships', () => {
    const toD50 = bradford(DISPLAY_P3.whiteXyz, [0.9642, 1, 0.8249]);
    const ours = multiply3(toD50, DISPLAY_P3.toXyz);
    // One step of s15Fixed16 numbers is 1.5e-5; printed to five decimals.
    expectWithin(
      ours,
      [0.51512, 0.29198, 0.1571, 0.2412, 0.69225, 0.06657, -0.00105, 0.04189, 0.78407],
      1.6e-5 + 0.5e-5,
    );
  });

  test('Bradford takes one white to the other', () => {
    expectWithin(
      apply3(bradford(SRGB.whiteXyz, [0.9642, 1, 0.8249]), SRGB.whiteXyz),
      [0.9642, 1, 0.8249],
      1e-15,
    );
    // ICC.1:2022, annex E, from D65 to the D50 of the connection space; ten digits computed outside this repository.
    expectWithin(
      bradford(SRGB.whiteXyz, [0.9642, 1, 0.8249]),
      [
        1.0478860032, 0.0229187652, -0.0502160953, 0.0295817825, 0.9904835185, -0.0170787077, -0.0092518808,
        0.0150726075, 0.7516781336,
      ],
      0.6e-10,
    );
  });
});

describe('transfer', () => {
  test.each([
    [0.18, 0.461356129500442],
    [0.0031308, 0.0031308 * 12.92],
    [0, 0],
    [1, 1],
  ])('linear %d is code %d', (linear, code) => {
    expect(encodeSrgb(linear)).toBeCloseTo(code, 14);
  });

  test.each([
    [128, 0.21586050011389926],
    [188, 0.5028864580325687],
    [255, 1],
    [10, 10 / 255 / 12.92],
  ])('code %d of 255 is linear %d', (code, linear) => {
    expect(decodeSrgb(code / 255)).toBeCloseTo(linear, 14);
  });
});

describe('CIELAB', () => {
  // Unit tests of colour-science (BSD-3-Clause), eight decimals.
  test.each([
    [
      [0.20654008, 0.12197225, 0.05136952],
      [0.3127, 0.329],
      [41.52787529, 52.63858304, 26.92317922],
    ],
    [
      [0.1422201, 0.23042768, 0.10495772],
      [0.3127, 0.329],
      [55.11636304, -41.08791787, 30.91825778],
    ],
    [
      [0.0781878, 0.06157201, 0.28099326],
      [0.3127, 0.329],
      [29.8056552, 20.01830466, -48.34913874],
    ],
    [
      [0.20654008, 0.12197225, 0.05136952],
      [0.44757, 0.40745],
      [41.52787529, 38.48089305, -5.73295122],
    ],
  ] as const)('%j for the white %j', (xyz, white, lab) => {
    expectWithin(labFromXyz(xyz, xyzOfChromaticity(white)), lab, 0.6e-8);
  });

  // Corners of sRGB: for D65, and for the D50 of CSS Color 4, whose worked value for red is 54.2905, 80.8049, 69.8910.
  test.each([
    [
      [1, 0, 0],
      [53.2371, 80.0901, 67.2033],
    ],
    [
      [0, 1, 0],
      [87.7355, -86.1816, 83.1866],
    ],
    [
      [0, 0, 1],
      [32.3009, 79.1953, -107.8555],
    ],
    [
      [1, 1, 0],
      [97.1386, -21.56, 94.4838],
    ],
    [
      [0, 1, 1],
      [91.1148, -48.0789, -14.129],
    ],
    [
      [1, 0, 1],
      [60.3227, 98.2374, -60.8289],
    ],
  ] as const)('sRGB %j', (rgb, lab) => {
    expectWithin(labFromXyz(apply3(SRGB.toXyz, rgb), SRGB.whiteXyz), lab, 0.5e-4 + 1e-9);
  });

  test('sRGB red adapted to D50', () => {
    const d50 = xyzOfChromaticity([0.3457, 0.3585]);
    const red = apply3(bradford(SRGB.whiteXyz, d50), apply3(SRGB.toXyz, [1, 0, 0]));
    expectWithin(labFromXyz(red, d50), [54.2905, 80.8049, 69.891], 1e-4);
  });
});

describe('OKLab', () => {
  // Ottosson 2020, "A perceptual color space for image processing", table of XYZ and OKLab pairs, three decimals
  // (from memory). His matrices differ from those of CSS Color 4 in the fifth decimal.
  test.each([
    [
      [0.95, 1, 1.089],
      [1, 0, 0],
    ],
    [
      [1, 0, 0],
      [0.45, 1.236, -0.019],
    ],
    [
      [0, 1, 0],
      [0.922, -0.671, 0.263],
    ],
    [
      [0, 0, 1],
      [0.153, -1.415, -0.449],
    ],
  ] as const)('XYZ %j', (xyz, oklab) => {
    expectWithin(oklabFromXyz(xyz), oklab, 0.5e-3 + 1e-4);
  });

  test('white is (1, 0, 0)', () => {
    expectWithin(oklabFromXyz(SRGB.whiteXyz), [1, 0, 0], 1e-13);
  });
});
