import { describe, expect, it } from 'vitest';
import type { FilmTable } from '../../src/scene/filmTable.ts';
import { waterRegion } from '../../src/scene/harbour/harbourPlace.ts';
import type { Surroundings } from '../../src/scene/harbour/solids.ts';
import { type HarbourView, incidenceAtDeg, renderHarbour } from '../../src/scene/harbour/waterView.ts';
import { focalPxFrom35mm, type PinholeView } from '../../src/scene/perspective.ts';
import { insidePolygon } from '../../src/scene/region.ts';
import { TRUE_KIND } from '../../src/scene/types.ts';

const DEG = Math.PI / 180;
const view: PinholeView = {
  widthPx: 180,
  heightPx: 240,
  focalPx: focalPxFrom35mm(26, 180, 240),
  heightM: 2.5,
  pitchRad: -30 * DEG,
  rollRad: 2 * DEG,
};

/** Nothing around but an even sky. */
const openWater: Surroundings = {
  trace: () => Number.POSITIVE_INFINITY,
  sky: (_x, _y, _z, out) => out.fill(1),
  isLand: () => false,
};
/** A made-up film: red is its thickness over 1000 nm, green its angle in radians. */
const table: FilmTable = {
  stepNm: 1,
  count: 1001,
  lookUp: (nm, angleRad, out) => {
    out[0] = nm / 1000;
    out[1] = angleRad;
    out[2] = 0;
  },
};
const calm: HarbourView = {
  view,
  field: (x, y) => (Math.hypot(x - 0.3, y - 3.2) < 0.9 ? 400 : 0),
  table,
  surroundings: openWater,
  ripples: { slope: (_x, _y, _footprint, _damping, out) => out.fill(0) },
  spots: [],
  waterLight: [0, 0, 0],
  sun: null,
  subsamples: 4,
};

describe('water seen at a slant', () => {
  const picture = renderHarbour(calm);
  const total = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0);

  it('holds a disc of oil of 0.9 m radius as pi r^2, and its volume as area times thickness', () => {
    expect(Math.abs(total(picture.oiledM2) / (Math.PI * 0.81) - 1)).toBeLessThan(3e-3);
    expect(total(picture.volumeNmM2) / total(picture.oiledM2)).toBeCloseTo(400, 6);
  });

  it('takes each pixel at its own angle of incidence', () => {
    for (const [x, y] of [
      [90, 120],
      [20, 200],
      [170, 90],
    ] as const) {
      // The mean over 4 x 4 rays, near enough the middle's.
      expect(picture.raw[3 * (y * 180 + x) + 1]! / DEG).toBeCloseTo(
        incidenceAtDeg(view, x + 0.5, y + 0.5),
        1,
      );
    }
  });

  it('tells film from bare water and knows no thickness in the sky', () => {
    const film = picture.kind.indexOf(TRUE_KIND.film);
    const bare = picture.kind.indexOf(TRUE_KIND.bare);
    expect(picture.thicknessNm[film]).toBeGreaterThan(0);
    expect(picture.raw[3 * film]).toBeCloseTo(picture.thicknessNm[film]! / 1000, 6);
    expect(picture.thicknessNm[bare]).toBe(0);
    expect(picture.kind[0]).toBe(TRUE_KIND.other);
    expect(picture.thicknessNm[0]).toBeNaN();
    expect(picture.areaM2[0]).toBe(0);
  });

  it('sets foam, glint and mirrored walls apart', () => {
    const kinds = (scene: HarbourView) => new Set(renderHarbour({ ...scene, subsamples: 1 }).kind);
    const foam = { x: 0.3, y: 3.2, radiusM: 3, raw: [0.3, 0.3, 0.3] as const };
    expect(kinds({ ...calm, spots: [foam] }).has(TRUE_KIND.film)).toBe(false);
    const sun = { direction: [0, 0, 1] as const, cosine: -1 };
    expect(kinds({ ...calm, sun }).has(TRUE_KIND.film)).toBe(false);
    const ceiling: Surroundings = {
      ...openWater,
      trace: (_ox, _oy, oz, _dx, _dy, dz) => (oz < 1 && dz > 0 ? 5 : Number.POSITIVE_INFINITY),
    };
    expect(kinds({ ...calm, surroundings: ceiling }).has(TRUE_KIND.mirrorsSolid)).toBe(true);
    expect(kinds({ ...calm, surroundings: ceiling }).has(TRUE_KIND.film)).toBe(false);
  });

  it('marks a region of water within the angles asked for', () => {
    const region = waterRegion(view, -0.7, 60, 40);
    for (let y = 0; y < 240; y += 3) {
      for (let x = 0; x < 180; x += 3) {
        if (insidePolygon(region, x + 0.5, y + 0.5)) {
          expect(incidenceAtDeg(view, x + 0.5, y + 0.5)).toBeLessThan(60.5);
          expect(incidenceAtDeg(view, x + 0.5, y + 0.5)).toBeGreaterThan(36);
        }
      }
    }
    expect(region.length).toBeGreaterThan(3);
  });
});
