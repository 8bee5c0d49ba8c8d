import { describe, expect, it } from 'vitest';
import { APPEARANCES, type AppearanceShares, volumeByCode } from '../../src/tally/appearanceCode.ts';
import { estimateWithoutPhoto } from '../../src/tally/withoutPhoto.ts';

describe('Bonn Agreement Oil Appearance Code', () => {
  /** A. Lewis, Current Status of the BAOAC, January 2007, table 1: interval in µm and litres per km². */
  it.each([
    [1, 'Sheen (silvery/grey)', 0.04, 0.3, 40, 300],
    [2, 'Rainbow', 0.3, 5.0, 300, 5000],
    [3, 'Metallic', 5.0, 50, 5000, 50_000],
    [4, 'Discontinuous true oil colour', 50, 200, 50_000, 200_000],
    [5, 'Continuous true oil colour', 200, 200, 200_000, 200_000],
  ])('code %s, %s: %s to %s µm, %s to %s L/km²', (code, name, minUm, maxUm, minLitres, maxLitres) => {
    const appearance = APPEARANCES[code - 1]!;
    expect(appearance.name).toBe(name);
    expect([appearance.minUm, appearance.maxUm]).toEqual([minUm, maxUm]);
    const shares = [0, 0, 0, 0, 0].map((_, i) => (i === code - 1 ? 1 : 0)) as unknown as AppearanceShares;
    const volume = volumeByCode(1e6, shares);
    expect(1000 * volume.minM3).toBeCloseTo(minLitres, 6);
    expect(1000 * volume.maxM3).toBeCloseTo(maxLitres, 6);
    expect(volume.atLeast).toBe(code === 5);
  });

  it('most over least is 7.5, 16.7, 10 and 4', () => {
    const ratios = APPEARANCES.slice(0, 4).map(({ minUm, maxUm }) => Math.round((10 * maxUm) / minUm) / 10);
    expect(ratios).toEqual([7.5, 16.7, 10, 4]);
  });
});

describe('constructed cases (made for this project by hand, arithmetic of the code; not published)', () => {
  it.each([
    ['A', 2000, 500, 0.6, [0.7, 0.25, 0.05, 0, 0], 0.2118, 2.376],
    ['B', 4000, 500, 0.8, [0.5, 0.3, 0.15, 0.05, 0], 5.376, 30.64],
    ['C', 60, 15, 0.7, [0.8, 0.2, 0, 0, 0], 57.96e-6, 781.2e-6],
    ['D', 40, 10, 0.8, [0.5, 0.5, 0, 0, 0], 54.4e-6, 848e-6],
  ] as const)('case %s', (_, lengthM, widthM, coverage, shares, minM3, maxM3) => {
    const estimate = estimateWithoutPhoto({ lengthM, widthM, coverage, shares });
    expect(estimate.minM3 / minM3).toBeCloseTo(1, 10);
    expect(estimate.maxM3 / maxM3).toBeCloseTo(1, 10);
    expect(estimate.oiledM2).toBeCloseTo(lengthM * widthM * coverage, 9);
    expect(estimate.atLeast).toBe(false);
  });

  it('case B by code: 0.032/0.24, 0.144/2.4, 1.2/12 and 4/16 m³', () => {
    const { parts } = estimateWithoutPhoto({
      lengthM: 4000,
      widthM: 500,
      coverage: 0.8,
      shares: [0.5, 0.3, 0.15, 0.05, 0],
    });
    const expected = [0.032, 0.24, 0.144, 2.4, 1.2, 12, 4, 16, 0, 0];
    parts.forEach(({ minM3, maxM3 }, i) => {
      expect(minM3).toBeCloseTo(expected[2 * i]!, 12);
      expect(maxM3).toBeCloseTo(expected[2 * i + 1]!, 12);
    });
  });
});
