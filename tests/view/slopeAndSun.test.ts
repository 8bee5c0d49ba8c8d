import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/scene/random.ts';
import { discreteGauss } from '../../src/view/discreteGauss.ts';
import { glintReport, glintTiltRad, sunInView } from '../../src/view/glint.ts';
import { incidenceDistribution } from '../../src/view/incidenceDistribution.ts';
import { pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { slopeVariance, slopeVarianceInsidePixel } from '../../src/view/seaSlope.ts';
import { suggestSkyColour } from '../../src/view/skyColour.ts';
import { sunNotices, sunPosition } from '../../src/view/sun.ts';
import { lookAt, waterView } from '../../src/view/waterView.ts';

const DEGREE = Math.PI / 180;
const mean = (rule: { angleRad: Float64Array; weight: Float64Array }, f: (angle: number) => number) =>
  rule.angleRad.reduce((sum, angle, i) => sum + rule.weight[i]! * f(angle), 0);

describe('incidence on a rough surface', () => {
  it('weights add to one, angles ascend and stay between level sight and grazing', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 1.3, noNaN: true }),
        fc.double({ min: 0, max: 0.06, noNaN: true }),
        fc.integer({ min: 1, max: 9 }),
        (angle, variance, nodes) => {
          const rule = incidenceDistribution(angle, variance, nodes);
          expect(rule.weight.reduce((a, b) => a + b)).toBeCloseTo(1, 9);
          for (let i = 0; i < rule.angleRad.length; i++) {
            expect(rule.angleRad[i]).toBeGreaterThanOrEqual(0);
            expect(rule.angleRad[i]).toBeLessThanOrEqual(Math.PI / 2);
            expect(rule.weight[i]).toBeGreaterThan(0);
            if (i > 0) {
              expect(rule.angleRad[i]).toBeGreaterThan(rule.angleRad[i - 1]!);
            }
          }
        },
      ),
      { numRuns: 60 },
    );
  });

  it('seen from the side, the spread is the slope along the sight: half the variance', () => {
    const rule = incidenceDistribution(40 * DEGREE, 0.002);
    const centre = mean(rule, (a) => a);
    expect(Math.sqrt(mean(rule, (a) => (a - centre) ** 2))).toBeCloseTo(Math.sqrt(0.001), 3);
    expect(centre / DEGREE).toBeCloseTo(40, 0);
  });

  it('seen from above, the square of the angle has the whole variance for its mean', () => {
    expect(mean(incidenceDistribution(0, 0.002), (a) => Math.tan(a) ** 2)).toBeCloseTo(0.002, 5);
  });

  it('agrees with facets drawn one by one and weighed by the area they turn to the viewer', () => {
    const random = seededRandom('facets');
    const [angle, variance] = [55 * DEGREE, 0.03];
    let [sum, squares, weight] = [0, 0, 0];
    for (let i = 0; i < 400_000; i++) {
      const sx = Math.sqrt(variance / 2) * random.normal();
      const sy = Math.sqrt(variance / 2) * random.normal();
      const size = Math.hypot(sx, sy, 1);
      const cosine = (Math.cos(angle) - sx * Math.sin(angle)) / size;
      const area = Math.max(0, cosine) * size;
      const local = area > 0 ? Math.acos(cosine) : 0;
      weight += area;
      sum += area * local;
      squares += area * local * local;
    }
    const rule = incidenceDistribution(angle, variance);
    expect(mean(rule, (a) => a)).toBeCloseTo(sum / weight, 3);
    expect(mean(rule, (a) => a * a)).toBeCloseTo(squares / weight, 3);
    expect(sum / weight).toBeLessThan(angle);
  });

  it('more nodes do not change the mean of a fringe pattern', () => {
    const fringe = (a: number) =>
      Math.cos(((4 * Math.PI * 800) / 550) * Math.sqrt(1.47 ** 2 - Math.sin(a) ** 2));
    const few = mean(incidenceDistribution(40 * DEGREE, 0.016, 7), fringe);
    expect(few).toBeCloseTo(mean(incidenceDistribution(40 * DEGREE, 0.016, 15), fringe), 4);
  });

  it('still water gives one angle', () => {
    const rule = incidenceDistribution(0.7, 0);
    expect([...rule.angleRad]).toEqual([0.7]);
    expect([...rule.weight]).toEqual([1]);
  });

  it('refuses angles and slopes that make no sense', () => {
    expect(() => incidenceDistribution(1.6, 0.01)).toThrow(/angle of view/);
    expect(() => incidenceDistribution(0.6, -1)).toThrow(/mean square slope/);
    expect(() => slopeVariance(-1, 'clean')).toThrow(/wind/);
    expect(() => discreteGauss(Float64Array.of(1, 2), Float64Array.of(1, 1), 3)).toThrow(/distinct points/);
    expect(() => discreteGauss(Float64Array.of(1), Float64Array.of(0), 1)).toThrow(/some weight/);
  });

  it('the part inside a pixel grows with the pixel from nothing to all', () => {
    const at = (pixelM: number, surface: 'clean' | 'slick') =>
      slopeVarianceInsidePixel(0.02, pixelM, 5, surface);
    expect(at(0.005, 'clean')).toBe(0);
    expect(at(0.2, 'slick')).toBe(0);
    expect(at(0.2, 'clean')).toBeGreaterThan(0.005);
    expect(at(1, 'clean')).toBeGreaterThan(at(0.2, 'clean'));
    expect(at(100, 'clean')).toBeCloseTo(0.02, 12);
    expect(at(100, 'slick')).toBeCloseTo(0.02, 12);
  });
});

