/**
 * Our GeoJSON read by GDAL (validity by GEOS, areas by PROJ's equal-area projection) and measured by @turf/area, none of
 * which is ours. Format: RFC 7946.
 */
import turfArea from '@turf/area';
import { afterAll, expect, test } from 'vitest';
import { outlines } from '../../src/record/contours.ts';
import { writeGeoJson } from '../../src/record/geojson.ts';
import { turnedMapping } from '../../src/record/worldGrid.ts';
import { offsetPosition } from '../../src/view/footprint.ts';
import { focalPxFrom35mm, pinholeCamera } from '../../src/view/pinholeCamera.ts';
import { groundAreaField, incidenceField } from '../../src/view/waterFields.ts';
import { groundAt, placeOf, waterView } from '../../src/view/waterView.ts';
import { scratch, tool } from '../record/tools.ts';

const files = scratch();
afterAll(files.remove);

const [width, height] = [600, 450];
const DEGREE = Math.PI / 180;

/** A slick with a hole and an island, seen from 8 m up at a slant, as outlines on the globe and as an area by pixels. */
function slickFrom(latitudeDeg: number, longitudeDeg: number) {
  const camera = pinholeCamera(width, height, focalPxFrom35mm(26, width, height));
  const view = waterView({ camera, heightM: 8, pitchRad: -38 * DEGREE, rollRad: -2 * DEGREE });
  const incidence = incidenceField(view);
  const areas = groundAreaField(view);
  const mask = new Uint8Array(width * height);
  let areaM2 = 0;
  for (let i = 0; i < mask.length; i++) {
    const place = groundAt(view, (i % width) + 0.5, Math.floor(i / width) + 0.5);
    if (!place || incidence[i]! > 75 * DEGREE) continue;
    const r = Math.hypot(place[0] - 1, 0.7 * (place[1] - 9));
    if (!(r < 4.5 && (r > 1.8 || r < 0.8))) continue;
    mask[i] = 1;
    areaM2 += areas[i]!;
  }
  const mapping = turnedMapping(
    { groundOf: (x, y) => groundAt(view, x, y), placeOf: (x, y) => placeOf(view, x, y) },
    214.5,
  );
  const toGlobe = ([x, y]: readonly [number, number]): readonly [number, number] => {
    const [east, north] = mapping.groundOf(x, y)!;
    const place = offsetPosition({ latitudeDeg, longitudeDeg }, east, north);
    return [place.longitudeDeg, place.latitudeDeg];
  };
  const polygons = outlines(mask, width, height).map(({ outer, holes }) => ({
    outer: outer.map(toGlobe),
    holes: holes.map((hole) => hole.map(toGlobe)),
  }));
  return { polygons, areaM2 };
}

// The last lies across the antimeridian.
const PLACES = [
  [47.251, -21.403],
  [-17.5, 179.99996],
] as const;

test.each(PLACES)(
  'from %d, %d: GDAL finds it valid, in its place, with the area of its pixels',
  (lat, lon) => {
    const { polygons, areaM2 } = slickFrom(lat, lon);
    const text = writeGeoJson([
      { id: 'slick', properties: { kind: 'slickOutline', areaM2 }, shape: { polygons } },
      { properties: { kind: 'camera' }, shape: { point: [lon, lat] } },
    ]);
    const path = files.write('slick.geojson', text);
    const said = tool('ogrinfo', [
      '-q',
      '-dialect',
      'sqlite',
      '-sql',
      `select ST_IsValid(geometry) as valid, ST_NumGeometries(geometry) as parts, kind,
       ST_MinX(geometry) as west, ST_MaxX(geometry) as east, ST_MinY(geometry) as south, ST_MaxY(geometry) as north,
       ST_SRID(geometry) as srid from slick`,
      path,
    ]);
    expect(said.match(/valid \(Integer\) = 1/g)).toHaveLength(2);
    const numbers = (name: string) =>
      [...said.matchAll(new RegExp(`${name} \\(Real\\) = (\\S+)`, 'g'))].map((m) => Number(m[1]));
    // Within 20 m of the camera, on the globe.
    for (const edge of [...numbers('south'), ...numbers('north')]) {
      expect(Math.abs(edge - lat)).toBeLessThan(20 / 110_000);
    }
    for (const edge of [...numbers('west'), ...numbers('east')]) {
      expect(Math.abs(edge)).toBeLessThanOrEqual(180);
    }
    // Equal-area about the place; PROJ's ellipsoid.
    const flat = files.path(`flat${lat}.gpkg`);
    tool('ogr2ogr', [
      '-f',
      'GPKG',
      '-nln',
      'flat',
      '-t_srs',
      `+proj=laea +lat_0=${lat} +lon_0=${lon} +datum=WGS84 +units=m`,
      flat,
      path,
    ]);
    const area = tool('ogrinfo', [
      '-q',
      '-dialect',
      'sqlite',
      '-sql',
      'select sum(ST_Area(geom)) as area from flat',
      flat,
    ]);
    const measured = Number(/area \(Real\) = (\S+)/.exec(area)?.[1]);
    // Outlines follow pixels of 1 to 10 cm; coordinates are rounded to 1 cm.
    expect(Math.abs(measured / areaM2 - 1)).toBeLessThan(0.01);
    // @turf/area works on a sphere of 6371.0088 km: 0.45 % too large at the equator, 0.9 % too small at the poles.
    expect(Math.abs(turfArea(JSON.parse(text)) / measured - 1)).toBeLessThan(0.0045);
  },
);
