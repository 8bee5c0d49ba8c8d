import { describe, expect, it } from 'vitest';
import { sunPosition } from '../../src/view/sun.ts';

describe('sun position', () => {
  it('Reda & Andreas 2004 (NREL), worked example of the Solar Position Algorithm', () => {
    // 17 October 2003, 12:30:30 at UTC-7; 39.742476 N, 105.1786 W, 1830.14 m, 820 mbar, 11 degrees C.
    // Topocentric zenith 50.11162, azimuth 194.34024 degrees (table A5.1).
    const sun = sunPosition(Date.parse('2003-10-17T12:30:30-07:00'), 39.742476, -105.1786);
    // Our refraction is for sea level: 0.0193 degrees at this height, of which 820 mbar leaves four fifths. The method's
    // own error is about 0.01 degrees.
    expect(Math.abs(90 - sun.elevationDeg - 50.11162)).toBeLessThan(0.01 + 0.004);
    expect(Math.abs(sun.azimuthDeg - 194.34024)).toBeLessThan(0.01 / Math.cos((39.9 * Math.PI) / 180));
  });

  it('Meeus, Astronomical Algorithms, example 25.a: from the pole the sun stands at its declination', () => {
    // 13 October 1992, 0h: apparent declination -7.78507 degrees. From memory. Refraction by the Nautical Almanac,
    // 0.0167 / tan(H + 7.31 / (H + 4.4)) degrees.
    const { elevationDeg } = sunPosition(Date.parse('1992-10-13T00:00:00Z'), -90, 0);
    const refraction = 0.0167 / Math.tan(((7.78507 + 7.31 / (7.78507 + 4.4)) * Math.PI) / 180);
    expect(Math.abs(elevationDeg - refraction - 7.78507)).toBeLessThan(0.01);
  });

  it('at noon the azimuth is south of the tropics’ north and north of the tropics’ south: common practice', () => {
    expect(Math.abs(sunPosition(Date.parse('2024-03-20T12:07:00Z'), 52, 0).azimuthDeg - 180)).toBeLessThan(1);
    const south = sunPosition(Date.parse('2024-03-20T12:07:00Z'), -34, 0).azimuthDeg;
    expect(Math.min(south, 360 - south)).toBeLessThan(1);
  });
});
