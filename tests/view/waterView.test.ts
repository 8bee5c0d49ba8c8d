import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { incidenceRad, lookAlong, viewAxes, waterAreaM2 } from '../../src/scene/perspective.ts';
import { planarAreaM2 } from '../../src/view/footprint.ts';
import { pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { groundAreaAtM2, groundAreaField, incidenceField } from '../../src/view/waterFields.ts';
import { groundAt, groundDistanceM, incidenceAtRad, placeOf, waterView } from '../../src/view/waterView.ts';

const DEGREE = Math.PI / 180;
const poses = fc.record({
  heightM: fc.double({ min: 0.5, max: 500, noNaN: true }),
  pitchDeg: fc.double({ min: -90, max: 0, noNaN: true }),
  rollDeg: fc.double({ min: -30, max: 30, noNaN: true }),
  radial: fc.double({ min: -0.08, max: 0.1, noNaN: true }),
});
const viewOf = (pose: { heightM: number; pitchDeg: number; rollDeg: number; radial: number }) =>
  waterView({
    camera: pinholeCamera(400, 300, 290, pose.radial),
    heightM: pose.heightM,
    pitchRad: pose.pitchDeg * DEGREE,
    rollRad: pose.rollDeg * DEGREE,
  });

describe('water view', () => {
  it('the middle of a camera that looks d degrees down sees the water at 90 - d from the vertical', () => {
    const view = waterView({
      camera: pinholeCamera(400, 300, 290),
      heightM: 10,
      pitchRad: -0.5,
      rollRad: 0.2,
    });
    expect(incidenceAtRad(view, 200, 150)).toBeCloseTo(Math.PI / 2 - 0.5, 12);
    const [x, y] = groundAt(view, 200, 150)!;
    expect(x).toBeCloseTo(0, 12);
    expect(y).toBeCloseTo(10 / Math.tan(0.5), 10);
  });

  it('places on the water and in the photo lead to each other', () => {
    fc.assert(
      fc.property(
        poses,
        fc.double({ min: 0, max: 400, noNaN: true }),
        fc.double({ min: 0, max: 300, noNaN: true }),
        (pose, x, y) => {
          const view = viewOf(pose);
          const ground = groundAt(view, x, y);
          fc.pre(ground !== null && incidenceAtRad(view, x, y) < 85 * DEGREE);
          const back = placeOf(view, ground![0], ground![1])!;
          expect(Math.hypot(back[0] - x, back[1] - y)).toBeLessThan(1e-7);
        },
      ),
    );
  });

  it('agrees with the renderer’s own geometry, which shares no code with it', () => {
    fc.assert(
      fc.property(
        poses,
        fc.double({ min: 0, max: 400, noNaN: true }),
        fc.double({ min: 0, max: 300, noNaN: true }),
        (pose, x, y) => {
          const view = viewOf({ ...pose, radial: 0 });
          const other = {
            widthPx: 400,
            heightPx: 300,
            focalPx: 290,
            heightM: view.heightM,
            pitchRad: view.pitchRad,
            rollRad: view.rollRad,
          };
          const ray = [0, 0, 0];
          lookAlong(other, viewAxes(other), x, y, ray);
          expect(incidenceAtRad(view, x, y)).toBeCloseTo(incidenceRad(ray), 10);
          const area = waterAreaM2(other, ray);
          fc.pre(incidenceRad(ray) < 89 * DEGREE);
          expect(groundAreaAtM2(view, x, y) / area).toBeCloseTo(1, 9);
        },
      ),
    );
  });

  it('a pixel’s area is that of the quadrilateral its corners cut out of the water', () => {
    fc.assert(
      fc.property(
        poses,
        fc.integer({ min: 0, max: 399 }),
        fc.integer({ min: 0, max: 299 }),
        (pose, column, row) => {
          const view = viewOf(pose);
          fc.pre(incidenceAtRad(view, column + 0.5, row + 0.5) < 75 * DEGREE);
          const corners = [
            [column, row],
            [column + 1, row],
            [column + 1, row + 1],
            [column, row + 1],
          ].map(([x, y]) => groundAt(view, x!, y!)!);
          // Second order: (pixel / downward component)^2 / 2 with at least 290 cos 75 = 75 pixels.
          expect(groundAreaAtM2(view, column + 0.5, row + 0.5) / planarAreaM2(corners)).toBeCloseTo(1, 3);
        },
      ),
    );
  });

  it('fields hold what the single places give, in any slice of rows', () => {
    const view = viewOf({ heightM: 7, pitchDeg: -30, rollDeg: 8, radial: -0.05 });
    const whole = incidenceField(view);
    const area = groundAreaField(view);
    for (const [column, row] of [
      [0, 0],
      [399, 0],
      [123, 45],
      [399, 299],
      [7, 222],
    ] as const) {
      const at = row * 400 + column;
      expect(whole[at]).toBeCloseTo(incidenceAtRad(view, column + 0.5, row + 0.5), 6);
      const single = groundAreaAtM2(view, column + 0.5, row + 0.5);
      if (Number.isNaN(single)) {
        expect(area[at]).toBeNaN();
      } else {
        expect(area[at]! / single).toBeCloseTo(1, 6);
      }
    }
    expect(incidenceField(view, { from: 100, to: 103 })).toEqual(whole.slice(100 * 400, 103 * 400));
    expect(groundAreaField(view, { from: 299, to: 300 })).toEqual(area.slice(299 * 400));
  });

  it('pixel areas add up to the footprint of the photo', () => {
    const view = viewOf({ heightM: 20, pitchDeg: -60, rollDeg: 5, radial: 0 });
    const sum = groundAreaField(view).reduce((total, area) => total + area, 0);
    const footprint = planarAreaM2(
      [
        [0, 0],
        [400, 0],
        [400, 300],
        [0, 300],
      ].map(([x, y]) => groundAt(view, x!, y!)!),
    );
    expect(sum / footprint).toBeCloseTo(1, 4);
  });

  it('ground areas grow with the square of the height, and the sky has none', () => {
    const pose = { heightM: 3, pitchDeg: -20, rollDeg: 0, radial: 0 };
    const ratio =
      groundAreaAtM2(viewOf({ ...pose, heightM: 6 }), 50, 290) / groundAreaAtM2(viewOf(pose), 50, 290);
    expect(ratio).toBeCloseTo(4, 12);
    expect(groundAreaAtM2(viewOf(pose), 200, 1)).toBeNaN();
    expect(groundAt(viewOf(pose), 200, 1)).toBeNull();
    expect(incidenceAtRad(viewOf(pose), 200, 1)).toBeGreaterThan(Math.PI / 2);
    expect(groundDistanceM(viewOf(pose), [200, 1], [200, 290])).toBeNaN();
  });

  it('refuses what is no view', () => {
    const camera = pinholeCamera(400, 300, 290);
    expect(() => waterView({ camera, heightM: 0, pitchRad: 0, rollRad: 0 })).toThrow(/height of the lens/);
    expect(() => waterView({ camera, heightM: 1, pitchRad: 2, rollRad: 0 })).toThrow(/pitch/);
    expect(() =>
      incidenceField(viewOf({ heightM: 1, pitchDeg: 0, rollDeg: 0, radial: 0 }), { from: 0, to: 301 }),
    ).toThrow(/Rows 0 to 301/);
  });
});
