/**
 * Closed formulas and handbook values of Fresnel reflection and single films.
 * Sources: Born & Wolf, Principles of Optics, 1.5 and 1.6; values marked [memory] are recalled.
 */
import { describe, expect, it } from 'vitest';
import { filmStackFor } from '../../src/optics/filmPresets.ts';
import { filmReflectance } from '../../src/optics/filmReflectance.ts';
import { AIR_INDEX } from '../../src/optics/materials/air.ts';
import { crownGlass, magnesiumFluoride } from '../../src/optics/materials/solids.ts';
import { pureWater, seaWater } from '../../src/optics/materials/water.ts';
import { stackReflectance } from '../../src/optics/stackReflectance.ts';
import type { FilmStack, Material } from '../../src/optics/types.ts';

const constant = (n: number): Material => ({
  id: 'constant',
  name: 'constant index',
  source: 'given',
  rangeNm: [1, 1e9],
  indexSpread: 0,
  refractiveIndex: () => n,
  extinction: () => 0,
});
const degree = Math.PI / 180;
const bare = (n: number, degrees: number, polarisation: 's' | 'p' | 'unpolarised' = 'unpolarised') =>
  stackReflectance(constant(1), [], constant(n), 550, degrees * degree, polarisation);

describe('Fresnel reflection of bare surfaces (closed formulas, five decimals)', () => {
  it.each([
    [1.333, [0.02037, 0.02144, 0.0279, 0.05969, 0.13348, 0.34792, 0.58352]],
    [1.52, [0.04258, 0.04414, 0.05305, 0.09248, 0.17471, 0.39095, 0.61492]],
  ])('index %f at 0, 30, 45, 60, 70, 80, 85 degrees', (n, values) => {
    [0, 30, 45, 60, 70, 80, 85].forEach((a, i) => {
      expect(Math.abs(bare(n, a) - values[i]!)).toBeLessThanOrEqual(0.5e-5);
    });
  });

  it('s and p apart at 60 degrees', () => {
    expect(bare(1.333, 60, 's')).toBeCloseTo(0.11507, 5);
    expect(bare(1.333, 60, 'p')).toBeCloseTo(0.00431, 5);
    expect(bare(1.52, 60, 's')).toBeCloseTo(0.18344, 5);
    expect(bare(1.52, 60, 'p')).toBeCloseTo(0.00153, 5);
  });

  it("p vanishes at Brewster's angle atan(n): 53.12 and 56.66 degrees", () => {
    expect(Math.atan(1.333) / degree).toBeCloseTo(53.12, 2);
    expect(Math.atan(1.52) / degree).toBeCloseTo(56.66, 2);
    expect(bare(1.333, Math.atan(1.333) / degree, 'p')).toBeLessThan(1e-25);
    expect(bare(1.52, Math.atan(1.52) / degree, 'p')).toBeLessThan(1e-25);
  });
});

describe('single films', () => {
  const coating: FilmStack = {
    ambient: constant(1),
    above: [],
    film: constant(1.38),
    below: [],
    substrate: constant(1.52),
  };
  const at = (d: number, l: number, stack = coating) => filmReflectance(stack, d, l, 0, 'unpolarised');

  it('quarter wave of MgF2 (1.38) on glass (1.52) at 550 nm is 99.64 nm and leaves ((ns - n1^2)/(ns + n1^2))^2', () => {
    const quarter = 550 / (4 * 1.38);
    expect(quarter).toBeCloseTo(99.64, 2);
    expect(at(quarter, 550)).toBeCloseTo(((1.52 - 1.38 ** 2) / (1.52 + 1.38 ** 2)) ** 2, 12);
    expect(at(quarter, 550)).toBeCloseTo(0.012601, 6);
  });

  it('has no reflectance maximum inside the visible at that thickness, and many at order 100 (common practice)', () => {
    const maxima = (d: number) => {
      let count = 0;
      for (let l = 380.5; l < 780; l += 0.5)
        if (at(d, l) > at(d, l - 0.5) && at(d, l) >= at(d, l + 0.5)) count++;
      return count;
    };
    expect(maxima(550 / (4 * 1.38))).toBe(0);
    const order100 = (100 * 550) / (2 * 1.38);
    expect(order100 / 1000).toBeCloseTo(19.9, 1);
    expect(maxima(order100)).toBeGreaterThan(30);
  });

  it('a soap film of index 1.333 is black at 0 and reaches ((n^2-1)/(n^2+1))^2 = 0.078271', () => {
    const soap: FilmStack = {
      ambient: constant(1),
      above: [],
      film: constant(1.333),
      below: [],
      substrate: constant(1),
    };
    expect(at(0, 550, soap)).toBeLessThan(1e-30);
    expect(at(550 / (4 * 1.333), 550, soap)).toBeCloseTo(0.078271, 6);
  });

  it('oil 1.47 on water 1.333 swings between 0.020373 and 0.056148', () => {
    const oil: FilmStack = {
      ambient: constant(1),
      above: [],
      film: constant(1.47),
      below: [],
      substrate: constant(1.333),
    };
    const values = Array.from({ length: 2000 }, (_, j) => at(j / 2, 550, oil));
    expect(Math.min(...values)).toBeCloseTo(0.020373, 6);
    expect(Math.max(...values)).toBeCloseTo(0.056148, 5);
  });

  it('flips come out of the signs: dark at 0 in air, bright at 0 between two media (common practice)', () => {
    const between: FilmStack = {
      ambient: constant(1),
      above: [],
      film: constant(1.2),
      below: [],
      substrate: constant(1.333),
    };
    expect(at(0, 550, between)).toBeGreaterThan(at(550 / (4 * 1.2), 550, between));
    const soap = filmStackFor('soap');
    expect(filmReflectance(soap, 0, 550, 0, 's')).toBeLessThan(filmReflectance(soap, 103, 550, 0, 's'));
  });
});

describe('dispersion formulas against tabulated values', () => {
  it.each([
    [400, 1.343557],
    [486.1, 1.337494],
    [550, 1.334683],
    [589.3, 1.333349],
    [656.3, 1.331512],
    [700, 1.330518],
  ])('Daimon & Masumura 2007 at %f nm', (l, n) => {
    expect(Math.abs(pureWater.refractiveIndex(l) - n)).toBeLessThanOrEqual(0.6e-6);
  });

  it.each([
    [400, 1.343211, 1.349938],
    [550, 1.334338, 1.340789],
    [700, 1.330187, 1.33648],
  ])('Quan & Fry 1995 (against air) at %f nm, 20 °C, 0 and 35 per mille', (l, fresh, salt) => {
    expect(Math.abs(seaWater(20, 0).refractiveIndex(l) / AIR_INDEX - fresh)).toBeLessThanOrEqual(0.6e-6);
    expect(Math.abs(seaWater(20, 35).refractiveIndex(l) / AIR_INDEX - salt)).toBeLessThanOrEqual(0.6e-6);
  });

  it('Quan & Fry and Daimon & Masumura agree on fresh water at 20 °C to 1.5e-4', () => {
    for (let l = 400; l <= 700; l += 10) {
      expect(Math.abs(seaWater(20, 0).refractiveIndex(l) - pureWater.refractiveIndex(l))).toBeLessThan(
        1.5e-4,
      );
    }
  });

  it('MgF2 (Dodge 1984) 1.378506 at 550 nm; crown glass 1.51680 at 587.6 nm', () => {
    expect(magnesiumFluoride.refractiveIndex(550)).toBeCloseTo(1.378506, 6);
    expect(crownGlass.refractiveIndex(587.6)).toBeCloseTo(1.5168, 5);
  });
});
