import { expect, test } from 'vitest';
import { PIXEL_STATUS } from '../../src/match/types.ts';
import { appearanceRaster, FILM_WITHOUT_CODE } from '../../src/record/appearanceRaster.ts';
import { gridFor, onGround, turnedMapping } from '../../src/record/worldGrid.ts';
import { sharesFromMap } from '../../src/tally/appearanceShares.ts';
import { focalPxFrom35mm, pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { groundAreaField, incidenceField } from '../../src/view/waterFields.ts';
import { groundAt, placeOf, waterView } from '../../src/view/waterView.ts';

const [width, height] = [400, 300];
const DEGREE = Math.PI / 180;

function slanted(radial = 0) {
  const camera = pinholeCamera(width, height, focalPxFrom35mm(28, width, height), radial);
  const view = waterView({ camera, heightM: 6, pitchRad: -35 * DEGREE, rollRad: 3 * DEGREE });
  const incidence = incidenceField(view);
  const areaM2 = groundAreaField(view).map((area, i) => (incidence[i]! < 75 * DEGREE ? area : 0));
  const mapping = {
    groundOf: (x: number, y: number) => groundAt(view, x, y),
    placeOf: (x: number, y: number) => placeOf(view, x, y),
  };
  return { view, areaM2, mapping };
}

test.each([0, -0.05])('area and volume survive the way to the ground (distortion %d)', (radial) => {
  const { areaM2, mapping, view } = slanted(radial);
  // A film that is thicker far away, with a bare hole of 2 m.
  const values = new Float32Array(width * height).map((_, i) => {
    const place = groundAt(view, (i % width) + 0.5, Math.floor(i / width) + 0.5);
    if (!place) return Number.NaN;
    return Math.hypot(place[0], place[1] - 8) < 2 ? 0 : 100 + 20 * place[1];
  });
  const turned = turnedMapping(mapping, 130);
  const grid = gridFor(areaM2, width, height, turned)!;
  const out = onGround(values, areaM2, width, height, turned, grid);
  const cell = grid.cellM ** 2;
  const [gridM2, gridNmM2] = out.reduce(
    ([area, sum], v) => (Number.isNaN(v) ? [area, sum] : [area + cell, sum + cell * v]),
    [0, 0],
  );
  let pixelM2 = 0;
  let pixelNmM2 = 0;
  areaM2.forEach((area, i) => {
    if (!(area > 0)) return;
    pixelM2 += area;
    pixelNmM2 += area * values[i]!;
  });
  expect(Math.abs(gridM2 / pixelM2 - 1)).toBeLessThan(0.005);
  expect(Math.abs(gridNmM2 / pixelNmM2 - 1)).toBeLessThan(0.005);
});

test('turned to a heading, what lies ahead lies along that bearing', () => {
  const { mapping } = slanted();
  const [x, y] = mapping.placeOf(0, 10)!;
  const east = turnedMapping(mapping, 90);
  const ground = east.groundOf(x, y)!;
  expect(ground[0]).toBeCloseTo(10, 9);
  expect(ground[1]).toBeCloseTo(0, 9);
  const place = east.placeOf(10, 0)!;
  expect(place[0]).toBeCloseTo(x, 9);
  expect(place[1]).toBeCloseTo(y, 9);
});

test('the grid has even cells, holds every pixel, and no more cells than asked', () => {
  const { areaM2, mapping } = slanted();
  for (const most of [200, 5000, 1_000_000]) {
    const grid = gridFor(areaM2, width, height, mapping, most)!;
    expect(grid.columns * grid.rows).toBeLessThanOrEqual(most);
    expect(Number(grid.cellM.toPrecision(12).replace(/[0.]/g, '').slice(0, 1))).toSatisfy((d: number) =>
      [1, 2, 5].includes(d),
    );
    for (let i = 0; i < areaM2.length; i += 7) {
      if (!(areaM2[i]! > 0)) continue;
      const [x, y] = mapping.groundOf((i % width) + 0.5, Math.floor(i / width) + 0.5)!;
      const column = (x - grid.westM) / grid.cellM;
      const row = (grid.northM - y) / grid.cellM;
      expect(column >= 0 && column <= grid.columns && row >= 0 && row <= grid.rows).toBe(true);
    }
  }
});

test('no pixel on the water, no grid', () => {
  const { mapping } = slanted();
  expect(gridFor(new Float32Array(width * height), width, height, mapping)).toBeNull();
});

test('appearance codes by pixel add up to the tally’s own shares', () => {
  const { areaM2 } = slanted();
  const pixels = width * height;
  const status = Uint8Array.from({ length: pixels }, (_, i) => i % 6);
  const thicknessNm = Float32Array.from({ length: pixels }, (_, i) => (i * 7.3) % 7000);
  const lowNm = Float32Array.from({ length: pixels }, (_, i) => (i * 11.1) % 9000);
  const map = { width, height, status, thicknessNm, lowNm, highNm: lowNm, order: status };
  for (const atLeastCode of [2, 3] as const) {
    const raster = appearanceRaster(map, atLeastCode, areaM2);
    const byCode = new Map<number, number>();
    raster.forEach((code, i) => {
      if (code > 0) byCode.set(code, (byCode.get(code) ?? 0) + areaM2[i]!);
    });
    const tally = sharesFromMap({ map, areaM2 }, atLeastCode);
    for (const code of [1, 2, 3] as const) {
      expect(byCode.get(code)! / tally.codedM2).toBeCloseTo(tally.shares![code - 1]!, 6);
    }
    expect(byCode.get(FILM_WITHOUT_CODE)!).toBeCloseTo(tally.belowM2, 6);
  }
  expect(new Set(appearanceRaster(map))).toEqual(new Set([0, 1, 2, 3, FILM_WITHOUT_CODE]));
  expect(PIXEL_STATUS.bare).toBe(2);
});
