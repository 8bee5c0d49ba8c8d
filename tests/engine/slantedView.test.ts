import { beforeAll, describe, expect, it } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { bandsOf, bandTask } from '../../src/engine/bands.ts';
import { calibrate } from '../../src/engine/calibrate.ts';
import { emptyField, estimate, joinBands, readBand, settle } from '../../src/engine/estimate.ts';
import { LEFT_OUT, leftOutOf } from '../../src/engine/leftOut.ts';
import { makeReader } from '../../src/engine/seenAngles.ts';
import type { Setup } from '../../src/engine/setup.ts';
import { activityMap } from '../../src/match/activity.ts';
import { fillCandidates } from '../../src/match/mapPixels.ts';
import { PIXEL_STATUS } from '../../src/match/types.ts';
import { filmStackFor } from '../../src/optics/filmPresets.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';
import {
  CONDITIONS,
  cameraOf,
  drawConditions,
  filmColours,
  filmTableOf,
  meter,
} from '../../src/scene/conditions.ts';
import { codesOfRaw } from '../../src/scene/develop.ts';
import { incidenceRad, lookAlong, type PinholeView, viewAxes } from '../../src/scene/perspective.ts';
import { seededRandom } from '../../src/scene/random.ts';

const WIDTH = 96;
const HEIGHT = 720;
const DEGREE = Math.PI / 180;
const VIEW: PinholeView = {
  widthPx: WIDTH,
  heightPx: HEIGHT,
  focalPx: 700,
  heightM: 3,
  pitchRad: -42 * DEGREE,
  rollRad: 0,
};

const REGION = { fromX: 24 } as const;

/**
 * A calm sheen over level water, seen from 20 degrees to beyond 75 by the renderer's own camera, without noise and in 16
 * bit: thickness changes evenly from row to row, so any step in the reading is the reader's. Bare along the left edge.
 */
function render(thicknessAt: (share: number) => number): {
  pixels: PhotoPixels;
  trueNm: Float32Array;
  setup: Setup;
} {
  const stack = filmStackFor('diesel');
  const random = seededRandom('slanted');
  const drawn = drawConditions(
    random,
    stack,
    45,
    { ...CONDITIONS.stated, errors: 'none', tone: 'none' },
    'slanted',
  );
  const camera = cameraOf(drawn, random);
  const table = filmTableOf(stack, drawn, camera, { maxNm: 1000, stepNm: 0.5, fromDeg: 15, toDeg: 84 });
  const brightest = filmColours(table, 75, 480);
  const { development } = meter(drawn, camera, brightest, brightest);
  const codes = new Uint16Array(3 * WIDTH * HEIGHT);
  const trueNm = new Float32Array(WIDTH * HEIGHT);
  const axes = viewAxes(VIEW);
  const ray = new Float64Array(3);
  const raw = new Float64Array(3);
  for (let y = 0; y < HEIGHT; y++) {
    for (let x = 0; x < WIDTH; x++) {
      lookAlong(VIEW, axes, x + 0.5, y + 0.5, ray);
      const nm = x < REGION.fromX ? 0 : thicknessAt((y + 0.5) / HEIGHT);
      trueNm[y * WIDTH + x] = nm;
      table.lookUp(nm, incidenceRad(ray), raw);
      codes.set(
        codesOfRaw(raw, development).map((code) => Math.round(code * 257)),
        3 * (y * WIDTH + x),
      );
    }
  }
  const pixels: PhotoPixels = {
    width: WIDTH,
    height: HEIGHT,
    codes,
    channels: 3,
    maxCode: 65535,
    encoding: SRGB,
  };
  return { pixels, trueNm, setup: setupFor(drawn.toldDaylightK) };
}

const setupFor = (daylightK: number): Setup => ({
  film: 'diesel',
  light: { daylightK },
  references: { clean: [2, 560, 18, 60] },
  region: [
    [0, 0],
    [WIDTH, 0],
    [WIDTH, HEIGHT],
    [0, HEIGHT],
  ],
  view: {
    heightM: 3,
    pitchDeg: -42,
    rollDeg: 0,
    focal35mm: (700 * Math.hypot(36, 24)) / Math.hypot(WIDTH, HEIGHT),
  },
});

/** Incidence of a row's middle by the renderer's geometry, degrees. */
function rowDeg(y: number): number {
  const ray = new Float64Array(3);
  lookAlong(VIEW, viewAxes(VIEW), WIDTH / 2, y + 0.5, ray);
  return incidenceRad(ray) / DEGREE;
}

