/** Closed lines of points [x, y]: what outlines and GeoJSON polygons are made of. The first point may be repeated at the end. */
export type RingPoint = readonly [number, number];

/** An outer ring with the holes in it. */
export interface RingPolygon {
  readonly outer: readonly RingPoint[];
  readonly holes: readonly (readonly RingPoint[])[];
}

/** Area by the shoelace formula, positive where the ring runs counter-clockwise in axes x right, y up. */
export function signedArea(ring: readonly RingPoint[]): number {
  let twice = 0;
  for (let i = 0; i < ring.length; i++) {
    const [ax, ay] = ring[i]!;
    const [bx, by] = ring[(i + 1) % ring.length]!;
    twice += ax * by - bx * ay;
  }
  return twice / 2;
}

/** Whether a point lies inside, by the even-odd rule. */
export function isInside([x, y]: RingPoint, ring: readonly RingPoint[]): boolean {
  let inside = false;
  for (let i = 0, j = ring.length - 1; i < ring.length; j = i++) {
    const [ax, ay] = ring[i]!;
    const [bx, by] = ring[j]!;
    if (ay > y !== by > y && x < ((bx - ax) * (y - ay)) / (by - ay) + ax) inside = !inside;
  }
  return inside;
}

/** Puts each hole into the smallest outer ring around it; a hole without one is dropped. */
export function withHoles(
  outers: readonly (readonly RingPoint[])[],
  holes: readonly (readonly RingPoint[])[],
): RingPolygon[] {
  const polygons = outers
    .map((outer) => ({
      outer,
      holes: [] as (readonly RingPoint[])[],
      area: Math.abs(signedArea(outer)),
      box: boxOf(outer),
    }))
    .sort((a, b) => a.area - b.area);
  for (const hole of holes) {
    const area = Math.abs(signedArea(hole));
    const [x, y] = hole[0]!;
    polygons
      .find(
        ({ outer, box, area: around }) =>
          around > area &&
          x >= box[0] &&
          x <= box[2] &&
          y >= box[1] &&
          y <= box[3] &&
          isInside([x, y], outer),
      )
      ?.holes.push(hole);
  }
  return polygons.reverse().map(({ outer, holes: own }) => ({ outer, holes: own }));
}

function boxOf(ring: readonly RingPoint[]): readonly [number, number, number, number] {
  const box: [number, number, number, number] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [x, y] of ring) {
    box[0] = Math.min(box[0], x);
    box[1] = Math.min(box[1], y);
    box[2] = Math.max(box[2], x);
    box[3] = Math.max(box[3], y);
  }
  return box;
}
