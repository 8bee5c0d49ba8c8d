import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { describe, expect, it } from 'vitest';
import { DRAINAGE_LAWS, fitDrainageLaw } from '../../src/tally/drainageLaw.ts';
import { leastSquares } from '../../src/tally/leastSquares.ts';

describe('least squares against a general-purpose library (npm ml-levenberg-marquardt)', () => {
  const timeS = Float64Array.from({ length: 12 }, (_, i) => 4 + 9 * i);
  // Readings made by hand about 820 exp(-t / 55).
  const thicknessNm = Float64Array.of(768, 645, 553, 466, 396, 341, 282, 244, 209, 171, 149, 130);
  // The library's weights (5.1.0) steer its steps one way and its error the other, so a reading of weight k is given to it
  // k times instead, and to ours once with the standard deviation over the root of k.
  const times = [1, 1, 2, 2, 2, 3, 3, 3, 5, 5, 8, 8];
  const sdNm = Float64Array.from(times, (k) => 6 / Math.sqrt(k));
  const repeated = (values: Float64Array) => times.flatMap((k, i) => Array<number>(k).fill(values[i]!));

  it('finds the same parameters and the same chi square of an exponential law', () => {
    const ours = fitDrainageLaw('exponential', { timeS, thicknessNm, sdNm });
    const theirs = levenbergMarquardt(
      { x: repeated(timeS), y: repeated(thicknessNm) },
      ([h0, tau]) =>
        (t: number) =>
          h0! * Math.exp(-t / tau!),
      {
        initialValues: [700, 70],
        damping: 0.01,
        maxIterations: 500,
        errorTolerance: 1e-12,
        centralDifference: true,
        gradientDifference: 1e-4,
      },
    );
    ours.parameters.forEach(({ value }, k) => {
      expect(value / theirs.parameterValues[k]!).toBeCloseTo(1, 6);
    });
    expect(ours.birgeRatio ** 2 * ours.degreesOfFreedom).toBeCloseTo(theirs.parameterError / 36, 6);
  });

  it('a straight line has the textbook’s parameters and covariance (Press et al., Numerical Recipes, 15.2)', () => {
    const x = [1, 2, 4, 7, 9];
    const y = Float64Array.of(2.1, 3.8, 8.3, 13.9, 18.2);
    const sd = Float64Array.of(0.1, 0.2, 0.2, 0.3, 0.3);
    const fit = leastSquares((p, i) => p[0]! + p[1]! * x[i]!, y, sd, Float64Array.of(1, 1));
    const sum = (f: (i: number) => number) => x.reduce((total, _, i) => total + f(i) / sd[i]! ** 2, 0);
    const [s, sx, sy, sxx, sxy] = [
      sum(() => 1),
      sum((i) => x[i]!),
      sum((i) => y[i]!),
      sum((i) => x[i]! ** 2),
      sum((i) => x[i]! * y[i]!),
    ] as [number, number, number, number, number];
    const delta = s * sxx - sx * sx;
    expect(fit.parameters[0]).toBeCloseTo((sxx * sy - sx * sxy) / delta, 8);
    expect(fit.parameters[1]).toBeCloseTo((s * sxy - sx * sy) / delta, 8);
    expect(fit.covariance[0]).toBeCloseTo(sxx / delta, 8);
    expect(fit.covariance[3]).toBeCloseTo(s / delta, 8);
    expect(fit.covariance[1]).toBeCloseTo(-sx / delta, 8);
  });
});

describe('drainage of a rigid vertical film', () => {
  it('a = 2 (nu / g)^(1/2): water at 20 °C, 1 cm below the top after 1 minute, is 8.3 µm (hand sum)', () => {
    // nu = 1.004e-6 m²/s (IAPWS, common practice), g = 9.80665: 2 sqrt(1.004e-6 × 0.01 / (9.80665 × 60)) = 8.26e-6 m.
    const a = Float64Array.of(2e9 * Math.sqrt(1.004e-6 / 9.80665));
    expect(DRAINAGE_LAWS.rigidVertical.thicknessNm(a, 60, 0.01) / 1000).toBeCloseTo(8.26, 2);
  });
});
