import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/scene/random.ts';
import { blackFilmBoundary } from '../../src/tally/blackFilm.ts';
import { DRAINAGE_LAWS, type DrainageLawId, fitDrainageLaw } from '../../src/tally/drainageLaw.ts';
import { drainageReadings } from '../../src/tally/drainageReadings.ts';
import { leastSquares } from '../../src/tally/leastSquares.ts';
import { profileAlongLine, profileByRows } from '../../src/tally/profile.ts';
import { atLeast, bare, film, glint, madeMap } from './fields.ts';

describe('profiles', () => {
  it('rows average what has an answer, and say how many pixels that was', () => {
    const map = madeMap(6, 4, (x, y) =>
      x === 0 ? glint : x === 1 ? atLeast(900) : film(100 * y + 10 * x, 4),
    );
    const profile = profileByRows(map);
    expect([...profile.placePx]).toEqual([0.5, 1.5, 2.5, 3.5]);
    expect([...profile.thicknessNm]).toEqual([35, 135, 235, 335]);
    expect([...profile.pixels]).toEqual([4, 4, 4, 4]);
    expect(profile.spreadNm[2]).toBeCloseTo(Math.sqrt(125), 9);
  });

  it('averaging does not shrink the interval: errors of neighbours are common', () => {
    const profile = profileByRows(
      madeMap(50, 2, () => film(300, 7)),
      { rowsPerPlace: 2 },
    );
    expect(profile.lowNm[0]).toBeCloseTo(293, 9);
    expect(profile.highNm[0]).toBeCloseTo(307, 9);
    expect(profile.pixels[0]).toBe(100);
    expect(profile.placePx[0]).toBe(1);
  });

  it('places without an answer hold NaN', () => {
    const profile = profileByRows(madeMap(3, 2, (_, y) => (y ? glint : film(80))));
    expect(profile.thicknessNm[1]).toBeNaN();
    expect(profile.lowNm[1]).toBeNaN();
    expect(profile.spreadNm[1]).toBeNaN();
  });

  it('a line reads what lies under it, in its direction', () => {
    const map = madeMap(100, 50, (x) => film(10 * x + 100));
    const forth = profileAlongLine(map, [10, 25], [30, 25], 3);
    expect([...forth.thicknessNm].slice(0, 3)).toEqual([200, 210, 220]);
    expect([...profileAlongLine(map, [30, 25], [10, 25]).thicknessNm].slice(0, 2)).toEqual([390, 380]);
    expect(profileAlongLine(map, [0, 25], [0, 45]).thicknessNm).toHaveLength(20);
    expect(profileAlongLine(map, [90, 25], [110, 25]).thicknessNm[15]).toBeNaN();
    expect(() => profileAlongLine(map, [3, 3], [3, 3.5])).toThrow(/one pixel apart/);
    expect(() => profileByRows(map, { toRow: 51 })).toThrow(/100 × 50/);
  });
});

describe('black film', () => {
  const wedge = (offset: number) =>
    profileByRows(madeMap(4, 60, (_, y) => (y < 10 ? bare : film(Math.max(1, 4 * (y - 10) + offset), 6))));

  it('ends where the film first reaches 30 nm, between two rows', () => {
    const boundary = blackFilmBoundary(wedge(0))!;
    expect(boundary.placePx).toBeCloseTo(10.5 + 30 / 4, 6);
    expect(boundary.fromPx).toBeCloseTo(10.5 + 24 / 4, 6);
    expect(boundary.toPx).toBeCloseTo(10.5 + 36 / 4, 6);
  });

  it('is nowhere in a film that is thick at the top, or black throughout', () => {
    expect(blackFilmBoundary(profileByRows(madeMap(2, 5, () => film(200))))).toBeNull();
    expect(blackFilmBoundary(profileByRows(madeMap(2, 5, () => bare)))).toBeNull();
  });
});

