import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/scene/random.ts';
import {
  adaptiveMonteCarlo,
  monteCarlo,
  numericalTolerance,
  shortestInterval,
  summarise,
  symmetricInterval,
} from '../../src/tally/monteCarlo.ts';

describe('Monte Carlo', () => {
  it('the same seed gives the same result', () => {
    const run = () => monteCarlo((random) => random.normal(), seededRandom(5), 1000);
    expect(run()).toEqual(run());
  });

  it('both intervals hold the stated share of the trials, and the shortest is no longer', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { minLength: 50, maxLength: 400 }),
        fc.double({ min: 0.5, max: 0.95, noNaN: true }),
        (values, coverage) => {
          const sorted = Float64Array.from(values).sort();
          const symmetric = symmetricInterval(sorted, coverage);
          const shortest = shortestInterval(sorted, coverage);
          for (const { low, high } of [symmetric, shortest]) {
            const held = sorted.filter((value) => value >= low && value <= high).length;
            expect(held).toBeGreaterThanOrEqual(coverage * sorted.length);
          }
          expect(shortest.high - shortest.low).toBeLessThanOrEqual(symmetric.high - symmetric.low);
        },
      ),
    );
  });

  it('JCGM 101:2008, 7.7: for M = 1000 and 95 %, the ends are the 25th and the 975th value', () => {
    // q = 950 and r = (M - q) / 2 = 25.
    const sorted = Float64Array.from({ length: 1000 }, (_, i) => i + 1);
    expect(symmetricInterval(sorted, 0.95)).toEqual({ low: 25, high: 975 });
  });

  it('JCGM 101:2008, 7.9.2: numerical tolerance of 0.000 35 (two digits) is 0.000 005, of 2 (one digit) 0.5', () => {
    expect(numericalTolerance(0.00035, 2)).toBeCloseTo(0.000005, 15);
    expect(numericalTolerance(2, 1)).toBeCloseTo(0.5, 12);
    expect(numericalTolerance(0, 2)).toBeGreaterThan(0);
  });

  it('adaptive trials stop when steady, or say that they did not settle', () => {
    const settled = adaptiveMonteCarlo((random) => random.normal(), seededRandom('a'), { digits: 1 });
    expect(settled.settled).toBe(true);
    expect(settled.standardUncertainty).toBeCloseTo(1, 1);
    const cut = adaptiveMonteCarlo((random) => 9.9 * random.normal(), seededRandom('a'), {
      maxTrials: 20_000,
    });
    expect(cut.settled).toBe(false);
    expect(cut.trials).toBe(20_000);
  });

  it('refuses too few trials, impossible coverage and models that give no number', () => {
    expect(() => monteCarlo((random) => random.next(), seededRandom(1), 20, 0.95)).toThrow(/too few/);
    expect(() => monteCarlo((random) => random.next(), seededRandom(1), 1000, 1)).toThrow(/coverage/);
    expect(() => monteCarlo(() => Number.NaN, seededRandom(1), 1000)).toThrow(/no number/);
    expect(() => summarise(new Float64Array(10), 0.9)).toThrow(/too few/);
  });
});
