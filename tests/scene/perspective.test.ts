import { describe, expect, it } from 'vitest';
import {
  focalPxFrom35mm,
  horizonAt,
  incidenceRad,
  lookAlong,
  type PinholeView,
  viewAxes,
  waterAreaM2,
} from '../../src/scene/perspective.ts';

const DEG = Math.PI / 180;

/** Sums the water area of the pixels (4 x 4 parts each) whose ground place is inside. */
function seenArea(view: PinholeView, inside: (x: number, y: number) => boolean): number {
  const axes = viewAxes(view);
  const ray = [0, 0, 0];
  let area = 0;
  for (let v = 0.125; v < view.heightPx; v += 0.25) {
    for (let u = 0.125; u < view.widthPx; u += 0.25) {
      lookAlong(view, axes, u, v, ray);
      const t = -view.heightM / ray[2]!;
      if (t > 0 && inside(t * ray[0]!, t * ray[1]!)) {
        area += waterAreaM2(view, ray) / 16;
      }
    }
  }
  return area;
}

describe('pinhole over level water', () => {
  const view: PinholeView = {
    widthPx: 240,
    heightPx: 320,
    focalPx: focalPxFrom35mm(26, 240, 320),
    heightM: 2.6,
    pitchRad: -32 * DEG,
    rollRad: 4 * DEG,
  };

  it('sees a disc of 0.8 m radius as pi r^2', () => {
    const area = seenArea(view, (x, y) => Math.hypot(x - 0.4, y - 3.5) < 0.8);
    expect(Math.abs(area / (Math.PI * 0.8 ** 2) - 1)).toBeLessThan(2e-3);
  });

  it('sees a rectangle 1.2 m by 4 m as 4.8 m2', () => {
    const area = seenArea(view, (x, y) => x > -0.5 && x < 0.7 && y > 3 && y < 7);
    expect(Math.abs(area / 4.8 - 1)).toBeLessThan(2e-3);
  });

  // From a 2 m quay: 35 degrees at 1.4 m, 80 degrees at 11.3 m (h tan theta).
  it('looks at 35 degrees 1.4 m away and at 80 degrees 11.3 m away from 2 m up', () => {
    expect(incidenceRad([0, 2 * Math.tan(35 * DEG), -2]) / DEG).toBeCloseTo(35, 9);
    expect(incidenceRad([0, 1.4, -2]) / DEG).toBeCloseTo(35, 0);
    expect(incidenceRad([0, 11.3, -2]) / DEG).toBeCloseTo(80, 0);
  });

  it('puts the middle of the picture at 90 degrees plus the pitch', () => {
    const ray = [0, 0, 0];
    lookAlong(view, viewAxes(view), 120, 160, ray);
    expect(incidenceRad(ray) / DEG).toBeCloseTo(58, 9);
  });

  it('tilts the horizon against the roll', () => {
    const level = { ...view, pitchRad: 0 };
    const ray = [0, 0, 0];
    // At pitch 0 the horizon passes through the middle; with a clockwise roll its right end rises in the picture.
    const dv = -100 * Math.tan(level.rollRad);
    lookAlong(level, viewAxes(level), 120 + 100, 160 + dv, ray);
    expect(ray[2]).toBeCloseTo(0, 9);
  });

  it('finds the horizon where the line of sight is level', () => {
    const ray = [0, 0, 0];
    for (const x of [0, 60, 240]) {
      lookAlong(view, viewAxes(view), x, horizonAt(view, x), ray);
      expect(ray[2]).toBeCloseTo(0, 9);
    }
    // Looking down by 32 degrees, it lies f tan 32 above the middle (no roll).
    const level = { ...view, rollRad: 0 };
    expect(horizonAt(level, 30)).toBeCloseTo(160 - view.focalPx * Math.tan(32 * DEG), 9);
  });

  it('keeps right, up and ahead at right angles', () => {
    const { right, up, ahead } = viewAxes(view);
    const dot = (a: readonly number[], b: readonly number[]) => a.reduce((sum, v, i) => sum + v * b[i]!, 0);
    expect(dot(right, up)).toBeCloseTo(0, 12);
    expect(dot(right, ahead)).toBeCloseTo(0, 12);
    expect(dot(up, ahead)).toBeCloseTo(0, 12);
    // right x ahead = up for right-handed X right, Y ahead, Z up.
    expect(right[1] * ahead[2] - right[2] * ahead[1]).toBeCloseTo(up[0], 12);
    expect(right[2] * ahead[0] - right[0] * ahead[2]).toBeCloseTo(up[1], 12);
  });

  it('takes the 35 mm equivalent by the diagonal', () => {
    // 26 mm on the 43.27 mm diagonal of 36 x 24: 2000 px of diagonal make 1201.9 px.
    expect(focalPxFrom35mm(26, 1200, 1600)).toBeCloseTo(1201.85, 1);
  });

  it('has no water at or above the horizon', () => {
    expect(waterAreaM2(view, [0, 1, 0])).toBeNaN();
    expect(waterAreaM2(view, [0, 1, 0.1])).toBeNaN();
  });
});
