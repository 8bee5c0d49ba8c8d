import { describe, expect, it } from 'vitest';
import { fieldOfViewRad, focalPxFrom35mm, pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { groundAreaAtM2 } from '../../src/view/waterFields.ts';
import { groundAt, incidenceAtRad, waterView } from '../../src/view/waterView.ts';

const DEGREE = Math.PI / 180;

describe('angle of view', () => {
  /** Angles of view of lenses on 36 x 24 mm, as printed in lens tables: horizontal, vertical, diagonal. Common practice. */
  it.each([
    [24, 73.7, 53.1, 84.1],
    [28, 65.5, 46.4, 75.4],
    [35, 54.4, 37.8, 63.4],
    [50, 39.6, 27.0, 46.8],
    [85, 23.9, 16.1, 28.6],
  ])('a %s mm lens sees %s x %s degrees, %s over the diagonal', (focal, horizontal, vertical, diagonal) => {
    const focalPx = focalPxFrom35mm(focal, 3600, 2400);
    expect(fieldOfViewRad(focalPx, 3600) / DEGREE).toBeCloseTo(horizontal, 1);
    expect(fieldOfViewRad(focalPx, 2400) / DEGREE).toBeCloseTo(vertical, 1);
    expect(fieldOfViewRad(focalPx, Math.hypot(3600, 2400)) / DEGREE).toBeCloseTo(diagonal, 1);
  });

  it('CIPA DCG-001: a 4:3 photo with the same diagonal has the same equivalent', () => {
    for (const focal of [13, 24, 26, 77]) {
      const diagonal = fieldOfViewRad(focalPxFrom35mm(focal, 4032, 3024), Math.hypot(4032, 3024));
      expect(diagonal).toBeCloseTo(2 * Math.atan(43.27 / 2 / focal), 3);
    }
  });
});

describe('a person on a quay, the eye 2 m above the water: common practice', () => {
  it.each([
    [35, 1.4],
    [80, 11.3],
  ])('%s degrees from the vertical is %s m away', (deg, metres) => {
    // Look along the axis, tilted so that the middle of the photo is seen at that angle.
    const view = waterView({
      camera: pinholeCamera(400, 300, 290),
      heightM: 2,
      pitchRad: (deg - 90) * DEGREE,
      rollRad: 0,
    });
    expect(incidenceAtRad(view, 200, 150)).toBeCloseTo(deg * DEGREE, 12);
    const [x, y] = groundAt(view, 200, 150)!;
    expect(x).toBeCloseTo(0, 9);
    expect(y).toBeCloseTo(metres, 1);
  });

  it('at 80 degrees the water is foreshortened to 0.17 of its length', () => {
    const across = waterView({
      camera: pinholeCamera(400, 300, 290),
      heightM: 2,
      pitchRad: -10 * DEGREE,
      rollRad: 0,
    });
    const [, near] = groundAt(across, 200, 150.5)!;
    const [, far] = groundAt(across, 200, 149.5)!;
    const distance = 2 / Math.cos(80 * DEGREE);
    expect(distance / 290 / (far - near)).toBeCloseTo(0.17, 2);
    expect(groundAreaAtM2(across, 200, 150)).toBeCloseTo((distance / 290) * (far - near), 3);
  });
});
