/** GeoJSON by RFC 7946 (Butler and others, 2016): WGS 84, longitude first, outer rings counter-clockwise, rings closed. */
import { splitAtAntimeridian } from './antimeridian.ts';
import { type RingPoint, type RingPolygon, signedArea } from './rings.ts';

/** [longitude, latitude], degrees, WGS 84. */
export type LonLat = RingPoint;

export type JsonValue =
  | string
  | number
  | boolean
  | null
  | readonly JsonValue[]
  | { readonly [key: string]: JsonValue };

export interface GeoFeature {
  readonly id?: string;
  readonly properties: Readonly<Record<string, JsonValue>>;
  /** Outlines in [longitude, latitude], or one place. */
  readonly shape:
    | { readonly polygons: readonly RingPolygon[] }
    | { readonly point: LonLat }
    /** A feature without a place is allowed and is written with a null geometry. */
    | null;
}

type Geometry =
  | { readonly type: 'MultiPolygon'; readonly coordinates: number[][][][] }
  | { readonly type: 'Point'; readonly coordinates: number[] };

/**
 * A tenth of a millimetre. RFC 7946, section 11.2, finds 6 enough for a place, but from a quay a pixel is a few
 * millimetres wide, and an outline rounded to a centimetre crosses itself (GEOS calls it invalid).
 */
const DECIMALS = 9;

/**
 * A FeatureCollection as text. Rings are oriented, closed, rounded to 9 decimals and cut at the antimeridian; what
 * vanishes by rounding is left out, and a feature of which nothing is left has a null geometry.
 * @throws RangeError where a coordinate is not a number or off the globe, or a ring runs around a pole
 */
export function writeGeoJson(features: readonly GeoFeature[]): string {
  const collection = {
    type: 'FeatureCollection',
    features: features.map(({ id, properties, shape }) => ({
      type: 'Feature',
      ...(id !== undefined && { id }),
      geometry: shape && geometryOf(shape),
      properties,
    })),
  };
  return `${JSON.stringify(collection)}\n`;
}

function geometryOf(shape: NonNullable<GeoFeature['shape']>): Geometry | null {
  if ('point' in shape) {
    mustBeOnGlobe(shape.point);
    const [longitude, latitude] = shape.point;
    return { type: 'Point', coordinates: [rounded(wrapped(longitude)), rounded(latitude)] };
  }
  const coordinates = shape.polygons
    .flatMap((polygon) => {
      for (const ring of [polygon.outer, ...polygon.holes]) ring.forEach(mustBeOnGlobe);
      return splitAtAntimeridian(polygon);
    })
    .flatMap(({ outer, holes }) => {
      const shell = finished(outer, 1);
      return shell ? [[shell, ...holes.flatMap((hole) => [finished(hole, -1) ?? []])]] : [];
    })
    .map((rings) => rings.filter((ring) => ring.length > 0));
  return coordinates.length > 0 ? { type: 'MultiPolygon', coordinates } : null;
}

/** Rounded, without repeated points, turned the right way and closed; null where no area is left. */
function finished(ring: readonly RingPoint[], sign: 1 | -1): number[][] | null {
  const points = ring
    .map(([longitude, latitude]): [number, number] => [rounded(longitude), rounded(latitude)])
    .filter(([x, y], i, all) => {
      const [px, py] = all[(i + all.length - 1) % all.length]!;
      return x !== px || y !== py;
    });
  const area = signedArea(points);
  if (points.length < 3 || area === 0) return null;
  if (area * sign < 0) points.reverse();
  return [...points, points[0]!];
}

function rounded(degrees: number): number {
  // Adding 0 turns -0 into 0.
  return Number(degrees.toFixed(DECIMALS)) + 0;
}

function wrapped(longitude: number): number {
  return longitude - 360 * Math.round(longitude / 360);
}

function mustBeOnGlobe([longitude, latitude]: LonLat): void {
  if (!(Math.abs(latitude) <= 90 && Math.abs(longitude) <= 540)) {
    throw new RangeError(
      `There is no place at latitude ${latitude}, longitude ${longitude}: check the position of the photo.`,
    );
  }
}
