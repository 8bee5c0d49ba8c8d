import { describe, expect, it } from 'vitest';
import { areaCells, lookFromCells, newCellView } from '../../src/view/areaCells.ts';
import { focalFromLength, scaleFromLength } from '../../src/view/groundScale.ts';
import { horizonDipRad, horizonInPhoto } from '../../src/view/horizon.ts';
import { focalPxFrom35mm, pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { straightDownFromPixelSize, straightDownView, uniformFields } from '../../src/view/straightDown.ts';
import { dropExcluded, VIEW_STATUS, viewNotices, viewShares, viewStatus } from '../../src/view/viewLimits.ts';
import { groundAreaAtM2, groundAreaField, incidenceField } from '../../src/view/waterFields.ts';
import { groundAt, groundDistanceM, incidenceAtRad, placeOf, waterView } from '../../src/view/waterView.ts';

const DEGREE = Math.PI / 180;
const camera = pinholeCamera(400, 300, focalPxFrom35mm(26, 400, 300));
const view = waterView({ camera, heightM: 4, pitchRad: -18 * DEGREE, rollRad: 1 * DEGREE });

describe('view limits', () => {
  it('sorts angles at 60, 75 and 90 degrees', () => {
    const status = viewStatus(
      Float32Array.from([0, 59.9, 60.1, 74.9, 75.1, 89.9, 90.1, 140], (deg) => deg * DEGREE),
    );
    expect([...status]).toEqual([0, 0, 1, 1, 2, 2, 3, 3]);
    expect([...viewStatus(Float32Array.of(0.5, 0.7), 0.6)]).toEqual([
      VIEW_STATUS.good,
      VIEW_STATUS.tooSlanted,
    ]);
  });

  it('shares add to one and say what was left out; a region of steep pixels says nothing', () => {
    const status = viewStatus(incidenceField(view));
    const shares = viewShares(status);
    expect(shares.good + shares.slanted + shares.tooSlanted + shares.aboveHorizon).toBeCloseTo(1, 12);
    expect(viewNotices(shares).map(({ code }) => code)).toEqual([
      'view-excluded',
      'view-above-horizon',
      'view-slanted',
    ]);
    const steep = Uint8Array.from(status, (code) => (code === VIEW_STATUS.good ? 1 : 0));
    expect(viewNotices(viewShares(status, steep))).toEqual([]);
  });

  it('takes the area from every pixel that is left out, and counts them', () => {
    const area = Float32Array.of(1, 2, 3, 4);
    expect(dropExcluded(area, Uint8Array.of(0, 1, 2, 3))).toBe(2);
    expect([...area]).toEqual([1, 2, Number.NaN, Number.NaN]);
  });

  it('a photo of nothing but far water or sky says to look further down', () => {
    expect(viewNotices({ good: 0, slanted: 0, tooSlanted: 1, aboveHorizon: 0 })[0]!.code).toBe(
      'view-no-water',
    );
  });
});

describe('known lengths', () => {
  it('a length that fits says nothing; one that does not tells by how much and which height would fit', () => {
    const [a, b] = [placeOf(view, -1, 6)!, placeOf(view, 1.5, 7)!];
    const trueM = Math.hypot(2.5, 1);
    expect(scaleFromLength(view, a, b, trueM).notice).toBeNull();
    const check = scaleFromLength(view, a, b, 0.8 * trueM);
    expect(check.factor).toBeCloseTo(0.8, 10);
    expect(check.impliedHeightM).toBeCloseTo(3.2, 9);
    expect(check.disagreement).toBeCloseTo(0.25, 9);
    expect(check.notice!.text).toMatch(/25 % too long.*3\.20 m/);
    const corrected = waterView({ ...view, heightM: check.impliedHeightM });
    expect(groundDistanceM(corrected, a, b)).toBeCloseTo(0.8 * trueM, 9);
  });

  it('a length that runs away from the camera gives the focal length back', () => {
    const line = horizonInPhoto(camera, view, horizonDipRad(4));
    const horizon = [line[0]!, line.at(-1)!] as const;
    const unknown = pinholeCamera(400, 300, 500);
    const fitted = focalFromLength(
      unknown,
      4,
      horizon,
      placeOf(view, 0.2, 5)!,
      placeOf(view, 0.4, 9)!,
      Math.hypot(0.2, 4),
    );
    expect(fitted.focalPx).toBeCloseTo(camera.focalPx, 6);
  });

  it('a length across the view cannot, and one that no lens gives is refused', () => {
    const line = horizonInPhoto(camera, view, horizonDipRad(4));
    const horizon = [line[0]!, line.at(-1)!] as const;
    expect(() => focalFromLength(camera, 4, horizon, placeOf(view, -1, 6)!, placeOf(view, 1, 6)!, 2)).toThrow(
      /runs across the view/,
    );
    expect(() =>
      focalFromLength(camera, 4, horizon, placeOf(view, 0, 5)!, placeOf(view, 0, 9)!, 4000),
    ).toThrow(/No focal length/);
    expect(() => scaleFromLength(view, [200, 0], [200, 200], 2)).toThrow(/below the horizon/);
    expect(() => scaleFromLength(view, [100, 250], [200, 250], 0)).toThrow(/more than 0/);
  });
});

describe('straight down', () => {
  it('pixel size times focal length is the height', () => {
    const down = straightDownFromPixelSize(camera, 0.02);
    expect(down.heightM).toBeCloseTo(0.02 * camera.focalPx, 12);
    expect(groundAreaAtM2(down, 200, 150)).toBeCloseTo(0.0004, 12);
    expect(groundDistanceM(down, [100, 100], [200, 100])).toBeCloseTo(2, 9);
  });

  it('every pixel covers the same water, the top of the photo lies ahead', () => {
    const down = straightDownView(camera, 30);
    const area = groundAreaField(down);
    expect(Math.max(...area) / Math.min(...area)).toBeCloseTo(1, 5);
    const [x, y] = groundAt(down, 200, 10)!;
    expect(x).toBeCloseTo(0, 9);
    expect(y).toBeGreaterThan(0);
  });

  it('a pixel size alone gives areas and says that angles are not known', () => {
    const fields = uniformFields(4, 3, 0.5);
    expect([...fields.areaM2]).toEqual(Array(12).fill(0.25));
    expect(fields.notices[0]!.code).toBe('view-vertical-assumed');
    expect(() => uniformFields(4, 3, 0)).toThrow(/size of a pixel/);
  });
});

describe('area cells', () => {
  it('the ratio of two views in a cell is that of its pixels', () => {
    const cells = areaCells(400, 300);
    const [before, after] = [newCellView(cells), newCellView(cells)];
    const tilted = waterView({ ...view, heightM: 4.2, pitchRad: -18.5 * DEGREE });
    lookFromCells(view, cells, before);
    lookFromCells(tilted, cells, after);
    const [areaBefore, areaAfter] = [groundAreaField(view), groundAreaField(tilted)];
    const incidence = incidenceField(view);
    let byPixel = 0;
    let byCell = 0;
    for (let y = 0; y < 300; y++) {
      for (let x = 0; x < 400; x++) {
        const at = y * 400 + x;
        if (incidence[at]! < 75 * DEGREE) {
          const cell = cells.rowOf[y]! * cells.columns + cells.columnOf[x]!;
          byPixel += areaAfter[at]!;
          byCell += (areaBefore[at]! * after.areaM2[cell]!) / before.areaM2[cell]!;
        }
      }
    }
    // Half a degree changes the whole by a tenth; cells must follow that to a few thousandths.
    expect(Math.abs(byCell / byPixel - 1)).toBeLessThan(0.003);
  });

  it('a cell’s middle is seen as that place of the photo is', () => {
    const cells = areaCells(400, 300, 5, 6);
    const out = newCellView(cells);
    const bent = waterView({ ...view, camera: pinholeCamera(400, 300, camera.focalPx, -0.06) });
    lookFromCells(bent, cells, out);
    const cell = 5 * 5 + 1;
    expect(out.areaM2[cell]! / groundAreaAtM2(bent, 120, 275)).toBeCloseTo(1, 12);
    expect(out.incidenceRad[cell]).toBeCloseTo(incidenceAtRad(bent, 120, 275), 12);
    expect(out.areaM2[0]).toBeNaN();
  });

  it('a photo smaller than the cells has one cell a pixel', () => {
    const cells = areaCells(3, 2);
    expect(cells.count).toBe(6);
    expect([...cells.columnOf]).toEqual([0, 1, 2]);
  });
});