describe('drainage laws', () => {
  const times = Float64Array.from({ length: 24 }, (_, i) => 5 + 10 * i);
  const truth: Record<DrainageLawId, number[]> = {
    exponential: [900, 80],
    reynolds: [1200, 3e6],
    rigidVertical: [64_000],
    powerLaw: [5000, -0.7],
  };
  const readingsOf = (id: DrainageLawId, noise: (i: number) => number) => {
    const heightM = times.map((_, i) => 0.002 + 0.001 * (i % 5));
    const thicknessNm = times.map(
      (t, i) => DRAINAGE_LAWS[id].thicknessNm(Float64Array.from(truth[id]), t, heightM[i]!) + noise(i),
    );
    return { timeS: times, heightM, thicknessNm, sdNm: times.map(() => 2) };
  };

  it.each(Object.keys(truth) as DrainageLawId[])('%s is found again from its own readings', (id) => {
    const fit = fitDrainageLaw(
      id,
      readingsOf(id, () => 0),
    );
    expect(fit.converged).toBe(true);
    fit.parameters.forEach(({ value }, k) => {
      expect(value / truth[id][k]!).toBeCloseTo(1, 6);
    });
    expect(fit.rootMeanSquareNm).toBeLessThan(1e-4);
  });

  it.each(Object.keys(truth) as DrainageLawId[])(
    '%s: standard deviations are those of repeated fits',
    (id) => {
      const random = seededRandom(`drainage/${id}`);
      const repeats = 300;
      const pulls = truth[id].map(() => 0);
      for (let repeat = 0; repeat < repeats; repeat++) {
        const fit = fitDrainageLaw(
          id,
          readingsOf(id, () => 2 * random.normal()),
        );
        fit.parameters.forEach(({ value, sd }, k) => {
          // Take the Birge widening back out: noise is as stated here.
          pulls[k]! += ((value - truth[id][k]!) / (sd / Math.max(1, fit.birgeRatio))) ** 2;
        });
      }
      for (const pull of pulls) {
        // Variance of 300 normal pulls: 1 with a standard deviation of sqrt(2 / 300) = 0.08.
        expect(Math.abs(pull / repeats - 1)).toBeLessThan(0.25);
      }
    },
  );

  it('readings that scatter by more than they say widen the standard deviations', () => {
    const random = seededRandom('scatter');
    const fit = fitDrainageLaw(
      'exponential',
      readingsOf('exponential', () => 8 * random.normal()),
    );
    expect(fit.birgeRatio).toBeGreaterThan(3);
    expect(fit.birgeRatio).toBeLessThan(5);
  });

  it('the rigid film’s law satisfies the draining equation dh/dt + (g h² / 4 nu) dh/dz = 0', () => {
    const nu = 1e-6;
    const g = 9.81;
    const a = Float64Array.of(2 * Math.sqrt(nu / g) * 1e9);
    const h = (z: number, t: number) => 1e-9 * DRAINAGE_LAWS.rigidVertical.thicknessNm(a, t, z);
    fc.assert(
      fc.property(
        fc.double({ min: 0.001, max: 0.1, noNaN: true }),
        fc.double({ min: 1, max: 1000, noNaN: true }),
        (z, t) => {
          const byTime = (h(z, t * (1 + 1e-5)) - h(z, t * (1 - 1e-5))) / (2e-5 * t);
          const byHeight = (h(z * (1 + 1e-5), t) - h(z * (1 - 1e-5), t)) / (2e-5 * z);
          expect(((g * h(z, t) ** 2) / (4 * nu)) * byHeight).toBeCloseTo(-byTime, 12);
          expect((((g * h(z, t) ** 2) / (4 * nu)) * byHeight) / -byTime).toBeCloseTo(1, 6);
        },
      ),
    );
  });

  it('profiles of a rigid film at three times give the law back, black film and gaps left out', () => {
    const a = 60_000;
    const at = (timeS: number) => ({
      timeS,
      profile: profileByRows(
        madeMap(5, 80, (x, y) =>
          y < 20 ? bare : x === 4 ? glint : film(a * Math.sqrt(((y + 0.5 - 20) * 1e-4) / timeS), 6),
        ),
      ),
    });
    const readings = drainageReadings([at(10), at(40), at(90)], { topPx: 20, metresPerPixel: 1e-4 });
    expect(readings.thicknessNm).toHaveLength(3 * 60);
    expect(readings.sdNm[0]).toBeCloseTo(12 / 3.29, 2);
    const fit = fitDrainageLaw('rigidVertical', readings);
    expect(fit.parameters[0]!.value / a).toBeCloseTo(1, 6);
    expect(() => drainageReadings([at(10)], { topPx: 0, metresPerPixel: 0 })).toThrow(/known length/);
  });

  it('refuses readings that a law cannot take, and too few of them', () => {
    const good = readingsOf('exponential', () => 0);
    expect(() => fitDrainageLaw('rigidVertical', { ...good, heightM: new Float64Array(3) })).toThrow(
      /a height/,
    );
    expect(() => fitDrainageLaw('powerLaw', { ...good, timeS: times.map((_, i) => i) })).toThrow(
      /more than 0 s/,
    );
    expect(() => fitDrainageLaw('exponential', { ...good, thicknessNm: times.map(() => 0) })).toThrow(
      /more than 0 nm/,
    );
    expect(() => fitDrainageLaw('exponential', { ...good, sdNm: times.map(() => 0) })).toThrow(
      /wider than nothing/,
    );
    expect(() =>
      leastSquares((p) => p[0]!, Float64Array.of(1), Float64Array.of(1), Float64Array.of(1)),
    ).toThrow(/more than 1 readings/);
  });

  it('readings that cannot tell the parameters apart leave their standard deviation open', () => {
    const fit = fitDrainageLaw('exponential', {
      timeS: Float64Array.of(5, 5, 5, 5),
      thicknessNm: Float64Array.of(100, 101, 99, 100),
      sdNm: Float64Array.of(1, 1, 1, 1),
    });
    expect(fit.parameters.every(({ sd }) => Number.isNaN(sd) || sd > 0)).toBe(true);
    expect(fit.parameters.some(({ sd, value }) => Number.isNaN(sd) || sd > Math.abs(value))).toBe(true);
  });
});
