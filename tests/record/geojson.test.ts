import fc from 'fast-check';
import { expect, test } from 'vitest';
import { splitAtAntimeridian } from '../../src/record/antimeridian.ts';
import { type LonLat, writeGeoJson } from '../../src/record/geojson.ts';
import { type RingPolygon, signedArea } from '../../src/record/rings.ts';

const square = (west: number, south: number, size: number): LonLat[] => [
  [west, south],
  [west + size, south],
  [west + size, south + size],
  [west, south + size],
];
const written = (polygons: RingPolygon[]) =>
  JSON.parse(writeGeoJson([{ properties: { kind: 'test' }, shape: { polygons } }])).features[0];
const areaOf = ({ outer, holes }: RingPolygon) =>
  Math.abs(signedArea(outer)) - holes.reduce((sum, hole) => sum + Math.abs(signedArea(hole)), 0);

test('rings are closed, outer ones counter-clockwise, holes clockwise, whichever way they came', () => {
  const hole = square(10.2, 50.2, 0.2);
  for (const outer of [square(10, 50, 1), square(10, 50, 1).reverse()]) {
    for (const inner of [hole, [...hole].reverse()]) {
      const [[shell, gap]] = written([{ outer, holes: [inner] }]).geometry.coordinates;
      expect(shell).toHaveLength(5);
      expect(shell[0]).toEqual(shell[4]);
      expect(signedArea(shell)).toBeGreaterThan(0);
      expect(signedArea(gap)).toBeLessThan(0);
    }
  }
});

test('longitude comes first, nine decimals at most, no minus zero', () => {
  const feature = written([{ outer: square(-1 / 3e9, 51.123456789, 0.25), holes: [] }]);
  expect(feature.geometry.coordinates[0][0][0]).toEqual([0, 51.123456789]);
  expect(JSON.stringify(feature)).not.toContain('-0,');
});

test('there is no crs member: RFC 7946 knows only WGS 84', () => {
  expect(writeGeoJson([])).toBe('{"type":"FeatureCollection","features":[]}\n');
});

test('what rounding leaves without area goes; a feature of which nothing is left has a null geometry', () => {
  expect(written([{ outer: square(10, 50, 1e-11), holes: [] }]).geometry).toBeNull();
  const kept = written([{ outer: square(10, 50, 1), holes: [square(10.5, 50.5, 1e-11)] }]);
  expect(kept.geometry.coordinates[0]).toHaveLength(1);
});

test('a point is wrapped into -180 to 180', () => {
  const [feature] = JSON.parse(writeGeoJson([{ properties: {}, shape: { point: [190, -20] } }])).features;
  expect(feature.geometry).toEqual({ type: 'Point', coordinates: [-170, -20] });
});

test('places off the globe are refused', () => {
  expect(() => writeGeoJson([{ properties: {}, shape: { point: [0, 91] } }])).toThrow(
    'no place at latitude 91',
  );
  expect(() => writeGeoJson([{ properties: {}, shape: { point: [Number.NaN, 0] } }])).toThrow(RangeError);
});

test('a square over the antimeridian becomes two, whether it jumps to -180 or runs past 180', () => {
  for (const outer of [
    square(179.5, -17, 1),
    square(179.5, -17, 1).map(([x, y]): LonLat => [x > 180 ? x - 360 : x, y]),
  ]) {
    const rings = written([{ outer, holes: [] }]).geometry.coordinates.map(([ring]: LonLat[][]) => ring);
    expect(rings).toHaveLength(2);
    const spans = rings.map((ring: LonLat[]) => [
      Math.min(...ring.map(([x]) => x)),
      Math.max(...ring.map(([x]) => x)),
    ]);
    expect(spans).toEqual([
      [179.5, 180],
      [-180, -179.5],
    ]);
    for (const ring of rings) expect(signedArea(ring)).toBeCloseTo(0.5, 10);
  }
});

test('a hole over the antimeridian notches both halves; holes on one side stay there', () => {
  const pieces = splitAtAntimeridian({
    outer: square(179, 0, 2),
    holes: [square(179.9, 0.9, 0.2), square(179.2, 0.2, 0.1), square(180.5, 1.5, 0.1)],
  });
  expect(pieces).toHaveLength(2);
  expect(pieces.map(({ holes }) => holes.length)).toEqual([1, 1]);
  expect(pieces.reduce((sum, piece) => sum + areaOf(piece), 0)).toBeCloseTo(4 - 0.04 - 0.01 - 0.01, 10);
});

test('a comb of fingers over the antimeridian becomes a back and one piece for each finger', () => {
  const outer: LonLat[] = [[179, 0]];
  for (let finger = 0; finger < 4; finger++) {
    const y = finger * 2;
    outer.push([181, y], [181, y + 1], [179.5, y + 1], [179.5, y + 2]);
  }
  outer.push([179, 8]);
  const pieces = splitAtAntimeridian({ outer, holes: [] });
  expect(pieces).toHaveLength(5);
  expect(pieces.reduce((sum, piece) => sum + areaOf(piece), 0)).toBeCloseTo(areaOf({ outer, holes: [] }), 10);
});

test('stars anywhere: no piece leaves -180 to 180, and no area is lost or won', () => {
  fc.assert(
    fc.property(
      fc.double({ min: -180, max: 180, noNaN: true }),
      fc.double({ min: -60, max: 60, noNaN: true }),
      fc.array(fc.double({ min: 0.05, max: 2, noNaN: true }), { minLength: 3, maxLength: 24 }),
      (lon, lat, radii) => {
        const outer = radii.map((r, i): LonLat => {
          const turn = (2 * Math.PI * i) / radii.length;
          return [lon + r * Math.cos(turn), lat + r * Math.sin(turn)];
        });
        const hole = outer.map(([x, y]): LonLat => [lon + (x - lon) / 2, lat + (y - lat) / 2]);
        // Three points can leave the middle outside, and the hole is then no hole.
        fc.pre(radii.length > 3);
        const jumped = (ring: LonLat[]) =>
          ring.map(([x, y]): LonLat => [x > 180 ? x - 360 : x < -180 ? x + 360 : x, y]);
        const pieces = splitAtAntimeridian({ outer: jumped(outer), holes: [jumped(hole)] });
        for (const { outer: ring, holes } of pieces)
          for (const [x] of [ring, ...holes].flat()) expect(Math.abs(x)).toBeLessThanOrEqual(180);
        const area = pieces.reduce((sum, piece) => sum + areaOf(piece), 0);
        expect(area).toBeCloseTo(0.75 * Math.abs(signedArea(outer)), 8);
      },
    ),
    { numRuns: 500 },
  );
});

test('a ring around a pole is refused', () => {
  const outer: LonLat[] = [
    [-120, 80],
    [0, 80],
    [120, 80],
  ];
  expect(() => splitAtAntimeridian({ outer, holes: [] })).toThrow('around a pole');
});
