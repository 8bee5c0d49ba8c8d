import { describe, expect, it } from 'vitest';
import { oilScene, soapScene } from '../../src/scene/benchScenes.ts';
import { CONDITIONS, STATED } from '../../src/scene/conditions.ts';
import { waterToPixel } from '../../src/scene/harbour/harbourPlace.ts';
import { harbourScene } from '../../src/scene/harbourScene.ts';
import { MEASURED_SENSORS } from '../../src/scene/measuredSensors.ts';
import { insidePolygon, regionMask } from '../../src/scene/region.ts';
import { type Scene, TRUE_KIND } from '../../src/scene/types.ts';
import { pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { placeOf, waterView } from '../../src/view/waterView.ts';

const request = { width: 96, height: 72, seed: 3, conditions: STATED };
const harbour = (seed: number) =>
  harbourScene({
    width: 90,
    height: 120,
    seed,
    conditions: STATED,
    skyUnevenness: 0,
    glint: true,
    subsamples: 2,
    rippleWaves: 12,
  });
/** Name, maker, and how many seeds to look at. */
const scenes: [string, (seed: number) => Scene, number][] = [
  ['draining soap film', (seed) => soapScene({ ...request, seed }, false), 6],
  ['soap film with black film', (seed) => soapScene({ ...request, seed }, true), 6],
  ['oil sheen', (seed) => oilScene({ ...request, seed }, 'sheen'), 12],
  ['oil lens', (seed) => oilScene({ ...request, seed }, 'lens'), 12],
  ['harbour', harbour, 3],
];

describe.each(scenes)('scene: %s', (_, make, seeds) => {
  it('gives the same bytes for the same seed and others for another', () => {
    const one = make(3);
    expect(make(3)).toEqual(one);
    expect(make(4).codes).not.toEqual(one.codes);
  });

  it('holds truth and told references that agree', () => {
    for (let seed = 1; seed <= seeds; seed++) {
      const scene = make(seed);
      const most = scene.filmKind === 'soap' ? 1250 : 1000;
      let film = 0;
      scene.kind.forEach((kind, i) => {
        const nm = scene.thicknessNm[i]!;
        if (kind === TRUE_KIND.film) {
          film++;
          expect(nm).toBeGreaterThan(0);
          expect(nm).toBeLessThanOrEqual(most);
        } else if (kind === TRUE_KIND.bare) {
          expect(nm).toBe(0);
        }
      });
      expect(film).toBeGreaterThan(0.08 * scene.kind.length);
      const clean = scene.setup.references?.clean;
      if (clean) {
        const [x, y, w, h] = clean;
        expect(w).toBeGreaterThan(3);
        expect(h).toBeGreaterThan(3);
        for (let row = y; row < y + h; row++) {
          for (let column = x; column < x + w; column++) {
            expect(scene.kind[row * scene.width + column]).toBe(TRUE_KIND.bare);
          }
        }
      }
    }
  });

  it('keeps film pixels within the stated conditions and clips next to none of them', () => {
    const scene = make(7);
    const inRegion = regionMask(scene.setup.region, scene.width, scene.height);
    let [clipped, film] = [0, 0];
    scene.kind.forEach((kind, i) => {
      if (kind === TRUE_KIND.film && inRegion[i] === 1) {
        film++;
        clipped += Math.max(...scene.codes.subarray(3 * i, 3 * i + 3)) >= 254 ? 1 : 0;
      }
    });
    expect(clipped / film).toBeLessThan(0.01);
    const { drawn: d, setup } = scene;
    d.gains.forEach((gain) => {
      expect(Math.abs(gain - 1)).toBeLessThanOrEqual(0.1);
    });
    expect(d.daylightK).toBeGreaterThanOrEqual(5000);
    expect(d.daylightK).toBeLessThanOrEqual(12000);
    const told = setup.light && 'daylightK' in setup.light ? setup.light.daylightK : Number.NaN;
    expect(Math.abs(told - d.daylightK)).toBeLessThanOrEqual(1525);
    expect(d.noiseCodes).toBe(2);
    expect(d.coefficients).toHaveLength(9);
  });
});

describe('the harder conditions', () => {
  it('draw what they say', () => {
    const of = (name: keyof typeof CONDITIONS) =>
      soapScene({ ...request, conditions: CONDITIONS[name] }, false).drawn;
    expect(of('filmic').tone.shape).toBe('filmic');
    expect(of('outside').sensor).toBe('outside');
    expect(of('outside').coefficients).toHaveLength(0);
    expect(MEASURED_SENSORS.map(({ name }) => name)).toContain(of('measured').measuredSensor);
    expect(of('measured').coefficients).toHaveLength(0);
    // The draws do not depend on the camera: all else is as under the stated conditions.
    expect(of('measured')).toMatchObject({
      gains: of('stated').gains,
      tone: of('stated').tone,
      daylightK: of('stated').daylightK,
    });
    expect(of('blurred').relativeThicknessSpread).toBeGreaterThan(0);
  });

  it('without errors, a scene is the told set-up exactly', () => {
    const scene = oilScene({ ...request, conditions: { ...STATED, errors: 'none', tone: 'none' } }, 'lens');
    expect(scene.setup.light).toEqual({ daylightK: scene.drawn.daylightK });
    expect(scene.drawn.indexError).toBe(0);
    expect(scene.drawn.veil).toEqual([0, 0, 0]);
  });
});

describe('the harbour', () => {
  const scene = harbour(2);

  it('projects as the reader does (two codes, one geometry)', () => {
    const { view } = scene;
    const theirs = waterView({
      camera: pinholeCamera(view.widthPx, view.heightPx, view.focalPx),
      heightM: view.heightM,
      pitchRad: view.pitchRad,
      rollRad: view.rollRad,
    });
    for (const [x, y] of [
      [0, 2],
      [1.5, 3],
      [-0.5, 7],
      [4, 9],
    ] as const) {
      const own = waterToPixel(view, x, y)!;
      const other = placeOf(theirs, x, y)!;
      expect(own[0]).toBeCloseTo(other[0], 8);
      expect(own[1]).toBeCloseTo(other[1], 8);
    }
  });

  it('counts oil only within the marked region, and less than all of it', () => {
    expect(scene.water.oiledM2).toBeGreaterThan(0);
    expect(scene.water.oiledM2).toBeLessThan(scene.water.regionM2);
    // Mean thickness of the oiled part is a film's.
    const meanNm = (scene.water.volumeMl / scene.water.oiledM2) * 1000;
    expect(meanNm).toBeGreaterThan(20);
    expect(meanNm).toBeLessThan(1000);
  });

  it('knows inside from outside of a polygon', () => {
    const square = [
      [0, 0],
      [4, 0],
      [4, 4],
      [0, 4],
    ] as const;
    expect(insidePolygon(square, 2, 2)).toBe(true);
    expect(insidePolygon(square, 5, 2)).toBe(false);
    expect(insidePolygon(square, 2, -1)).toBe(false);
  });
});
