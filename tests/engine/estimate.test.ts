import { readFileSync } from 'node:fs';
import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { bandsOf, bandTask } from '../../src/engine/bands.ts';
import { calibrate } from '../../src/engine/calibrate.ts';
import { emptyField, estimate, joinBands, readBand, settle } from '../../src/engine/estimate.ts';
import { leftOutOf } from '../../src/engine/leftOut.ts';
import { parseSetup } from '../../src/engine/parseSetup.ts';
import { prepareScene } from '../../src/engine/prepareScene.ts';
import { FILM_PRESETS } from '../../src/engine/setup.ts';
import { activityMap } from '../../src/match/activity.ts';
import { fillCandidates } from '../../src/match/mapPixels.ts';
import { makePixelReader } from '../../src/match/pixelReader.ts';
import { PIXEL_STATUS } from '../../src/match/types.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';
import { SCENES, type SceneName } from '../../src/scene/catalogue.ts';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import type { Scene } from '../../src/scene/types.ts';

async function photoOf(name: SceneName, seed: number): Promise<{ scene: Scene; pixels: PhotoPixels }> {
  const scene = SCENES[name]({ width: 400, height: 300, seed, conditions: CONDITIONS.stated });
  const jpeg = await sharp(Buffer.from(scene.codes), { raw: { width: 400, height: 300, channels: 3 } })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .toBuffer();
  const codes = new Uint8Array(await sharp(jpeg).raw().toBuffer());
  return { scene, pixels: { width: 400, height: 300, codes, channels: 3, maxCode: 255, encoding: SRGB } };
}

/** Sorted absolute errors of film pixels, and the share of them whose interval holds the truth. */
function compare(scene: Scene, { map }: ReturnType<typeof estimate>) {
  const errors: number[] = [];
  let held = 0;
  for (let i = 0; i < map.status.length; i++) {
    const truth = scene.thicknessNm[i]!;
    if (scene.kind[i] !== 1 || map.status[i] === PIXEL_STATUS.outside) continue;
    errors.push(
      Number.isNaN(map.thicknessNm[i]!) ? Number.POSITIVE_INFINITY : Math.abs(map.thicknessNm[i]! - truth),
    );
    if (map.lowNm[i]! <= truth && map.highNm[i]! >= truth) held++;
  }
  errors.sort((a, b) => a - b);
  return {
    median: errors[errors.length >> 1]!,
    p90: errors[Math.floor(0.9 * errors.length)]!,
    held: held / errors.length,
  };
}

let soap: Awaited<ReturnType<typeof photoOf>>;
let sheen: Awaited<ReturnType<typeof photoOf>>;

beforeAll(async () => {
  soap = await photoOf('soap-draining', 1);
  sheen = await photoOf('oil-sheen', 2);
});

describe('the whole job on photos of known truth', () => {
  it('reads a soap film through an unknown camera: median under 1.5 nm, 90th percentile under 6 nm', () => {
    const found = compare(soap.scene, estimate(soap.pixels, soap.scene.setup));
    expect(found.median).toBeLessThan(1.5);
    expect(found.p90).toBeLessThan(6);
    expect(found.held).toBeGreaterThan(0.8);
  });

  it('reads oil on water: median under 3 nm, 90th percentile under 8 nm', () => {
    const found = compare(sheen.scene, estimate(sheen.pixels, sheen.scene.setup));
    expect(found.median).toBeLessThan(3);
    expect(found.p90).toBeLessThan(8);
    expect(found.held).toBeGreaterThan(0.8);
  });

  it('does worse with a typical camera than with the fitted one, and says that it did not fit', () => {
    const fitted = compare(soap.scene, estimate(soap.pixels, soap.scene.setup));
    const result = estimate(soap.pixels, { ...soap.scene.setup, camera: { fit: false } });
    expect(compare(soap.scene, result).median).toBeGreaterThan(fitted.median);
    expect(result.summary.fit?.determined).toBe('no');
  });

  it('labels oil without a reference uncalibrated, a soap film not', () => {
    const { references: _, ...bare } = sheen.scene.setup;
    const summary = estimate(sheen.pixels, bare).summary;
    expect(summary.calibrated).toBe(false);
    expect(summary.notices.map((notice) => notice.code)).toContain('uncalibrated');
    const { references: _r, ...alone } = soap.scene.setup;
    expect(estimate(soap.pixels, alone).summary.calibrated).toBe(true);
  });

  it('leaves out what lies outside the region', () => {
    const region = [
      [50, 50],
      [150, 50],
      [150, 150],
      [50, 150],
    ] as const;
    const { map, summary } = estimate(soap.pixels, { ...soap.scene.setup, region });
    expect(summary.counts.inRegion).toBe(100 * 100);
    expect(map.status[0]).toBe(PIXEL_STATUS.outside);
    expect(map.thicknessNm[0]).toBeNaN();
  });

  it('gives the same map twice', () => {
    const first = estimate(sheen.pixels, sheen.scene.setup).map;
    const second = estimate(sheen.pixels, sheen.scene.setup).map;
    expect(second.thicknessNm).toEqual(first.thicknessNm);
    expect(second.status).toEqual(first.status);
  });
});

