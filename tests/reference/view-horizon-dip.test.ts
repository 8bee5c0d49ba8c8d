import { describe, expect, it } from 'vitest';
import { EARTH_RADIUS_M, horizonDipRad } from '../../src/view/horizon.ts';

const MINUTE = Math.PI / 180 / 60;

/**
 * The Nautical Almanac (HM Nautical Almanac Office and US Naval Observatory), dip table on the altitude correction
 * page: height of eye in metres and dip in minutes, one decimal. From memory.
 */
const ALMANAC: readonly (readonly [heightM: number, dipMinutes: number])[] = [
  [1.0, 1.8],
  [1.5, 2.2],
  [2.0, 2.5],
  [2.5, 2.8],
  [3.0, 3.0],
  [20, 7.9],
  [22, 8.3],
  [24, 8.6],
  [26, 9.0],
  [28, 9.3],
  [30, 9.6],
  [32, 10.0],
  [34, 10.3],
  [36, 10.6],
];

describe('dip of the sea horizon', () => {
  it.each(ALMANAC)('from %s m the almanac has %s minutes', (heightM, dipMinutes) => {
    expect(Math.round((horizonDipRad(heightM) / MINUTE) * 10) / 10).toBe(dipMinutes);
  });

  it('the almanac’s other form, 0.97 minutes times the root of the height in feet, is the same to its two digits', () => {
    // Both coefficients are rounded: 1.76 by 0.3 %, 0.97 by 0.5 %.
    for (const feet of [6, 30, 100, 400]) {
      const minutes = horizonDipRad(feet * 0.3048) / MINUTE;
      expect(Math.abs(minutes / (0.97 * Math.sqrt(feet)) - 1)).toBeLessThan(0.008);
    }
  });

  it('without refraction it is 1.93 minutes times the root of the height (1.06 for feet): common practice', () => {
    for (const heightM of [1, 10, 100]) {
      const minutes = horizonDipRad(heightM, false) / MINUTE;
      expect(minutes / Math.sqrt(heightM)).toBeCloseTo(1.93, 2);
      expect(minutes / Math.sqrt(heightM / 0.3048)).toBeCloseTo(1.06, 2);
    }
  });

  it('the horizon from 2 m is 5.0 km off, and the flat-water error at 75 degrees is what the doc says', () => {
    // Distance to the geometric horizon 3.57 km times the root of the height in metres: common practice.
    expect((horizonDipRad(2, false) * EARTH_RADIUS_M) / 1000 / Math.sqrt(2)).toBeCloseTo(3.57, 2);
    const reach = 300 * Math.tan((75 * Math.PI) / 180);
    expect((reach * reach) / (2 * EARTH_RADIUS_M)).toBeCloseTo(0.1, 1);
  });
});
