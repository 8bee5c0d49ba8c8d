/**
 * Our TIFF files read by libtiff (tiffinfo, tiffdump, tiffcp) and GDAL, neither of which is ours.
 * GeoTIFF: OGC 19-008r4, keys 1024 to 3092. Places: PROJ through gdalinfo.
 */
import { afterAll, expect, test } from 'vitest';
import { encodeByteTiff, encodeFloatTiff } from '../../src/record/floatTiff.ts';
import { offsetPosition } from '../../src/view/footprint.ts';
import { scratch, tool, toolWithWarnings } from '../record/tools.ts';

const files = scratch();
afterAll(files.remove);

const width = 61;
const height = 47;
const values = Float32Array.from({ length: width * height }, (_, i) =>
  i % 7 === 0 ? Number.NaN : Math.fround(1000 * Math.sin(i / 50)),
);

/** The pixels as GDAL reads them: its raw dump of the band, little endian. */
function gdalFloats(path: string): Buffer {
  const raw = `${path}.raw`;
  tool('gdal_translate', ['-q', '-of', 'ENVI', '-ot', 'Float32', path, raw]);
  return files.read(raw.slice(raw.lastIndexOf('/') + 1));
}

test.each(['none', 'deflate'] as const)(
  '%s: libtiff knows the file as single-band 32-bit float',
  (compression) => {
    const path = files.write(
      `float-${compression}.tif`,
      encodeFloatTiff({ width, height, values, compression }),
    );
    const says = toolWithWarnings('tiffinfo', [path]);
    expect(says).toContain(`Image Width: ${width} Image Length: ${height}`);
    expect(says).toContain('Bits/Sample: 32');
    expect(says).toContain('Sample Format: IEEE floating point');
    expect(says).toContain('GDAL NoDataValue: nan');
    expect(says).not.toMatch(/error/i);
    const dump = toolWithWarnings('tiffdump', [path]);
    expect(dump).toMatch(/Magic: 0x4949 <little-endian> Version: 0x2a <ClassicTIFF>/);
    // libtiff decodes the strips itself when it copies them to another compression.
    const copy = files.path(`copy-${compression}.tif`);
    toolWithWarnings('tiffcp', ['-c', 'none', path, copy]);
    expect(gdalFloats(copy).equals(Buffer.from(values.buffer))).toBe(true);
  },
);

test.each(['none', 'deflate'] as const)('%s: GDAL reads every float bit for bit', (compression) => {
  const path = files.write(
    `gdal-${compression}.tif`,
    encodeFloatTiff({ width, height, values, compression }),
  );
  expect(gdalFloats(path).equals(Buffer.from(values.buffer))).toBe(true);
  const { bands, size } = JSON.parse(tool('gdalinfo', ['-json', path]));
  expect(size).toEqual([width, height]);
  expect(bands).toHaveLength(1);
  expect(bands[0].type).toBe('Float32');
  expect(bands[0].noDataValue).toBe('NaN');
});

test('GDAL reads a byte raster, compressed or not', () => {
  const order = Uint8Array.from({ length: width * height }, (_, i) => i % 256);
  for (const compression of ['none', 'deflate'] as const) {
    const path = files.write(
      `byte-${compression}.tif`,
      encodeByteTiff({ width, height, values: order, compression }),
    );
    const raw = files.path(`byte-${compression}.raw`);
    tool('gdal_translate', ['-q', '-of', 'ENVI', path, raw]);
    expect(files.read(`byte-${compression}.raw`).equals(Buffer.from(order))).toBe(true);
  }
});

test('a local grid is an engineering grid in metres, with its corners', () => {
  const geo = { system: { kind: 'local' }, westM: -12.5, northM: 40, pixelM: 0.25 } as const;
  const path = files.write('local.tif', encodeFloatTiff({ width, height, values, geo }));
  const says = JSON.parse(tool('gdalinfo', ['-json', path]));
  expect(says.geoTransform).toEqual([-12.5, 0.25, 0, 40, 0, -0.25]);
  expect(says.coordinateSystem.wkt).toMatch(/^ENGCRS.*metre/s);
});

test.each([
  [47.251, -21.403],
  [-33.9, 151.2],
  [69.6, 18.9],
])(
  'a grid about %d, %d has its corners where PROJ and our ellipsoid both put them',
  (latitudeDeg, longitudeDeg) => {
    const geo = {
      system: { kind: 'aboutPoint', latitudeDeg, longitudeDeg },
      westM: -1500,
      northM: 2000,
      pixelM: 50,
    } as const;
    const path = files.write('about.tif', encodeFloatTiff({ width, height, values, geo }));
    const { wgs84Extent } = JSON.parse(tool('gdalinfo', ['-json', path]));
    const corners: [number, number][] = wgs84Extent.coordinates[0];
    const [west, north, east, south] = [-1500, 2000, -1500 + 50 * width, 2000 - 50 * height];
    // gdalinfo lists upper left, lower left, lower right, upper right, to 7 decimals: 1.1 cm.
    [
      [west, north],
      [west, south],
      [east, south],
      [east, north],
    ].forEach(([eastM, northM], i) => {
      const ours = offsetPosition({ latitudeDeg, longitudeDeg }, eastM!, northM!);
      expect(Math.abs(corners[i]![0] - ours.longitudeDeg)).toBeLessThan(
        2e-7 / Math.cos((latitudeDeg * Math.PI) / 180),
      );
      expect(Math.abs(corners[i]![1] - ours.latitudeDeg)).toBeLessThan(2e-7);
    });
  },
);

test('a projected system by its EPSG code', () => {
  const geo = { system: { kind: 'epsg', code: 32633 }, westM: 500000, northM: 5_900_000, pixelM: 1 } as const;
  const path = files.write('utm.tif', encodeFloatTiff({ width, height, values, geo }));
  const says = JSON.parse(tool('gdalinfo', ['-json', path]));
  expect(says.coordinateSystem.wkt).toContain('WGS 84 / UTM zone 33N');
  // The zone's middle meridian.
  expect(says.wgs84Extent.coordinates[0][0][0]).toBeCloseTo(15, 6);
});
