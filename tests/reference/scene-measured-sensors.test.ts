/**
 * Cameras measured by others (rawtoaces-data) against the family that the fit knows.
 *
 * The family keeps three components a channel. Its making: 50 cameras of the same collection, over which the three carry
 * 93, 96 and 92 % of the variance (red, green, blue). If these eight are among the 50, no sum over the eight can exceed the
 * sum over all: squares left over, and squares of each coefficient (which is in standard deviations, so 50 over all).
 * Jiang, Liu, Gu, Süsstrunk 2013, "What is the space of spectral sensitivity functions for digital color cameras?", WACV:
 * two components a channel, without a mean, carry 97 % and more of the squares of measured curves (from memory).
 */
import { describe, expect, test } from 'vitest';
import { wavelengths } from '../../src/colour/sampled.ts';
import { SENSOR_COMPONENTS, sensorComponents } from '../../src/colour/sensorFamily.ts';
import { MEASURED_SENSORS, measuredSensorCurves, measuredSensorOf } from '../../src/scene/measuredSensors.ts';
import { outsideSensorCurves } from '../../src/scene/outsideSensor.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { fitFamily } from '../colour/familyFit.ts';

const CAMERAS_OF_THE_FAMILY = 50;
const CARRIED = [0.93, 0.96, 0.92] as const;
/** The shares are printed in whole per cent. */
const HALF_PERCENT = 0.005;

const grid = wavelengths(380, 780, 5);
const n = grid.length;
const components = sensorComponents(grid);
const fits = MEASURED_SENSORS.map((sensor) => fitFamily(measuredSensorCurves(sensor, grid), grid));
const total = (values: readonly number[]) => values.reduce((sum, v) => sum + v, 0);

describe.each([
  ['red', 0],
  ['green', 1],
  ['blue', 2],
] as const)('%s of eight measured cameras', (_name, channel) => {
  test('three components leave no more than they leave over all cameras of the collection', () => {
    const from = (channel * SENSOR_COMPONENTS + 1) * n;
    const carriedVariance = total(Array.from(components.subarray(from, from + 3 * n), (v) => v * v));
    const share = CARRIED[channel] - HALF_PERCENT;
    const leftOverAll = CAMERAS_OF_THE_FAMILY * carriedVariance * (1 / share - 1);
    expect(total(fits.map((fit) => fit[channel]!.left))).toBeLessThan(leftOverAll);
  });

  test('no coefficient is larger than the standard deviation over the collection lets it be', () => {
    for (const k of [0, 1, 2]) {
      const squares = total(fits.map((fit) => fit[channel]!.coefficients[k]! ** 2));
      expect(squares).toBeLessThan(CAMERAS_OF_THE_FAMILY);
      // And they do differ: cameras of one make would say nothing of the others.
      expect(squares).toBeGreaterThan(1);
    }
  });

  test.each(MEASURED_SENSORS.map(({ name }, i) => [name, i] as const))('%s: 97 %% described', (_, i) => {
    const fit = fits[i]![channel]!;
    expect(fit.left / fit.curve).toBeLessThan(0.03);
    // But not a member: the photos of the condition "measured" are not what the fit was made on.
    expect(fit.left / fit.curve).toBeGreaterThan(0.0001);
  });
});

test('the invented sensors of the condition "outside" lie further out than these cameras, over the channels together', () => {
  const outside = Array.from({ length: 24 }, (_, seed) =>
    fitFamily(outsideSensorCurves(grid, seededRandom(`outside/${seed}`)), grid),
  );
  const leftShare = (all: typeof fits) =>
    total(all.flatMap((fit) => fit.map(({ left, curve }) => left / curve))) / all.length;
  expect(leftShare(outside)).toBeGreaterThan(leftShare(fits));
});

test('curves are as the source prints them, each of unit sum', () => {
  // Rows of the source's files in full (red, green, blue).
  const printed: readonly (readonly [string, number, readonly [number, number, number]])[] = [
    ['Sony ILCE-7RM2', 470, [0.03094595, 0.36280875, 0.83517165]],
    ['Sony ILCE-7SM2', 580, [0.32694218, 0.61690528, 0.03106791]],
    ['Nikon D5100', 590, [0.981032422, 0.351789312, 0.010009094]],
    ['ARRI D-21', 545, [0.388993508, 0.931244461, 0.269598208]],
    ['Canon PowerShot S90', 660, [0.4709, 0.0839, 0.0276]],
    ['Canon EOS 5D Mark II', 520, [0.0912, 0.9776, 0.1682]],
    ['Nikon D700', 430, [0.0546, 0.0369, 0.6098]],
    ['Canon Digital Rebel XTi', 460, [0.0158, 0.245, 0.9783]],
  ];
  for (const [name, nm, values] of printed) {
    const sensor = MEASURED_SENSORS.find((candidate) => candidate.name === name)!;
    const { red, green, blue } = sensor.curves;
    [red, green, blue].forEach((curve, c) => {
      expect(curve).toHaveLength(n);
      expect(Math.abs(curve[(nm - 380) / 5]! - values[c]!)).toBeLessThanOrEqual(0.500001e-5);
    });
    const curves = measuredSensorCurves(sensor, grid);
    for (const c of [0, 1, 2]) {
      expect(total(Array.from(curves.subarray(c * n, (c + 1) * n)))).toBeCloseTo(1, 12);
    }
  }
});

test('where the source filled every second row by straight lines, so do these figures', () => {
  // Measured every 10 nm, printed to four decimals; a wrong digit anywhere would show.
  const filled = ['Canon PowerShot S90', 'Canon EOS 5D Mark II', 'Nikon D700', 'Canon Digital Rebel XTi'];
  for (const { name, curves } of MEASURED_SENSORS.filter((sensor) => filled.includes(sensor.name))) {
    for (const curve of [curves.red, curves.green, curves.blue]) {
      for (let i = 1; i < n - 1; i += 2) {
        const middle = (curve[i - 1]! + curve[i + 1]!) / 2;
        expect(Math.abs(curve[i]! - middle), `${name} at ${380 + 5 * i} nm`).toBeLessThan(0.000051);
      }
    }
  }
});

test('eight seeds in a row are eight cameras', () => {
  const names = Array.from({ length: 8 }, (_, i) => measuredSensorOf(i + 1).name);
  expect(new Set(names).size).toBe(MEASURED_SENSORS.length);
  expect(measuredSensorOf(9).name).toBe(names[0]);
  expect(measuredSensorOf(0).name).toBe(names[7]);
});
