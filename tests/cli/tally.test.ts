/**
 * The real command on a rendered oblique photo, its files in the hands of others: GDAL and PROJ (gdalinfo, gdallocationinfo,
 * gdaltransform, ogrinfo, ogr2ogr) and Python's csv module. The truth is the renderer's own (`src/scene/perspective.ts`
 * and the area of water that it summed ray by ray), which shares no code with the reader's view.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import { type HarbourScene, harbourScene } from '../../src/scene/harbourScene.ts';
import { lookAlong, viewAxes, waterAreaM2 } from '../../src/scene/perspective.ts';
import { regionMask } from '../../src/scene/region.ts';
import { scratch, tool } from '../record/tools.ts';

const WIDTH = 360;
const HEIGHT = 480;
/** In the open Atlantic, where there is no land, so that nobody's harbour is meant. */
const CAMERA = { latitudeDeg: 47.251, longitudeDeg: -21.403 };
const HEADING_DEG = 214.5;
const files = scratch();
afterAll(files.remove);
let scene: HarbourScene;

interface Tally {
  readonly scale: string;
  readonly area: { readonly regionM2: number; readonly oiledM2: number } | null;
  readonly byThickness: { readonly volumeM3: Record<'least' | 'best' | 'most', number> } | null;
  readonly byCode: { readonly minM3: number; readonly maxM3: number } | null;
  readonly coverage: Record<'share' | 'least' | 'most', number>;
  readonly position: unknown;
  readonly headingDeg: number | null;
  readonly sun: { readonly elevationDeg: number } | null;
  readonly notices: readonly { readonly code: string }[];
  readonly ground: string;
}

/** Runs the command and gives its folder. */
function run(out: string, setup: unknown, ...more: string[]): string {
  const path = files.write(`${out}.json`, JSON.stringify(setup));
  const args = ['run', '--silent', 'estimate', '--', files.path('harbour.jpg'), '--setup', path];
  const done = spawnSync('npm', [...args, '--out', files.path(out), ...more], { encoding: 'utf8' });
  expect(done.stderr).toBe('');
  expect(done.status).toBe(0);
  return files.path(out);
}

/** Pixel values of a TIFF as GDAL reads them. */
function floatsOf(path: string): Float32Array {
  tool('gdal_translate', ['-q', '-of', 'ENVI', path, files.path('dump.raw')]);
  const bytes = files.read('dump.raw');
  return new Float32Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length));
}

const tallyIn = (folder: string): Tally => JSON.parse(readFileSync(`${folder}/tally.json`, 'utf8'));
const viewTold = () => {
  const { heightM, pitchRad, rollRad } = scene.view;
  const degrees = (rad: number) => (rad * 180) / Math.PI;
  return { heightM, pitchDeg: degrees(pitchRad), rollDeg: degrees(rollRad), focal35mm: 26 };
};

beforeAll(async () => {
  scene = harbourScene({
    width: WIDTH,
    height: HEIGHT,
    seed: 5,
    conditions: CONDITIONS.stated,
    skyUnevenness: 0,
    glint: false,
    subsamples: 2,
    rippleWaves: 24,
  });
  await sharp(scene.codes, { raw: { width: WIDTH, height: HEIGHT, channels: 3 } })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .withExif({
      IFD2: { DateTimeOriginal: '2025:05:14 10:32:07', OffsetTimeOriginal: '-01:00' },
      IFD3: {
        GPSVersionID: '2 3 0 0',
        GPSLatitudeRef: 'N',
        GPSLatitude: '47/1 15/1 36/10',
        GPSLongitudeRef: 'W',
        GPSLongitude: '21/1 24/1 108/10',
        GPSImgDirectionRef: 'T',
        GPSImgDirection: `${10 * HEADING_DEG}/10`,
      },
    })
    .toFile(files.path('harbour.jpg'));
}, 120_000);

