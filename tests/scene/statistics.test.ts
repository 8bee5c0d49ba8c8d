import { quantileSorted } from 'd3-array';
import { describe, expect, it } from 'vitest';
import { quantileOfSorted, sampleErrors, summariseErrors } from '../../src/cli/validate/statistics.ts';
import { seededRandom } from '../../src/scene/random.ts';

const NONE = Number.NaN;

/** Six pixels by hand: two exact, one 60 nm off, one without answer, one lower bound, one not film. */
const map = {
  trueNm: Float32Array.of(100, 200, 300, 400, 900, NONE),
  isFilm: Uint8Array.of(1, 1, 1, 1, 1, 0),
  thicknessNm: Float32Array.of(101, 198, 360, NONE, NONE, 50),
  lowNm: Float32Array.of(98, 199, 350, NONE, 800, 40),
  highNm: Float32Array.of(104, 203, 370, NONE, NONE, 60),
};

describe('error statistics', () => {
  it('counts every film pixel of a hand-made map', () => {
    const figures = summariseErrors([sampleErrors(map)]);
    // Errors 1, 2, 60, infinite, infinite: the middle one is 60, the 90th percentile has no answer.
    expect(figures.filmPixels).toBe(5);
    expect(figures.medianNm).toBe(60);
    expect(figures.p90Nm).toBe(Number.POSITIVE_INFINITY);
    expect(figures.offByMoreThan50).toBeCloseTo(1 / 5, 12);
    expect(figures.withoutAnswer).toBeCloseTo(2 / 5, 12);
    // Intervals on four: 98-104 holds 100, 199-203 holds 200, 350-370 misses 300, "at least 800" holds 900.
    expect(figures.coverage).toBeCloseTo(3 / 4, 12);
  });

  it('divides the index error out of the truth', () => {
    const figures = summariseErrors([sampleErrors({ ...map, trueScale: 1.01 })]);
    expect(figures.medianNm).toBeCloseTo(360 - 303, 4);
    expect(figures.offByMoreThan50).toBeCloseTo(1 / 5, 12);
  });

  it('pools maps pixel by pixel, not map by map', () => {
    const small = sampleErrors({ ...map, isFilm: Uint8Array.of(1, 0, 0, 0, 0, 0) });
    const pooled = summariseErrors([sampleErrors(map), small]);
    expect(pooled.filmPixels).toBe(6);
    expect(pooled.offByMoreThan50).toBeCloseTo(1 / 6, 12);
    expect(pooled.coverage).toBeCloseTo(4 / 5, 12);
  });

  it('says NaN for coverage where no interval was given', () => {
    const silent = sampleErrors({ ...map, lowNm: new Float32Array(6).fill(NONE) });
    expect(summariseErrors([silent]).coverage).toBeNaN();
  });

  it('refuses arrays of different size', () => {
    expect(() => sampleErrors({ ...map, lowNm: new Float32Array(5) })).toThrow(/differ in size/);
  });

  // d3-array (ISC), quantileSorted: the same definition 7.
  it('agrees with d3-array on quantiles', () => {
    const random = seededRandom('quantiles');
    for (const count of [1, 2, 3, 10, 101, 1000]) {
      const values = Float64Array.from({ length: count }, () => random.uniform(0, 900)).sort();
      for (const share of [0, 0.05, 0.5, 0.9, 0.95, 1]) {
        expect(quantileOfSorted(values, share)).toBeCloseTo(quantileSorted([...values], share)!, 9);
      }
    }
  });

  it('has no quantile of nothing', () => {
    expect(quantileOfSorted([], 0.5)).toBeNaN();
  });
});