describe('bands for workers', () => {
  it('read in bands, the map is the same but for smoothing at the seams', () => {
    const { pixels, scene } = sheen;
    const leftOut = leftOutOf(pixels, scene.setup);
    const activity = activityMap(pixels);
    const calibration = calibrate(pixels, scene.setup, leftOut, activity);
    const field = emptyField(pixels);
    fillCandidates(
      pixels,
      makePixelReader(pixels, activity, calibration.charts),
      calibration.rules,
      leftOut,
      field,
      0,
      field.height,
    );
    const settled = settle(field, scene.setup, calibration);
    const whole = estimate(pixels, scene.setup).map;
    const bands = bandsOf(pixels.height, settled.spacing, 3);
    expect(bands.at(-1)?.toRow).toBe(pixels.height);
    const parts = bands.map((band) => {
      const rows = readBand(bandTask(pixels, calibration, leftOut, settled, band));
      const cut = band.lead * pixels.width;
      return {
        ...rows,
        thicknessNm: rows.thicknessNm.subarray(cut),
        lowNm: rows.lowNm.subarray(cut),
        highNm: rows.highNm.subarray(cut),
        order: rows.order.subarray(cut),
        status: rows.status.subarray(cut),
      };
    });
    const joined = joinBands(pixels.width, pixels.height, parts);
    let differing = 0;
    for (let i = 0; i < joined.status.length; i++) {
      const gap = Math.abs(joined.thicknessNm[i]! - whole.thicknessNm[i]!);
      if (joined.status[i] !== whole.status[i] || gap > 0.01) differing++;
    }
    // Three rows at each of two seams at the most.
    expect(differing).toBeLessThan(2 * 4 * pixels.width);
  });
});

describe('set-ups', () => {
  it('takes every film that the schema names, and the schema names every film', () => {
    const schema = JSON.parse(readFileSync('src/engine/setup.schema.json', 'utf8')) as {
      properties: Record<string, { anyOf?: { enum?: string[] }[] }>;
    };
    expect(schema.properties.film?.anyOf?.[0]?.enum).toEqual([...FILM_PRESETS]);
    for (const film of FILM_PRESETS) expect(() => prepareScene(parseSetup({ film }))).not.toThrow();
  });

  it('takes every key that the schema documents', () => {
    const full = {
      film: {
        ambient: 'air',
        layers: [
          { material: { nD: 1.4, abbe: 50, k: 0, spread: 0.01 } },
          { material: 'crownGlass', thicknessNm: 100 },
        ],
        substrate: { cauchyA: 1.5, cauchyB: 0.004 },
      },
      water: { temperatureC: 10, salinity: 35 },
      light: { illuminant: 'LED-B3' },
      camera: { fit: true },
      references: {
        clean: [0, 0, 10, 10],
        white: [20, 0, 10, 10],
        whiteReflectance: 0.18,
        dark: [40, 0, 10, 10],
      },
      incidenceDeg: 35,
      maxThicknessNm: 1200,
      region: [
        [0, 0],
        [10, 0],
        [10, 10],
      ],
      pins: [
        { at: [5, 5], is: 'bare' },
        { at: [6, 6], order: 2 },
      ],
      trend: 'thickerDown',
      strokes: [{ paint: 'out', points: [[3, 4]], widthPx: 12 }],
      view: {
        heightM: 3,
        focal35mm: 26,
        horizon: [
          [0, 5],
          [100, 6],
        ],
      },
      windMS: 3,
      position: { latitudeDeg: 47, longitudeDeg: -21 },
      headingDeg: 200,
    };
    const schema = JSON.parse(readFileSync('src/engine/setup.schema.json', 'utf8')) as { properties: object };
    expect(Object.keys(full).sort()).toEqual(Object.keys(schema.properties).sort());
    expect(parseSetup(full)).toEqual(full);
    const { scene } = prepareScene(parseSetup(full));
    expect(scene.stack.below).toHaveLength(1);
    expect(scene.incidenceRad).toBeCloseTo((35 * Math.PI) / 180, 12);
  });
});
