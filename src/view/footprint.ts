const DEGREE = Math.PI / 180;

/** WGS 84: semi-major axis in metres and first eccentricity squared, from the flattening 1 / 298.257223563. */
const SEMI_MAJOR_M = 6_378_137;
const FLATTENING = 1 / 298.257223563;
const ECCENTRICITY2 = FLATTENING * (2 - FLATTENING);

/** A place on the globe, WGS 84, degrees, north and east positive. */
export interface Position {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
}

/** Radii of curvature of the ellipsoid at a latitude, metres: along the meridian and across it. */
export function curvatureRadiiM(latitudeDeg: number): {
  readonly meridian: number;
  readonly transverse: number;
} {
  const sine = Math.sin(latitudeDeg * DEGREE);
  const w2 = 1 - ECCENTRICITY2 * sine * sine;
  return {
    meridian: (SEMI_MAJOR_M * (1 - ECCENTRICITY2)) / (w2 * Math.sqrt(w2)),
    transverse: SEMI_MAJOR_M / Math.sqrt(w2),
  };
}

/**
 * Position of the place that lies `eastM`, `northM` metres from `origin` (distance and bearing taken at the origin).
 * Gauss's mid-latitude formula: radii of curvature at the middle latitude, and the bearing turned there by half the
 * convergence of the meridians. Within 10 km of the origin and 70 degrees of the equator it keeps to a few centimetres of
 * the geodesic.
 */
export function offsetPosition(origin: Position, eastM: number, northM: number): Position {
  let north = northM;
  let east = eastM;
  let latitudeDeg = origin.latitudeDeg;
  let turnDeg = 0;
  // The middle depends on the far end: three rounds leave nothing to gain over 10 km.
  for (let round = 0; round < 4; round++) {
    const middleDeg = (origin.latitudeDeg + latitudeDeg) / 2;
    const radii = curvatureRadiiM(middleDeg);
    latitudeDeg = origin.latitudeDeg + north / radii.meridian / DEGREE;
    turnDeg = east / (radii.transverse * Math.cos(middleDeg * DEGREE)) / DEGREE;
    const half = (turnDeg * DEGREE * Math.sin(middleDeg * DEGREE)) / 2;
    east = eastM * Math.cos(half) + northM * Math.sin(half);
    north = northM * Math.cos(half) - eastM * Math.sin(half);
  }
  return { latitudeDeg, longitudeDeg: wrapLongitude(origin.longitudeDeg + turnDeg) };
}

/** The reverse of `offsetPosition`: metres east and north of `origin`. */
export function offsetM(
  origin: Position,
  place: Position,
): { readonly eastM: number; readonly northM: number } {
  const middleDeg = (origin.latitudeDeg + place.latitudeDeg) / 2;
  const radii = curvatureRadiiM(middleDeg);
  const turn = wrapLongitude(place.longitudeDeg - origin.longitudeDeg) * DEGREE;
  const east = turn * radii.transverse * Math.cos(middleDeg * DEGREE);
  const north = (place.latitudeDeg - origin.latitudeDeg) * DEGREE * radii.meridian;
  const half = (turn * Math.sin(middleDeg * DEGREE)) / 2;
  return {
    eastM: east * Math.cos(half) - north * Math.sin(half),
    northM: north * Math.cos(half) + east * Math.sin(half),
  };
}

/**
 * Position of a ground place (metres, x to the right and y ahead of the point below the lens) for a camera at `origin`
 * whose axis bears `headingDeg` from true north. A magnetic heading must be corrected first.
 */
export function groundPosition(origin: Position, headingDeg: number, xM: number, yM: number): Position {
  const bearing = headingDeg * DEGREE;
  return offsetPosition(
    origin,
    xM * Math.cos(bearing) + yM * Math.sin(bearing),
    yM * Math.cos(bearing) - xM * Math.sin(bearing),
  );
}

/** Area of a polygon on the level plane, square metres (shoelace); the ring need not repeat its first point. */
export function planarAreaM2(ring: readonly (readonly [number, number])[]): number {
  let twice = 0;
  for (let i = 0; i < ring.length; i++) {
    const [ax, ay] = ring[i]!;
    const [bx, by] = ring[(i + 1) % ring.length]!;
    twice += ax * by - bx * ay;
  }
  return Math.abs(twice) / 2;
}

/**
 * Area of a polygon of positions on the ellipsoid, square metres, for rings up to some 20 km across: laid out flat about
 * its first point, which keeps areas to the square of (size / 6371 km) over 6.
 */
export function positionAreaM2(ring: readonly Position[]): number {
  const first = ring[0];
  if (!first) {
    return 0;
  }
  return planarAreaM2(
    ring.map((place) => {
      const { eastM, northM } = offsetM(first, place);
      return [eastM, northM];
    }),
  );
}

/** Into [-180, 180). */
function wrapLongitude(degrees: number): number {
  return degrees >= -180 && degrees < 180 ? degrees : degrees - 360 * Math.floor((degrees + 180) / 360);
}
