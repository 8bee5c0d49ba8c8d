import { execFileSync } from 'node:child_process';
import { area } from '@turf/area';
import { describe, expect, it } from 'vitest';
import {
  curvatureRadiiM,
  groundPosition,
  offsetM,
  offsetPosition,
  type Position,
  planarAreaM2,
  positionAreaM2,
} from '../../src/view/footprint.ts';
import { EARTH_RADIUS_M } from '../../src/view/horizon.ts';

/** A slick's outline in metres about the point below the camera: 600 m long, concave. */
const OUTLINE: readonly (readonly [number, number])[] = [
  [-80, 20],
  [60, 35],
  [140, 240],
  [90, 620],
  [10, 300],
  [-60, 410],
  [-130, 160],
];
const PLACES: readonly Position[] = [
  { latitudeDeg: 0.5, longitudeDeg: 20 },
  { latitudeDeg: 43.3, longitudeDeg: -179.999 },
  { latitudeDeg: 52.1, longitudeDeg: 4.2 },
  { latitudeDeg: -33.9, longitudeDeg: 151.2 },
  { latitudeDeg: 69.7, longitudeDeg: 18.9 },
];

describe('areas on the globe', () => {
  it.each(PLACES)(
    '@turf/area at $latitudeDeg, $longitudeDeg, whose sphere differs by a known factor',
    (origin) => {
      const ring = OUTLINE.map(([x, y]) => groundPosition(origin, 37, x, y));
      const turf = area({
        type: 'Polygon',
        coordinates: [[...ring, ring[0]!].map((p) => [unwrapped(p, origin), p.latitudeDeg])],
      });
      const { meridian, transverse } = curvatureRadiiM(origin.latitudeDeg);
      // turf takes a sphere of 6371008.8 m; the ellipsoid's area element is meridian x transverse radius instead.
      const ours = positionAreaM2(ring) / (meridian * transverse);
      expect(ours / (turf / EARTH_RADIUS_M ** 2)).toBeCloseTo(1, 5);
      expect(positionAreaM2(ring) / planarAreaM2(OUTLINE)).toBeCloseTo(1, 5);
    },
  );

  it('the two models themselves lie within 0.7 %', () => {
    const ring = OUTLINE.map(([x, y]) => groundPosition(PLACES[2]!, 0, x, y));
    const turf = area({
      type: 'Polygon',
      coordinates: [[...ring, ring[0]!].map((p) => [p.longitudeDeg, p.latitudeDeg])],
    });
    expect(Math.abs(turf / positionAreaM2(ring) - 1)).toBeLessThan(0.007);
  });
});

describe('positions against PROJ (through GDAL), azimuthal equidistant about the camera', () => {
  it.each(PLACES)('from $latitudeDeg, $longitudeDeg', (origin) => {
    const offsets = [
      [0, 0],
      [500, -300],
      [-1200, 900],
      [0, 10_000],
      [7000, 7000],
    ] as const;
    const places = offsets.map(([east, north]) => offsetPosition(origin, east, north));
    const printed = execFileSync(
      'gdaltransform',
      [
        '-output_xy',
        '-s_srs',
        '+proj=longlat +datum=WGS84 +no_defs',
        '-t_srs',
        `+proj=aeqd +lat_0=${origin.latitudeDeg} +lon_0=${origin.longitudeDeg} +datum=WGS84 +units=m`,
      ],
      { input: places.map((p) => `${p.longitudeDeg} ${p.latitudeDeg}\n`).join('') },
    ).toString();
    const found = printed
      .trim()
      .split('\n')
      .map((line) => line.split(' ').map(Number));
    expect(found).toHaveLength(offsets.length);
    offsets.forEach(([east, north], i) => {
      // As the docstring says: millimetres near the camera, a few centimetres at 10 km.
      const tolerance = Math.hypot(east, north) < 2000 ? 0.001 : 0.05;
      expect(Math.hypot(found[i]![0]! - east, found[i]![1]! - north)).toBeLessThan(tolerance);
    });
  });

  it('there and back', () => {
    for (const origin of PLACES) {
      const back = offsetM(origin, offsetPosition(origin, -834, 512));
      expect(back.eastM).toBeCloseTo(-834, 3);
      expect(back.northM).toBeCloseTo(512, 3);
    }
  });

  it('a camera that faces east has north on its left', () => {
    const origin = PLACES[2]!;
    const ahead = offsetM(origin, groundPosition(origin, 90, 0, 100));
    expect(ahead.eastM).toBeCloseTo(100, 4);
    expect(ahead.northM).toBeCloseTo(0, 4);
    const right = offsetM(origin, groundPosition(origin, 90, 100, 0));
    expect(right.northM).toBeCloseTo(-100, 4);
  });
});

function unwrapped(place: Position, origin: Position): number {
  const turn = place.longitudeDeg - origin.longitudeDeg;
  return place.longitudeDeg - 360 * Math.round(turn / 360);
}