describe('a photo with a view', () => {
  const { pixels, trueNm, setup } = render((share) => 60 + 420 * share);
  let result: ReturnType<typeof estimate>;
  beforeAll(() => {
    result = estimate(pixels, setup);
  }, 120_000);

  /** Mean error of a row's film, nm. */
  const rowError = (y: number) => {
    let sum = 0;
    for (let x = REGION.fromX + 8; x < WIDTH - 8; x++) {
      sum += result.map.thicknessNm[y * WIDTH + x]! - trueNm[y * WIDTH + x]!;
    }
    return sum / (WIDTH - REGION.fromX - 16);
  };

  it('reads a film whose thickness is known, from 20 to 70 degrees', () => {
    for (let y = 0; y < HEIGHT; y += 10) {
      const degrees = rowDeg(y);
      // Thin film near 70 degrees is told by brightness alone, and the fit leaves out what lies beyond 66.
      const allowedNm = degrees < 65 ? 4 : 6;
      if (degrees < 70)
        expect(Math.abs(rowError(y)), `row ${y}, ${degrees.toFixed(1)} degrees`).toBeLessThan(allowedNm);
    }
  });

  it('shows no seam: the error never changes by a nanometre from one row to the next', () => {
    const { incidenceRad: angles } = calibrate(pixels, setup, leftOutOf(pixels, setup), activityMap(pixels))
      .angles!.charts;
    expect(angles.length).toBeGreaterThan(10);
    for (let y = 4; y < HEIGHT - 4; y++) {
      if (rowDeg(y - 1) > 74) continue;
      expect(
        Math.abs(rowError(y + 1) - rowError(y)),
        `row ${y}, ${rowDeg(y).toFixed(1)} degrees`,
      ).toBeLessThan(1);
    }
  }, 60_000);

  it('leaves out what is seen beyond 75 degrees, and says so beside the warning from 60', () => {
    const marks = leftOutOf(pixels, setup);
    for (let y = 0; y < HEIGHT; y += 3) {
      const degrees = rowDeg(y);
      const mark = marks[y * WIDTH + WIDTH / 2]!;
      if (degrees > 75.1 && degrees < 90) expect(mark).toBe(LEFT_OUT.tooSlanted);
      if (degrees > 90.1) expect(mark).toBe(LEFT_OUT.aboveHorizon);
      if (degrees < 74.9) expect(mark).toBe(LEFT_OUT.no);
    }
    const codes = result.summary.notices.map(({ code }) => code);
    expect(codes).toContain('view-excluded');
    expect(codes).toContain('view-slanted');
    expect(result.map.status[WIDTH / 2]).toBe(PIXEL_STATUS.outside);
  });

  it('gives the same map in bands for workers', () => {
    const leftOut = leftOutOf(pixels, setup);
    const activity = activityMap(pixels);
    const calibration = calibrate(pixels, setup, leftOut, activity);
    const field = emptyField(pixels);
    fillCandidates(
      pixels,
      makeReader(pixels, activity, calibration),
      calibration.rules,
      leftOut,
      field,
      0,
      field.height,
    );
    const settled = settle(field, setup, calibration);
    const parts = bandsOf(HEIGHT, settled.spacing, 3).map((band) => {
      const rows = readBand(structuredClone(bandTask(pixels, calibration, leftOut, settled, band)));
      const from = band.lead * WIDTH;
      return {
        ...rows,
        thicknessNm: rows.thicknessNm.subarray(from),
        lowNm: rows.lowNm.subarray(from),
        highNm: rows.highNm.subarray(from),
        order: rows.order.subarray(from),
        status: rows.status.subarray(from),
      };
    });
    const joined = joinBands(WIDTH, HEIGHT, parts);
    let differ = 0;
    for (let i = 0; i < joined.thicknessNm.length; i++) {
      if (!Object.is(joined.thicknessNm[i], result.map.thicknessNm[i])) differ++;
    }
    // Pixels next to a cut have fewer neighbours to be smoothed with.
    expect(differ / joined.thicknessNm.length).toBeLessThan(0.02);
  }, 60_000);
});

describe('an angle of view that is not given', () => {
  it('opens the intervals of a photo without one, and says so', () => {
    const { pixels, setup } = render((share) => 60 + 400 * share);
    const { view: _, region: __, ...bare } = setup;
    const marks = leftOutOf(pixels, bare);
    const sharedShare = (given: Setup) => {
      const { charts } = calibrate(pixels, given, marks, activityMap(pixels));
      return charts[0]!.sharedSdNm[400]! / charts[0]!.thicknessNm[400]!;
    };
    const open = sharedShare(bare);
    // Over 0 to 60 degrees read as 35, diesel's root of n^2 - sin^2 i runs from 9 % above to 13 % below.
    expect(open).toBeGreaterThan(0.05);
    expect(open).toBeLessThan(0.1);
    expect(sharedShare({ ...bare, incidenceDeg: 35 })).toBeLessThan(0.03);
    const { notices } = calibrate(pixels, bare, marks, activityMap(pixels));
    expect(notices.map(({ code }) => code)).toContain('incidence-assumed');
  }, 120_000);
});

describe('wind over a slanted view', () => {
  it('fades the colours of thick film, and opens the intervals the more the stronger it blows', () => {
    const { pixels, setup } = render((share) => 60 + 300 * share);
    const marks = leftOutOf(pixels, setup);
    const activity = activityMap(pixels);
    const at = [undefined, 2, 10].map((windMS) => {
      // From 600 m a pixel covers a metre: oil stills the waves that are shorter than a foot.
      const view = { ...setup.view!, heightM: 600 };
      const given: Setup = {
        ...setup,
        view,
        camera: { fit: false },
        ...(windMS === undefined ? {} : { windMS }),
      };
      const { angles } = calibrate(pixels, given, marks, activity);
      const k = angles!.charts.incidenceRad.findIndex((angle) => angle > 55 * DEGREE);
      const chart = angles!.charts.charts[k]![0]!;
      // Swing of green over the orders from 700 to 1100 nm, labels being 2 nm apart.
      const green = Array.from({ length: 200 }, (_, j) => chart.codes[3 * (350 + j) + 1]!);
      return {
        swing: Math.max(...green) - Math.min(...green),
        share: chart.sharedSdNm[200]! / chart.thicknessNm[200]!,
      };
    });
    const [calm, light, strong] = at as [(typeof at)[0], (typeof at)[0], (typeof at)[0]];
    // A stronger wind raises longer waves too, so less of its slope lies inside a pixel: either fades, no order between.
    expect(strong.swing).toBeLessThan(calm.swing);
    expect(light.swing).toBeLessThan(calm.swing);
    expect(strong.share).toBeGreaterThan(light.share);
    expect(light.share).toBeGreaterThan(calm.share);
  }, 180_000);
});
