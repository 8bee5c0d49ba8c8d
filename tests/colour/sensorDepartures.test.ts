import { describe, expect, it } from 'vitest';
import { SENSOR_DEPARTURES, sensorDepartures } from '../../src/colour/sensorDepartures.ts';
import { SENSOR_COMPONENTS, sensorComponents } from '../../src/colour/sensorFamily.ts';

const grid = Float64Array.from({ length: 81 }, (_, i) => 380 + 5 * i);
const departures = sensorDepartures(grid);
const family = sensorComponents(grid);
const mode = (c: number, k: number) =>
  departures.subarray((c * SENSOR_DEPARTURES + k) * 81, (c * SENSOR_DEPARTURES + k + 1) * 81);
const component = (c: number, k: number) =>
  family.subarray((c * SENSOR_COMPONENTS + k) * 81, (c * SENSOR_COMPONENTS + k + 1) * 81);
const dot = (a: ArrayLike<number>, b: ArrayLike<number>) => {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
};
const size = (a: ArrayLike<number>) => Math.sqrt(dot(a, a));

describe('departures of a sensor from its family', () => {
  it('hold nothing that the family can do itself, and leave the unit sum alone', () => {
    for (let c = 0; c < 3; c++)
      for (let k = 0; k < SENSOR_DEPARTURES; k++) {
        expect(Math.abs(mode(c, k).reduce((sum, v) => sum + v, 0))).toBeLessThan(1e-9);
        for (let f = 1; f < SENSOR_COMPONENTS; f++) {
          const cosine = dot(mode(c, k), component(c, f)) / (size(mode(c, k)) * size(component(c, f)));
          expect(Math.abs(cosine)).toBeLessThan(1e-6);
        }
      }
  });

  it('are independent of each other, the largest first', () => {
    for (let c = 0; c < 3; c++)
      for (let k = 1; k < SENSOR_DEPARTURES; k++) {
        expect(size(mode(c, k))).toBeLessThanOrEqual(size(mode(c, k - 1)) * (1 + 1e-9));
        for (let other = 0; other < k; other++) {
          const cosine = dot(mode(c, k), mode(c, other)) / (size(mode(c, k)) * size(mode(c, other)));
          expect(Math.abs(cosine)).toBeLessThan(1e-6);
        }
      }
  });

  it('carry less variance together than the family they depart from', () => {
    for (let c = 0; c < 3; c++) {
      let own = 0;
      let beyond = 0;
      for (let k = 1; k < SENSOR_COMPONENTS; k++) own += size(component(c, k)) ** 2;
      for (let k = 0; k < SENSOR_DEPARTURES; k++) beyond += size(mode(c, k)) ** 2;
      expect(beyond).toBeLessThan(own);
      expect(beyond).toBeGreaterThan(0.04 * own);
    }
  });
});
