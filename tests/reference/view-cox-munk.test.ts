import { describe, expect, it } from 'vitest';
import { discreteGauss } from '../../src/view/discreteGauss.ts';
import { slopeVariance } from '../../src/view/seaSlope.ts';

/** Scatter of the total mean square slope about both regressions (Cox & Munk 1954). From memory. */
const SCATTER = 0.004;

describe('slopes of the sea, Cox & Munk 1954', () => {
  it('coefficients, as restated alike by independent public sources', () => {
    expect(slopeVariance(10, 'clean').upwind).toBeCloseTo(0.0316, 12);
    expect(slopeVariance(10, 'clean').crosswind).toBeCloseTo(0.0222, 12);
    expect(slopeVariance(10, 'clean').total).toBeCloseTo(0.0542, 12);
    expect(slopeVariance(10, 'slick').upwind).toBeCloseTo(0.0128, 12);
    expect(slopeVariance(10, 'slick').crosswind).toBeCloseTo(0.0114, 12);
    expect(slopeVariance(10, 'slick').total).toBeCloseTo(0.0236, 12);
  });

  it('their abstract: the mean square slope reaches (tan 16 degrees)^2 at 14 m/s', () => {
    // Whole degrees: 15.5 to 16.5; the regression's scatter on top.
    const [least, most] = [15.5, 16.5].map((deg) => Math.tan((deg * Math.PI) / 180) ** 2) as [number, number];
    const total = slopeVariance(14, 'clean').total;
    expect(total).toBeGreaterThan(least - SCATTER);
    expect(total).toBeLessThan(most + SCATTER);
  });

  it('their abstract: oil cuts the mean square slope by a factor of two or three (winds above 7 m/s)', () => {
    for (const windMS of [7, 10, 14]) {
      const factor = slopeVariance(windMS, 'clean').total / slopeVariance(windMS, 'slick').total;
      expect(factor).toBeGreaterThan(2);
      expect(factor).toBeLessThan(3);
    }
  });

  it('the slick is never the rougher: below the crossing at 1.40 m/s both are the same', () => {
    expect((0.008 - 0.003) / (5.12e-3 - 1.56e-3)).toBeCloseTo(1.4, 2);
    for (const windMS of [0, 0.5, 1, 1.39, 1.41, 2, 5, 14]) {
      const [clean, slick] = [slopeVariance(windMS, 'clean'), slopeVariance(windMS, 'slick')];
      expect(slick.total).toBeLessThanOrEqual(clean.total);
      expect(slick.total === clean.total).toBe(windMS < 1.4);
    }
  });
});

describe('Gauss rule of a set of points', () => {
  it('of a finely sampled normal curve: Abramowitz & Stegun table 25.10, n = 5', () => {
    // Nodes for weight exp(-x^2): 0, 0.958572464614, 2.020182870456; weights 0.945308720483, 0.393619323152, 0.019953242059.
    const count = 2001;
    const points = Float64Array.from({ length: count }, (_, i) => 9 * ((2 * i) / (count - 1) - 1));
    const { node, weight } = discreteGauss(
      points,
      points.map((x) => Math.exp(-x * x)),
      5,
    );
    const nodes = [-2.020182870456, -0.958572464614, 0, 0.958572464614, 2.020182870456];
    const weights = [0.019953242059, 0.393619323152, 0.945308720483, 0.393619323152, 0.019953242059];
    for (let i = 0; i < 5; i++) {
      expect(node[i]).toBeCloseTo(nodes[i]!, 11);
      expect(weight[i]! * Math.sqrt(Math.PI)).toBeCloseTo(weights[i]!, 11);
    }
  });
});
