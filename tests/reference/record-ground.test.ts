/**
 * A thickness map laid out on the ground, read by GDAL: places by PROJ (gdallocationinfo -wgs84), area and volume from
 * GDAL's own dump of the pixels against the sums over the photo's pixels.
 */
import { afterAll, expect, test } from 'vitest';
import { encodeFloatTiff } from '../../src/record/floatTiff.ts';
import { gridFor, onGround, turnedMapping } from '../../src/record/worldGrid.ts';
import { groundPosition } from '../../src/view/footprint.ts';
import { focalPxFrom35mm, pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { groundAreaField, incidenceField } from '../../src/view/waterFields.ts';
import { groundAt, placeOf, waterView } from '../../src/view/waterView.ts';
import { scratch, tool } from '../record/tools.ts';

const files = scratch();
afterAll(files.remove);

const [width, height] = [480, 360];
const DEGREE = Math.PI / 180;
const CAMERA = { latitudeDeg: 47.251, longitudeDeg: -21.403 };
const HEADING_DEG = 214.5;
/** A patch of 450 nm, 1.5 m about a point 1 m to the right and 9 m ahead; bare water around it. */
const isPatch = (x: number, y: number) => Math.hypot(x - 1, y - 9) < 1.5;

function groundMap() {
  const camera = pinholeCamera(width, height, focalPxFrom35mm(28, width, height));
  const view = waterView({ camera, heightM: 6, pitchRad: -33 * DEGREE, rollRad: 2 * DEGREE });
  const incidence = incidenceField(view);
  const areaM2 = groundAreaField(view).map((area, i) => (incidence[i]! < 75 * DEGREE ? area : 0));
  const values = Float32Array.from(areaM2, (area, i) => {
    const place = groundAt(view, (i % width) + 0.5, Math.floor(i / width) + 0.5);
    return area > 0 && place ? (isPatch(place[0], place[1]) ? 450 : 0) : Number.NaN;
  });
  const mapping = turnedMapping(
    { groundOf: (x, y) => groundAt(view, x, y), placeOf: (x, y) => placeOf(view, x, y) },
    HEADING_DEG,
  );
  const grid = gridFor(areaM2, width, height, mapping)!;
  const cells = onGround(values, areaM2, width, height, mapping, grid);
  const tiff = encodeFloatTiff({
    width: grid.columns,
    height: grid.rows,
    values: cells,
    compression: 'deflate',
    geo: {
      system: { kind: 'aboutPoint', ...CAMERA },
      westM: grid.westM,
      northM: grid.northM,
      pixelM: grid.cellM,
    },
  });
  return { areaM2, values, path: files.write('thickness_geo.tif', tiff) };
}

const { areaM2, values, path } = groundMap();

/** What GDAL finds at a place to the right and ahead of the camera, metres. */
function valueAt(xM: number, yM: number): number {
  const { latitudeDeg, longitudeDeg } = groundPosition(CAMERA, HEADING_DEG, xM, yM);
  const said = tool('gdallocationinfo', [
    '-wgs84',
    '-valonly',
    path,
    String(longitudeDeg),
    String(latitudeDeg),
  ]);
  return Number(said.trim() || Number.NaN);
}

test('the patch lies where the camera saw it', () => {
  expect(valueAt(1, 9)).toBe(450);
  for (const [dx, dy] of [
    [1, 0],
    [-1, 0],
    [0, 1],
    [0, -1],
  ] as const) {
    // Cells are 2 to 5 cm; far pixels cover 10 cm of water.
    expect(valueAt(1 + 1.4 * dx, 9 + 1.4 * dy)).toBe(450);
    expect(valueAt(1 + 1.6 * dx, 9 + 1.6 * dy)).toBe(0);
  }
  // Behind the camera nothing was seen.
  expect(valueAt(0, -5)).toBeNaN();
});

test('area and volume in GDAL’s hands are those of the photo’s pixels', () => {
  const raw = files.path('ground.raw');
  tool('gdal_translate', ['-q', '-of', 'ENVI', path, raw]);
  const bytes = files.read('ground.raw');
  const cells = new Float32Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length));
  const { geoTransform } = JSON.parse(tool('gdalinfo', ['-json', path]));
  const cellM2 = geoTransform[1] ** 2;
  const sums = (list: Float32Array, areaOf: (i: number) => number) =>
    list.reduce<[number, number]>(
      ([area, volume], v, i) =>
        Number.isNaN(v) ? [area, volume] : [area + areaOf(i), volume + areaOf(i) * v],
      [0, 0],
    );
  const onGrid = sums(cells, () => cellM2);
  const inPhoto = sums(values, (i) => areaM2[i]!);
  expect(Math.abs(onGrid[0] / inPhoto[0] - 1)).toBeLessThan(0.005);
  expect(Math.abs(onGrid[1] / inPhoto[1] - 1)).toBeLessThan(0.005);
  // The patch itself: pi 1.5² m² of 450 nm.
  expect(Math.abs(onGrid[1] / (Math.PI * 1.5 ** 2 * 450) - 1)).toBeLessThan(0.01);
});