describe('sun', () => {
  it('warns at night, in twilight and of a low sun, and not by day', () => {
    const codes = [-20, -3, 5, 35].map((elevationDeg) =>
      sunNotices({ elevationDeg, azimuthDeg: 180 }).map(({ code }) => code),
    );
    expect(codes).toEqual([['sun-night'], ['sun-twilight'], ['sun-low'], []]);
  });

  it('refuses a time or place that makes no sense', () => {
    expect(() => sunPosition(Number.NaN, 0, 0)).toThrow(/time/);
    expect(() => sunPosition(0, 91, 0)).toThrow(/latitude/);
  });

  it('suggests a colour inside its own range, bluer for clear sky than for cloud', () => {
    for (const elevation of [5, 40]) {
      for (const cloud of ['clear', 'broken', 'overcast'] as const) {
        const { kelvin, lowKelvin, highKelvin } = suggestSkyColour(elevation, cloud);
        expect(lowKelvin).toBeLessThan(kelvin);
        expect(kelvin).toBeLessThan(highKelvin);
      }
      expect(suggestSkyColour(elevation, 'clear').kelvin).toBeGreaterThan(
        suggestSkyColour(elevation, 'overcast').kelvin,
      );
    }
  });
});

describe('glint', () => {
  const view = waterView({
    camera: pinholeCamera(400, 300, 290),
    heightM: 5,
    pitchRad: -40 * DEGREE,
    rollRad: 0,
  });

  it('level water mirrors a sun that stands as high as the camera looks down, dead ahead', () => {
    const look = new Float64Array(3);
    lookAt(view, 200, 150, look);
    expect(glintTiltRad(look, sunInView({ elevationDeg: 40, azimuthDeg: 77 }, 77))).toBeCloseTo(0, 12);
    expect(glintTiltRad(look, sunInView({ elevationDeg: 60, azimuthDeg: 77 }, 77))).toBeCloseTo(
      10 * DEGREE,
      12,
    );
  });

  it('warns facing the sun, not with the sun behind; wind widens it', () => {
    const sun = { elevationDeg: 40, azimuthDeg: 120 };
    const facing = glintReport(view, sun, 120, 0.02);
    expect(facing.notice!.code).toBe('sun-glint');
    expect(facing.leastTiltRad).toBeLessThan(1 * DEGREE);
    expect(glintReport(view, sun, 300, 0.02).notice).toBeNull();
    expect(facing.share).toBeGreaterThan(glintReport(view, sun, 120, 0.003).share);
  });

  it('no sun, no glint', () => {
    expect(glintReport(view, { elevationDeg: -2, azimuthDeg: 0 }, 0, 0.02).notice).toBeNull();
  });
});
