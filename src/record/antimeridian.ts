/** Cuts polygons at 180 degrees of longitude, as RFC 7946, section 3.1.9 asks. */
import { isInside, type RingPoint, type RingPolygon, signedArea } from './rings.ts';

const LIMIT_DEG = 180;

/**
 * The polygon as pieces with longitudes in -180 to 180. A ring may run over the antimeridian either way, with longitudes
 * past 180 or with a jump to -180: steps of more than half the globe are taken as such a jump.
 * @throws RangeError for a ring around a pole
 */
export function splitAtAntimeridian(polygon: RingPolygon): RingPolygon[] {
  const outer = oriented(unwrapped(polygon.outer, polygon.outer[0]?.[0] ?? 0), 1);
  const west = Math.min(...outer.map(([longitude]) => longitude));
  const east = Math.max(...outer.map(([longitude]) => longitude));
  const turn = -360 * Math.floor((west + LIMIT_DEG) / 360);
  const holes = polygon.holes.map((hole) => oriented(unwrapped(hole, (west + east) / 2), -1));
  const rings = [outer, ...holes].map((ring) => ring.map(([x, y]) => [x + turn, y] as RingPoint));
  if (east + turn <= LIMIT_DEG) return [{ outer: rings[0]!, holes: rings.slice(1) }];
  return [
    ...side(rings, false),
    ...side(rings, true).map(({ outer: ring, holes: own }) => ({
      outer: ring.map(turnedBack),
      holes: own.map((hole) => hole.map(turnedBack)),
    })),
  ];
}

function turnedBack([longitude, latitude]: RingPoint): RingPoint {
  return [longitude - 360, latitude];
}

/** Without jumps, without the repeated end, beginning within half a globe of `near`. */
function unwrapped(ring: readonly RingPoint[], near: number): RingPoint[] {
  let last = near;
  const run = ring.map(([longitude, latitude]): RingPoint => {
    last = longitude + 360 * Math.round((last - longitude) / 360);
    return [last, latitude];
  });
  const [first, end] = [run[0], run.at(-1)];
  if (!first || !end) return [];
  // One more step leads back to the start; round a pole it arrives a whole turn away.
  if (Math.abs(first[0] - end[0]) > LIMIT_DEG) {
    throw new RangeError('An outline around a pole cannot be written as GeoJSON: split it first.');
  }
  return run.length > 1 && first[0] === end[0] && first[1] === end[1] ? run.slice(0, -1) : run;
}

function oriented(ring: RingPoint[], sign: 1 | -1): RingPoint[] {
  return signedArea(ring) * sign < 0 ? ring.reverse() : ring;
}

interface Chain {
  readonly points: RingPoint[];
  readonly startLatitude: number;
  readonly endLatitude: number;
}

/** The part of the rings on one side of the limit, outer rings counter-clockwise and holes clockwise. */
function side(rings: readonly (readonly RingPoint[])[], beyond: boolean): RingPolygon[] {
  const isHere = ([longitude]: RingPoint) => longitude > LIMIT_DEG === beyond;
  const chains: Chain[] = [];
  const wholeHoles: (readonly RingPoint[])[] = [];
  rings.forEach((ring, i) => {
    if (ring.every(isHere)) {
      if (i > 0) wholeHoles.push(ring);
    } else if (ring.some(isHere)) {
      chains.push(...chainsOf(ring, isHere));
    }
  });
  return joined(chains).map((outer) => ({
    outer,
    holes: wholeHoles.filter((hole) => isInside(hole[0]!, outer)),
  }));
}

/** Runs of the ring on this side, each from crossing to crossing of the limit. */
function chainsOf(ring: readonly RingPoint[], isHere: (point: RingPoint) => boolean): Chain[] {
  const at = (i: number) => ring[(i + ring.length) % ring.length]!;
  const chains: Chain[] = [];
  ring.forEach((point, i) => {
    if (!isHere(point) || isHere(at(i - 1))) return;
    const startLatitude = crossing(at(i - 1), point);
    const points: RingPoint[] = [[LIMIT_DEG, startLatitude]];
    let k = i;
    while (isHere(at(k))) points.push(at(k++));
    const endLatitude = crossing(at(k - 1), at(k));
    points.push([LIMIT_DEG, endLatitude]);
    chains.push({ points, startLatitude, endLatitude });
  });
  return chains;
}

function crossing([ax, ay]: RingPoint, [bx, by]: RingPoint): number {
  return ay + ((LIMIT_DEG - ax) / (bx - ax)) * (by - ay);
}

/**
 * Chains joined along the limit. Its crossings, sorted by latitude, go alternately into and out of the polygon, so a
 * chain that ends at one of a pair goes on with the chain that starts at the other.
 */
function joined(chains: readonly Chain[]): RingPoint[][] {
  const ends = chains
    .flatMap((chain) => [
      { chain, latitude: chain.startLatitude, starts: true },
      { chain, latitude: chain.endLatitude, starts: false },
    ])
    .sort((a, b) => a.latitude - b.latitude);
  const nextOf = new Map<Chain, Chain>();
  for (let i = 0; i + 1 < ends.length; i += 2) {
    const pair = [ends[i]!, ends[i + 1]!];
    const leaving = pair.find(({ starts }) => !starts);
    const entering = pair.find(({ starts }) => starts);
    if (leaving && entering) nextOf.set(leaving.chain, entering.chain);
  }
  const left = new Set(chains);
  const loops: RingPoint[][] = [];
  for (const first of chains) {
    const loop: RingPoint[] = [];
    for (let chain: Chain | undefined = first; chain && left.delete(chain); chain = nextOf.get(chain)) {
      loop.push(...chain.points);
    }
    if (loop.length > 2) loops.push(loop);
  }
  return loops;
}