describe('npm run estimate with a view', () => {
  let folder: string;
  let tally: Tally;
  beforeAll(() => {
    folder = run('whole', { ...scene.setup, view: viewTold() });
    tally = tallyIn(folder);
  }, 120_000);

  it('counts the region’s area as the renderer’s camera sees it', () => {
    const inside = regionMask(scene.setup.region!, WIDTH, HEIGHT);
    const axes = viewAxes(scene.view);
    const look = [0, 0, 0];
    let regionM2 = 0;
    inside.forEach((value, i) => {
      if (value === 0) return;
      lookAlong(scene.view, axes, (i % WIDTH) + 0.5, Math.floor(i / WIDTH) + 0.5, look);
      regionM2 += waterAreaM2(scene.view, look);
    });
    expect(tally.scale).toBe('metres');
    expect(Math.abs(tally.area!.regionM2 / regionM2 - 1)).toBeLessThan(0.002);
    // Posts stand before some of the water: the rays that met water can only be fewer.
    expect(scene.water.regionM2 / tally.area!.regionM2).toBeGreaterThan(0.95);
    expect(scene.water.regionM2 / tally.area!.regionM2).toBeLessThan(1.002);
  });

  it('GDAL reads the ground map in metres, and its area and volume are those of the tally', () => {
    const path = `${folder}/thickness_geo.tif`;
    const info = JSON.parse(tool('gdalinfo', ['-json', path]));
    const cellM2 = info.geoTransform[1] ** 2;
    expect(info.coordinateSystem.wkt).toContain('LENGTHUNIT["metre",1]');
    const cells = floatsOf(path);
    let oiledM2 = 0;
    let volumeM3 = 0;
    let innerM2 = 0;
    const columns = info.size[0];
    for (const [i, nm] of cells.entries()) {
      if (!(nm > 0)) continue;
      if ([-1, 1, -columns, columns].every((step) => (cells[i + step] ?? 0) > 0)) innerM2 += cellM2;
      oiledM2 += cellM2;
      volumeM3 += 1e-9 * nm * cellM2;
    }
    // A cell that an edge of the film crosses is the mean of film and bare water: with all of those the area is too
    // large, and without any that touch what is not film it is too small.
    expect(oiledM2).toBeGreaterThan(tally.area!.oiledM2);
    expect(innerM2).toBeLessThan(tally.area!.oiledM2);
    expect(innerM2).toBeGreaterThan(0.4 * oiledM2);
    expect(Math.abs(volumeM3 / tally.byThickness!.volumeM3.best - 1)).toBeLessThan(0.03);
  });

  it('PROJ finds each thickness where the renderer’s camera saw it', () => {
    const inPhoto = floatsOf(`${folder}/thickness_nm.tif`);
    const axes = viewAxes(scene.view);
    const look = [0, 0, 0];
    const turn = (HEADING_DEG * Math.PI) / 180;
    const expected: number[] = [];
    const places: string[] = [];
    for (let y = 150; y < HEIGHT - 2; y += 7) {
      for (let x = 30; x < WIDTH - 2; x += 7) {
        // A cell of the ground map is the mean of its pixels, so take places where neighbours agree.
        const around = [0, -1, 1, -WIDTH, WIDTH].map((step) => inPhoto[y * WIDTH + x + step]!);
        const [least, most] = [Math.min(...around), Math.max(...around)];
        if (!(least > 20 && most < 1.04 * least)) continue;
        lookAlong(scene.view, axes, x + 0.5, y + 0.5, look);
        const reach = scene.view.heightM / -look[2]!;
        const [right, ahead] = [look[0]! * reach, look[1]! * reach];
        const east = right * Math.cos(turn) + ahead * Math.sin(turn);
        const north = ahead * Math.cos(turn) - right * Math.sin(turn);
        expected.push(inPhoto[y * WIDTH + x]!);
        places.push(`${east} ${north}`);
      }
    }
    // Azimuthal equidistant about the camera: metres on the ellipsoid, by PROJ.
    const about = `+proj=aeqd +lat_0=${CAMERA.latitudeDeg} +lon_0=${CAMERA.longitudeDeg} +datum=WGS84`;
    const input = `${places.join('\n')}\n`;
    const onGlobe = tool('gdaltransform', ['-s_srs', about, '-t_srs', 'EPSG:4326', '-output_xy'], { input });
    const read = tool('gdallocationinfo', ['-wgs84', '-valonly', `${folder}/thickness_geo.tif`], {
      input: onGlobe,
    });
    const onGround = read.trimEnd().split('\n').map(Number);
    expect(onGround).toHaveLength(expected.length);
    expect(expected.length).toBeGreaterThan(40);
    for (let i = 0; i < expected.length; i++) {
      expect(Math.abs(onGround[i]! / expected[i]! - 1)).toBeLessThan(0.04);
    }
  });

  it('the outline is valid, lies within metres of the camera and has the oiled area', () => {
    const path = `${folder}/observation.geojson`;
    const flat = files.path('flat.gpkg');
    const about = `+proj=laea +lat_0=${CAMERA.latitudeDeg} +lon_0=${CAMERA.longitudeDeg} +datum=WGS84 +units=m`;
    tool('ogr2ogr', ['-f', 'GPKG', '-nln', 'flat', '-t_srs', about, flat, path]);
    const said = tool('ogrinfo', [
      '-q',
      '-dialect',
      'sqlite',
      '-sql',
      `select ST_IsValid(geom) as valid, ST_IsValidReason(geom) as reason, ST_Area(geom) as area, ST_MinX(geom) as west, ST_MaxX(geom) as east,
       ST_MinY(geom) as south, ST_MaxY(geom) as north, areaM2 from flat where kind = 'slickOutline'`,
      flat,
    ]);
    const number = (name: string) => Number(new RegExp(`\\b${name} \\(\\w+\\) = (\\S+)`).exec(said)?.[1]);
    expect(number('valid'), said).toBe(1);
    expect(number('areaM2')).toBeCloseTo(tally.area!.oiledM2, 3);
    // The outline is drawn without speckle: holes and specks of a few pixels are smoothed away.
    expect(Math.abs(number('area') / tally.area!.oiledM2 - 1)).toBeLessThan(0.1);
    for (const edge of ['west', 'east', 'south', 'north']) {
      expect(Math.abs(number(edge))).toBeLessThan(4 * scene.view.heightM);
    }
    // It looks south-west.
    expect(number('south')).toBeLessThan(-1);
  });

  it('Python reads the table, and its figures are those of the JSON', () => {
    const rows: string[][] = JSON.parse(
      tool('python3', [
        '-c',
        'import csv, json, sys; print(json.dumps(list(csv.reader(open(sys.argv[1], newline="", encoding="utf-8"), strict=True))))',
        `${folder}/tally.csv`,
      ]),
    );
    expect(new Set(rows.map((row) => row.length))).toEqual(new Set([7]));
    const row = (quantity: string, unit: string) => rows.find((r) => r[1] === quantity && r[5] === unit)!;
    const volume = row('by_thickness', 'm3').slice(2, 5).map(Number);
    const { least, best, most } = tally.byThickness!.volumeM3;
    expect(volume).toEqual([best, least, most]);
    expect(row('by_appearance_code', 'm3').slice(3, 5).map(Number)).toEqual([
      tally.byCode!.minM3,
      tally.byCode!.maxM3,
    ]);
    const film = rows.filter((r) => r[0] === 'histogram').reduce((sum, r) => sum + Number(r[2]), 0);
    expect(film / tally.area!.oiledM2).toBeCloseTo(1, 6);
  });

  it('knows the sun of that moment and place', () => {
    // 11:32:07 UTC at 21.4 degrees west: with an equation of time of 3.7 minutes and a declination of 18.6 degrees (Nautical
    // Almanac, 14 May, to the digits given) the hour angle is -27.5 degrees and the sun 53.6 degrees up.
    expect(Math.abs((tally.sun?.elevationDeg ?? Number.NaN) - 53.6)).toBeLessThan(0.3);
  });
});

