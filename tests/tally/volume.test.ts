import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/scene/random.ts';
import { type AppearanceShares, volumeByCode } from '../../src/tally/appearanceCode.ts';
import { cellSums } from '../../src/tally/cellSums.ts';
import { commonDraw, indexDraw } from '../../src/tally/commonDraw.ts';
import { compareMethods } from '../../src/tally/compareMethods.ts';
import { volumeByThickness, volumeFromSums } from '../../src/tally/volumeByThickness.ts';
import { areaCells } from '../../src/view/areaCells.ts';
import { horizonDipRad, horizonInPhoto } from '../../src/view/horizon.ts';
import { focalPxFrom35mm, pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { posesFromHorizon, posesFromTilt } from '../../src/view/poseDraws.ts';
import { groundAreaAtM2, groundAreaField, incidenceField } from '../../src/view/waterFields.ts';
import { incidenceAtRad, waterView } from '../../src/view/waterView.ts';
import { ambiguous, atLeast, bare, evenArea, film, glint, madeMap } from './fields.ts';

const exact = { thicknessShare: 0, thicknessShiftNm: 0, correlatedPixels: 0 };
const sure = indexDraw({ index: 1.47, indexSd: 0 });
const cells = areaCells(40, 30);

describe('volume by thickness', () => {
  it('is the sum of thickness times area when nothing is in doubt', () => {
    const map = madeMap(40, 30, (x) => (x < 10 ? film(200) : x < 20 ? film(500) : bare));
    const result = volumeByThickness(
      { map, areaM2: evenArea(1200, 0.5) },
      cells,
      sure,
      seededRandom(1),
      exact,
    );
    const m3 = 1e-9 * 0.5 * 300 * 700;
    for (const value of Object.values(result.volumeM3)) {
      expect(value / m3).toBeCloseTo(1, 9);
    }
    expect(result.oiledM2).toEqual({ least: 300, best: 300, most: 300 });
    expect(result.meanThicknessNm).toBeCloseTo(350, 6);
    expect(result.atLeast).toBe(false);
  });

  it('an index off by 1 % moves the whole volume by 1 %, not by 1 % over the root of the pixels', () => {
    const map = madeMap(40, 30, () => film(300));
    const draw = indexDraw({ index: 1.47, indexSd: 0.0147 });
    const { least, best, most } = volumeByThickness(
      { map, areaM2: evenArea(1200, 1) },
      cells,
      draw,
      seededRandom(2),
      { ...exact, trials: 20_000 },
    ).volumeM3;
    expect((most - least) / best).toBeCloseTo(2 * 1.645 * 0.01, 3);
  });

  it('a pixel’s own noise shrinks with the number of independent patches', () => {
    const map = madeMap(40, 30, () => film(300, 16.45));
    const width = (correlatedPixels: number) => {
      const { least, best, most } = volumeByThickness(
        { map, areaM2: evenArea(1200, 1) },
        cells,
        sure,
        seededRandom(3),
        {
          ...exact,
          correlatedPixels,
          trials: 20_000,
        },
      ).volumeM3;
      return (most - least) / best;
    };
    // One standard deviation of 10 nm in 300 over 1200 / 64 patches.
    expect(width(64) / (2 * 1.645 * (10 / 300) * Math.sqrt(64 / 1200))).toBeCloseTo(1, 1);
    expect(width(64) / width(1)).toBeCloseTo(8, 0);
  });

  it('water without an answer enters from nothing to as oily as what is read around it; the best value is the middle', () => {
    const map = madeMap(40, 30, (x) => (x < 20 ? film(200) : x < 30 ? bare : glint));
    const one = areaCells(40, 30, 1, 1);
    const result = volumeByThickness({ map, areaM2: evenArea(1200, 1) }, one, sure, seededRandom(9), {
      ...exact,
      trials: 20_000,
    });
    // 600 m2 of film and 300 m2 without an answer, of which two thirds would be oiled: 600 to 800, evenly.
    expect(result.oiledM2.best).toBeCloseTo(700, 9);
    expect(result.oiledM2.least).toBeCloseTo(610, -0.5);
    expect(result.oiledM2.most).toBeCloseTo(790, -0.5);
    expect(result.volumeM3.most / result.volumeM3.best).toBeCloseTo(790 / 700, 2);
    const none = volumeByThickness({ map, areaM2: evenArea(1200, 1) }, one, sure, seededRandom(9), {
      ...exact,
      unreadMost: 0,
    });
    expect(none.oiledM2.most).toBe(600);
    expect(none.oiledM2.best).toBe(600);
  });

  it('film past the resolvable range enters with its lower bound and makes the total "at least"', () => {
    const map = madeMap(40, 30, (x) => (x < 20 ? film(200) : atLeast(1300)));
    const result = volumeByThickness({ map, areaM2: evenArea(1200, 1) }, cells, sure, seededRandom(4), exact);
    expect(result.atLeast).toBe(true);
    expect(result.atLeastM3).toBeCloseTo(1e-9 * 600 * 1300, 12);
    expect(result.atLeastShare).toBe(0.5);
    expect(result.volumeM3.best).toBeCloseTo(1e-9 * 600 * 1500, 12);
  });

  it('alternatives of ambiguous pixels widen the interval towards the other order only', () => {
    const map = madeMap(40, 30, () => ambiguous(250));
    const share = new Float32Array(1200).fill(0.3);
    const thicknessNm = new Float32Array(1200).fill(430);
    const region = { map, areaM2: evenArea(1200, 1) };
    const alone = volumeByThickness(region, cells, sure, seededRandom(5), exact);
    const { volumeM3, ambiguousShare } = volumeByThickness(region, cells, sure, seededRandom(5), exact, {
      thicknessNm,
      share,
    });
    expect(ambiguousShare).toBe(1);
    expect(volumeM3.least).toBeGreaterThanOrEqual(alone.volumeM3.least);
    expect(volumeM3.most).toBeGreaterThan(1.1 * alone.volumeM3.most);
  });

  it('no oil is no volume, with nothing to divide by', () => {
    const result = volumeByThickness(
      { map: madeMap(40, 30, () => bare), areaM2: evenArea(1200, 1) },
      cells,
      sure,
      seededRandom(6),
    );
    expect(result.volumeM3).toEqual({ least: 0, best: 0, most: 0 });
    expect(result.meanThicknessNm).toBeNaN();
    expect(result.atLeastShare).toBe(0);
  });

  it('refuses cells of another photo', () => {
    const map = madeMap(40, 30, () => bare);
    expect(() => cellSums({ map, areaM2: evenArea(1200, 1) }, areaCells(20, 30))).toThrow(/another size/);
  });
});

describe('errors of the view', () => {
  const camera = pinholeCamera(400, 300, focalPxFrom35mm(26, 400, 300));
  const view = waterView({ camera, heightM: 4, pitchRad: -0.45, rollRad: 0.01 });
  const map = madeMap(400, 300, () => film(300));
  const incidence = incidenceField(view);
  const areaM2 = groundAreaField(view).map((area, i) => (incidence[i]! < 1.3 ? area : Number.NaN));
  const sums = cellSums({ map, areaM2 }, areaCells(400, 300));
  const steadyFilm = { index: 1.47, indexSd: 0 };

  it('film seen at more than 60 degrees may be thicker than read, steeper film is not', () => {
    const [area, thickness] = [new Float64Array(sums.cells.count), new Float64Array(sums.cells.count)];
    const half = { next: () => 0.5, normal: () => 0 };
    commonDraw(view, sums.cells, () => view, steadyFilm, 0.4)(half, area, thickness);
    let slanted = 0;
    for (let cell = 0; cell < sums.cells.count; cell++) {
      const x = (((cell % sums.cells.columns) + 0.5) * 400) / sums.cells.columns;
      const y = ((Math.floor(cell / sums.cells.columns) + 0.5) * 300) / sums.cells.rows;
      const isSlanted = incidenceAtRad(view, x, y) > Math.PI / 3;
      slanted += isSlanted ? 1 : 0;
      expect(thickness[cell]).toBeCloseTo(isSlanted ? 1.2 : 1, 12);
    }
    expect(slanted).toBeGreaterThan(0);
    expect(slanted).toBeLessThan(sums.cells.count);
  });

  it('a colour keeps its phase: seen flatter than thought, the film is thicker; of higher index, thinner', () => {
    const flatter = waterView({ ...view, pitchRad: view.pitchRad + 0.02 });
    const [area, thickness] = [new Float64Array(sums.cells.count), new Float64Array(sums.cells.count)];
    const still = { next: () => 0.5, normal: () => 1 };
    commonDraw(view, sums.cells, () => flatter, steadyFilm)(still, area, thickness);
    const cell = 40 * sums.cells.columns + 3;
    const [x, y] = [(3.5 * 400) / sums.cells.columns, (40.5 * 300) / sums.cells.rows];
    const phase = (v: typeof view) => Math.sqrt(1.47 ** 2 - Math.sin(incidenceAtRad(v, x, y)) ** 2);
    expect(thickness[cell]! * phase(flatter)).toBeCloseTo(phase(view), 12);
    expect(thickness[cell]).toBeGreaterThan(1);
    expect(area[cell]).toBeCloseTo(groundAreaAtM2(flatter, x, y) / groundAreaAtM2(view, x, y), 12);
    expect(area[cell]).toBeGreaterThan(1);
    indexDraw({ index: 1.47, indexSd: 0.0147 })(still, area, thickness);
    expect(thickness[0]).toBeCloseTo(1 / 1.01, 12);
    expect(area[0]).toBe(1);
  });

  it('a height off by 5 % alone moves areas by 10 %', () => {
    const poses = posesFromTilt(view, { heightShare: 0.05, focalShare: 0, pitchRad: 0, rollRad: 0 });
    const draw = commonDraw(view, sums.cells, poses, steadyFilm);
    const { oiledM2 } = volumeFromSums(sums, draw, seededRandom(7), { ...exact, trials: 20_000 });
    expect(Math.log(oiledM2.most / oiledM2.least) / (2 * 1.645)).toBeCloseTo(0.1, 2);
  });

  it('the interval covers the truth as often as it says: view and index drawn at random', () => {
    const sd = { heightShare: 0.05, focalShare: 0.02, pitchRad: 0.5 * (Math.PI / 180), rollRad: 0.005 };
    const draw = commonDraw(view, sums.cells, posesFromTilt(view, sd), { index: 1.47, indexSd: 0.015 });
    const found = volumeFromSums(sums, draw, seededRandom('tally'), exact);
    // Truth: the same photo under another view and index; every pixel's area and phase worked out anew.
    const truths = seededRandom('truth');
    const poses = posesFromTilt(view, sd);
    let held = 0;
    let heldArea = 0;
    const photos = 300;
    for (let photo = 0; photo < photos; photo++) {
      const other = poses(truths);
      const index = 1.47 + 0.015 * truths.normal();
      const otherArea = groundAreaField(other);
      const otherIncidence = incidenceField(other);
      let m2 = 0;
      let m3 = 0;
      for (let i = 0; i < areaM2.length; i += 7) {
        if (areaM2[i]! > 0) {
          m2 += 7 * otherArea[i]!;
          const phase = 300 * Math.sqrt(1.47 ** 2 - Math.sin(incidence[i]!) ** 2);
          m3 += (7e-9 * otherArea[i]! * phase) / Math.sqrt(index ** 2 - Math.sin(otherIncidence[i]!) ** 2);
        }
      }
      held += m3 >= found.volumeM3.least && m3 <= found.volumeM3.most ? 1 : 0;
      heldArea += m2 >= found.oiledM2.least && m2 <= found.oiledM2.most ? 1 : 0;
    }
    // 300 binomial trials at 0.9: three standard deviations are 0.052.
    expect(Math.abs(held / photos - 0.9)).toBeLessThan(0.052);
    expect(Math.abs(heldArea / photos - 0.9)).toBeLessThan(0.052);
  });

  it('with the horizon marked, a doubtful focal length costs less than with a typed tilt', () => {
    const far = waterView({ camera, heightM: 4, pitchRad: -0.25, rollRad: 0 });
    const line = horizonInPhoto(camera, far, horizonDipRad(4));
    const areas = groundAreaField(far).map((area, i) =>
      incidenceField.length && i > 60_000 ? area : Number.NaN,
    );
    const farSums = cellSums({ map, areaM2: areas }, areaCells(400, 300));
    const width = (draw: ReturnType<typeof commonDraw>) => {
      const { oiledM2 } = volumeFromSums(farSums, draw, seededRandom(8), exact);
      return Math.log(oiledM2.most / oiledM2.least);
    };
    const sd = { heightShare: 0, focalShare: 0.05 };
    const marked = posesFromHorizon(far, [line[0]!, line.at(-1)!], { ...sd, tapPx: 0 });
    const typed = posesFromTilt(far, { ...sd, pitchRad: 0, rollRad: 0 });
    expect(width(commonDraw(far, farSums.cells, marked, steadyFilm))).toBeLessThan(
      width(commonDraw(far, farSums.cells, typed, steadyFilm)),
    );
  });
});

describe('both methods side by side', () => {
  const rainbow: AppearanceShares = [0, 1, 0, 0, 0];
  const map = madeMap(40, 30, () => film(400));
  const byThickness = volumeByThickness({ map, areaM2: evenArea(1200, 1) }, cells, sure, seededRandom(9));
  const codes = (byCode: ReturnType<typeof volumeByCode>, facts = {}) =>
    compareMethods(byThickness, byCode, facts).reasons.map(({ code }) => code);

  it('thickness narrows down what the class leaves open', () => {
    const comparison = compareMethods(byThickness, volumeByCode(1200, rainbow));
    expect(comparison.overlap).toBe(true);
    expect(comparison.codeFactor).toBeCloseTo(5 / 0.3, 9);
    expect(comparison.thicknessFactor).toBeLessThan(1.2);
    expect(comparison.reasons.map(({ code }) => code)).toEqual(['compare-wide-classes']);
    expect(comparison.reasons[0]!.text).toMatch(/thin end/);
  });

  it('names true oil colour, areas that differ, film too thin for the code, and shares that do not follow', () => {
    expect(codes(volumeByCode(1200, [0, 0.5, 0, 0.3, 0.2]))).toContain('compare-true-colour');
    expect(codes(volumeByCode(2400, rainbow))).toContain('compare-area');
    expect(codes(volumeByCode(1200, rainbow), { belowM2: 3 })).toContain('compare-below-visible');
    expect(codes(volumeByCode(1200, [0, 0, 1, 0, 0]))).toEqual(['compare-shares']);
    const open = volumeByThickness(
      { map: madeMap(40, 30, () => atLeast(1300)), areaM2: evenArea(1200, 1) },
      cells,
      sure,
      seededRandom(9),
    );
    expect(compareMethods(open, volumeByCode(1200, rainbow)).reasons[0]!.code).toBe('compare-at-least');
  });
});
