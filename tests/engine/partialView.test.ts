import { describe, expect, it } from 'vitest';
import { missingOfView, sketchView, withWholeView } from '../../src/engine/partialView.ts';
import type { ViewSetup } from '../../src/engine/setup.ts';
import { demoHarbour } from '../../src/scene/demoScenes.ts';
import { groundAt, groundDistanceM } from '../../src/view/waterView.ts';

const PHOTO = { width: 1200, height: 1600, focalLength35mm: 26 };

describe('the view that a set-up describes', () => {
  it('names what is missing and gives no view until then', () => {
    expect(missingOfView(undefined, { width: 10, height: 10 })).toEqual(['height', 'focal', 'tilt']);
    expect(missingOfView({ heightM: 3 }, PHOTO)).toEqual(['tilt']);
    expect(sketchView({ heightM: 3 }, PHOTO)).toBeNull();
    expect(withWholeView({ film: 'diesel', view: { heightM: 3 } }, PHOTO)).toEqual({ film: 'diesel' });
    expect(missingOfView({ pixelSizeM: 0.01 }, PHOTO)).toEqual([]);
  });

  it('sees the quay of field practice: from 2 m up, 35 degrees off the vertical falls 1.4 m away', () => {
    // Closed case of the pinhole over level water: 2 m x tan 35 degrees (issue 4, figures of the trade).
    const view = sketchView({ heightM: 2, pitchDeg: -55 }, PHOTO)?.view;
    const at = view && groundAt(view, 600, 800);
    expect(at?.[1]).toBeCloseTo(2 * Math.tan((35 * Math.PI) / 180), 9);
  });

  it('finds the camera of a rendered harbour from two taps on its horizon', () => {
    const scene = demoHarbour({ width: 300, height: 400 });
    const [a, b] = scene.toldView.horizon;
    if (!a || !b) throw new Error('no horizon');
    const setup: ViewSetup = { heightM: scene.view.heightM, horizon: [a, b] };
    const found = sketchView(setup, {
      width: 300,
      height: 400,
      focalLength35mm: scene.toldView.focal35mm,
    })?.view;
    // Taps are whole pixels: half a pixel of 300 is 0.1 degrees; a harbour's far shore has no dip, 1.76' √h at most.
    expect(Math.abs((found?.pitchRad ?? 9) - scene.view.pitchRad)).toBeLessThan((0.25 * Math.PI) / 180);
    expect(Math.abs((found?.rollRad ?? 9) - scene.view.rollRad)).toBeLessThan((0.25 * Math.PI) / 180);
  });

  it('takes the height from a known length that sets it', () => {
    const known = sketchView(
      {
        heightM: 4,
        horizon: [
          [100, 300],
          [1100, 310],
        ],
      },
      PHOTO,
    );
    if (!known) throw new Error('no view');
    const ends = [
      [200, 1200],
      [900, 1000],
    ] as const;
    const lengthM = groundDistanceM(known.view, ends[0], ends[1]);
    const found = sketchView(
      {
        heightM: 99,
        horizon: [
          [100, 300],
          [1100, 310],
        ],
        knownLength: { ends, lengthM, sets: true },
      },
      PHOTO,
    );
    expect(found?.view.heightM).toBeCloseTo(4, 3);
  });
});
