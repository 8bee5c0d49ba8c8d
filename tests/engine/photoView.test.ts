import { describe, expect, it } from 'vitest';
import { groundAreaOf, incidenceOf, photoViewOf, withPhotoFocal } from '../../src/engine/photoView.ts';
import type { Setup, ViewSetup } from '../../src/engine/setup.ts';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import { incidenceAtDeg } from '../../src/scene/harbour/waterView.ts';
import { harbourScene } from '../../src/scene/harbourScene.ts';
import { seededRandom } from '../../src/scene/random.ts';

const setupWith = (view: ViewSetup): Setup => ({ film: 'diesel', view });
const DEGREE = Math.PI / 180;

describe('the view of a set-up over a photo', () => {
  const scene = harbourScene({
    width: 90,
    height: 120,
    seed: 3,
    conditions: CONDITIONS.stated,
    skyUnevenness: 0,
    glint: false,
    subsamples: 1,
    rippleWaves: 2,
  });
  const exact = {
    heightM: scene.view.heightM,
    focal35mm: scene.toldView.focal35mm,
    pitchDeg: scene.view.pitchRad / DEGREE,
    rollDeg: scene.view.rollRad / DEGREE,
  };

  it('looks where the renderer looked, whose geometry is its own', () => {
    const incidence = incidenceOf(photoViewOf(setupWith(exact), 90, 120)!);
    for (const [x, y] of [
      [0, 119],
      [45, 60],
      [89, 100],
      [10, 80],
    ] as const)
      expect(incidence[y * 90 + x]! / DEGREE).toBeCloseTo(incidenceAtDeg(scene.view, x + 0.5, y + 0.5), 4);
  });

  it('finds the same tilt from two taps on the horizon, and puts them before a pitch', () => {
    const [a, b] = scene.toldView.horizon;
    const { heightM, focal35mm } = exact;
    const told = photoViewOf(setupWith({ heightM, focal35mm, horizon: [a!, b!], pitchDeg: -80 }), 90, 120)!;
    // Taps to the nearest pixel, one pixel being 0.6 degrees in this small photo.
    expect(Math.abs(told.view!.pitchRad - scene.view.pitchRad)).toBeLessThan(0.6 * DEGREE);
  });

  it('covers the same water when the photo is measured at another size', () => {
    const sum = (w: number, h: number) =>
      groundAreaOf(photoViewOf(setupWith({ ...exact, pitchDeg: -60 }), w, h)!).reduce((s, a) => s + a, 0);
    expect(sum(90, 120) / sum(360, 480)).toBeCloseTo(1, 3);
  });

  it('takes the height from a known length that sets it, and reports one that only checks', () => {
    const view = { ...exact, pitchDeg: -45 };
    const truth = photoViewOf(setupWith(view), 90, 120)!;
    const length = {
      ends: [
        [20, 100],
        [70, 90],
      ] as const,
      lengthM: 1,
    };
    const measured = photoViewOf(setupWith({ ...view, knownLength: length }), 90, 120)!.lengthCheck!;
    const { heightM: _, ...noHeight } = view;
    const set = photoViewOf(
      setupWith({ ...noHeight, knownLength: { ...length, lengthM: measured.measuredM, sets: true } }),
      90,
      120,
    )!;
    expect(set.view!.heightM).toBeCloseTo(truth.view!.heightM, 9);
    const off = { ...length, lengthM: measured.measuredM * 1.4 };
    const checked = photoViewOf(setupWith({ ...view, knownLength: off }), 90, 120)!;
    expect(checked.notices.map((n) => n.code)).toEqual(['length-disagrees']);
  });

  it('a pixel size with a focal length gives angles about the vertical; without, the vertical for all and says so', () => {
    const wide = photoViewOf(setupWith({ pixelSizeM: 0.01, focal35mm: 26 }), 400, 300)!;
    // Straight down the corner is seen at the half diagonal angle: atan(21.63 / 26) by the definition of 35 mm equivalence.
    expect(incidenceOf(wide)[0]).toBeCloseTo(Math.atan(Math.hypot(36, 24) / 2 / 26), 2);
    expect(groundAreaOf(wide)[150 * 400 + 200]).toBeCloseTo(1e-4, 7);
    const flat = photoViewOf(setupWith({ pixelSizeM: 0.01 }), 40, 30)!;
    expect([...incidenceOf(flat).slice(0, 3)]).toEqual([0, 0, 0]);
    expect(flat.notices[0]!.code).toBe('view-vertical-assumed');
  });

  it('draws views that scatter as stated', () => {
    const random = seededRandom('poses');
    const { poses, view } = photoViewOf(setupWith({ ...exact, heightSdShare: 0.1, pitchSdDeg: 2 }), 90, 120)!;
    const drawn = Array.from({ length: 2000 }, () => poses!(random));
    const sd = (values: number[]) => {
      const mean = values.reduce((s, v) => s + v, 0) / values.length;
      return Math.sqrt(values.reduce((s, v) => s + (v - mean) ** 2, 0) / values.length);
    };
    expect(sd(drawn.map((v) => Math.log(v.heightM / view!.heightM)))).toBeCloseTo(0.1, 2);
    expect(sd(drawn.map((v) => v.pitchRad / DEGREE)) / 2).toBeCloseTo(1, 1);
  });

  it('asks for a focal length where none is known, and takes the photo’s own', () => {
    const { focal35mm: _, ...noFocal } = exact;
    expect(() => photoViewOf(setupWith(noFocal), 90, 120)).toThrow(/focal length/);
    const filled = withPhotoFocal(setupWith(noFocal), { focalLength35mm: 26 });
    expect(photoViewOf(filled, 90, 120)!.view!.camera.focalPx).toBeCloseTo(scene.view.focalPx, 6);
    expect(withPhotoFocal(setupWith(exact), { focalLength35mm: 50 }).view!.focal35mm).toBe(26);
  });
});