describe('npm run estimate without a place, and without a view', () => {
  it('--no-position leaves the place out of every file', () => {
    const setup = {
      ...scene.setup,
      view: viewTold(),
      position: { latitudeDeg: 47.2512345, longitudeDeg: -21.4031234 },
    };
    const folder = run('nowhere', setup, '--no-position');
    for (const name of ['summary.json', 'tally.json', 'tally.csv', 'observation.geojson']) {
      const text = readFileSync(`${folder}/${name}`, 'utf8');
      expect(text, name).not.toMatch(/47\.25|21\.40|latitude"?:\s*-?\d|elevationDeg/);
    }
    const tally = tallyIn(folder);
    expect(tally.position).toBeNull();
    expect(tally.sun).toBeNull();
    const info = tool('gdalinfo', [`${folder}/thickness_geo.tif`]);
    expect(info).toContain('Local ground grid, metres');
    expect(info).not.toMatch(/\d+d\s*\d+'/);
    const shapes = JSON.parse(readFileSync(`${folder}/observation.geojson`, 'utf8'));
    for (const feature of shapes.features) expect(feature.geometry).toBeNull();
    expect(tool('ogrinfo', ['-al', '-q', `${folder}/observation.geojson`])).toContain('areaM2');
  }, 60_000);

  it('without a view there are shares and no metres, and no stale files of an earlier run', () => {
    mkdirSync(files.path('again'));
    writeFileSync(`${files.path('again')}/observation.geojson`, '{}');
    const { view: _, ...withoutView } = scene.setup;
    const folder = run('again', { ...withoutView, incidenceDeg: 45 });
    const tally = tallyIn(folder);
    expect(tally.scale).toBe('pixels');
    expect(tally.area).toBeNull();
    expect(tally.byThickness).toBeNull();
    expect(tally.coverage.most).toBeGreaterThan(tally.coverage.least);
    expect(tally.notices.map(({ code }) => code)).toContain('no-scale');
    expect(existsSync(`${folder}/observation.geojson`)).toBe(false);
    expect(existsSync(`${folder}/thickness_geo.tif`)).toBe(false);
    expect(readFileSync(`${folder}/tally.csv`, 'utf8')).not.toMatch(/,m2,|,m3,/);
  }, 60_000);
});
