import { describe, expect, it } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { estimate } from '../../src/engine/estimate.ts';
import { keepFit } from '../../src/engine/keptFit.ts';
import { LEFT_OUT, leftOutOf } from '../../src/engine/leftOut.ts';
import { previewMap } from '../../src/engine/previewMap.ts';
import type { Pin, Setup } from '../../src/engine/setup.ts';
import { changeBetween } from '../../src/engine/setupChanges.ts';
import { MOST_CANDIDATES, makeCandidateField } from '../../src/match/candidates.ts';
import { fillCandidates } from '../../src/match/mapPixels.ts';
import { PIXEL_STATUS, type ThicknessMap } from '../../src/match/types.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';
import { SCENES } from '../../src/scene/catalogue.ts';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import { TRUE_KIND } from '../../src/scene/types.ts';

const scene = SCENES['oil-sheen']({ width: 240, height: 180, seed: 3, conditions: CONDITIONS.stated });
const { width, height } = scene;
const pixels: PhotoPixels = {
  width,
  height,
  codes: scene.codes,
  channels: 3,
  maxCode: 255,
  encoding: SRGB,
};
const whole: Setup = scene.setup;
const kept = keepFit(pixels, whole, null);

function preview(setup: Setup): ThicknessMap {
  const leftOut = leftOutOf(pixels, setup);
  const { field, reader, calibration } = kept;
  fillCandidates(pixels, reader, calibration.rules, leftOut, field, 0, field.height);
  return previewMap(field, setup, calibration, leftOut, width, height);
}

describe('what a change of the set-up costs', () => {
  it('is the dearest of its parts, and nothing for an empty list', () => {
    const pins: Pin[] = [{ at: [9, 9], is: 'bare' }];
    expect(changeBetween(whole, { ...whole })).toBe('none');
    expect(changeBetween(whole, { ...whole, pins: [] })).toBe('none');
    expect(changeBetween(whole, { ...whole, position: { latitudeDeg: 1, longitudeDeg: 2 } })).toBe('none');
    expect(changeBetween(whole, { ...whole, pins })).toBe('orders');
    expect(changeBetween({ ...whole, pins }, { ...whole, pins: [{ at: [9, 8], is: 'bare' }] })).toBe(
      'orders',
    );
    expect(changeBetween({ ...whole, trend: 'thickerDown' }, whole)).toBe('orders');
    const strokes = [{ paint: 'out' as const, points: [[1, 1] as const], widthPx: 3 }];
    expect(changeBetween(whole, { ...whole, pins, strokes })).toBe('mask');
    expect(changeBetween({ ...whole, strokes }, { ...whole, maxThicknessNm: 900, strokes })).toBe('all');
    // A key that this list has never heard of costs everything.
    expect(changeBetween(whole, { ...whole, unheardOf: 1 } as Setup)).toBe('all');
  });

  it('is no second fit for pins, and a fit for anything that the fit heard', () => {
    const pinned = keepFit(pixels, { ...whole, pins: [{ at: [9, 9], order: 2 }] }, kept);
    expect(pinned.calibration).toBe(kept.calibration);
    expect(pinned.reader).toBe(kept.reader);
    const warmer = keepFit(pixels, { ...whole, light: { daylightK: 5000 } }, kept);
    expect(warmer.calibration).not.toBe(kept.calibration);
  });
});

describe('a preview', () => {
  it('of a small photo is the full map without its smoothing: as near the truth of the scene', () => {
    const map = preview(whole);
    expect([map.width, map.height]).toEqual([width, height]);
    const full = estimate(pixels, whole).map;
    let film = 0;
    let near = 0;
    let fullNear = 0;
    for (let i = 0; i < map.status.length; i++) {
      if (scene.kind[i] !== TRUE_KIND.film) continue;
      film++;
      if (Math.abs(map.thicknessNm[i]! - scene.thicknessNm[i]!) < 25) near++;
      if (Math.abs(full.thicknessNm[i]! - scene.thicknessNm[i]!) < 25) fullNear++;
    }
    expect(film).toBeGreaterThan(5000);
    expect(fullNear / film).toBeGreaterThan(0.8);
    expect(near / film).toBeGreaterThan(fullNear / film - 0.05);
  });

  it('heeds a pin and forgets it again', () => {
    const i = scene.kind.findIndex(
      (kind, n) => kind === TRUE_KIND.film && scene.thicknessNm[n]! > 250 && n % width > 30 && n > 30 * width,
    );
    const at = [i % width, Math.floor(i / width)] as const;
    const without = preview(whole);
    expect(without.status[i]).toBe(PIXEL_STATUS.measured);
    expect(preview({ ...whole, pins: [{ at, is: 'bare' }] }).status[i]).toBe(PIXEL_STATUS.bare);
    expect(preview(whole).thicknessNm).toEqual(without.thicknessNm);
  });

  it('leaves out what is painted out and reads what is painted in again', () => {
    const out = { paint: 'out' as const, points: [[0, 90] as const, [239, 90] as const], widthPx: 20 };
    const back = { paint: 'in' as const, points: [[120, 90] as const], widthPx: 10 };
    const map = preview({ ...whole, strokes: [out, back] });
    expect(map.status[90 * width + 40]).toBe(PIXEL_STATUS.outside);
    expect(map.thicknessNm[90 * width + 40]).toBeNaN();
    expect(map.status[90 * width + 120]).not.toBe(PIXEL_STATUS.outside);
    expect(map.status[60 * width + 40]).not.toBe(PIXEL_STATUS.outside);
  });

  it('of a large photo looks at every second place, each where it lies', () => {
    const field = makeCandidateField(500, 401, 6);
    field.count.fill(1);
    field.sdNm.fill(1);
    for (let i = 0; i < field.count.length; i++) field.thicknessNm[i * MOST_CANDIDATES] = 100 + (i % 500);
    const leftOut = new Uint8Array(3000 * 2406);
    // The pixel that place (200, 100) of the field looks at: of the preview, (100, 50).
    leftOut[(100 * 6 + 3) * 3000 + 200 * 6 + 3] = LEFT_OUT.outsideRegion;
    field.count[100 * 500 + 200] = 0;
    const map = previewMap(field, whole, kept.calibration, leftOut, 3000, 2406);
    expect([map.width, map.height]).toEqual([250, 201]);
    expect(map.thicknessNm[7 * 250 + 60]).toBe(220);
    expect(map.status[50 * 250 + 100]).toBe(PIXEL_STATUS.outside);
    expect(map.status.filter((status) => status === PIXEL_STATUS.outside)).toHaveLength(1);
  });
});
