/** Outlines of what a map shows, as polygons in picture places (x right, y down, pixels from the top left corner). */
import { contours } from 'd3-contour';
import { type RingPoint, type RingPolygon, signedArea, withHoles } from './rings.ts';

export interface OutlineOptions {
  /** Longer side of the grid on which outlines are drawn; more pixels are averaged down to it. */
  readonly longSide?: number;
  /** Islands and holes smaller than this many cells of that grid are left out: they are speckle, not outline. */
  readonly leastCells?: number;
}

/**
 * Outlines of the pixels of a mask that are not 0, by marching squares (d3-contour) where half of a cell is set.
 * @param mask one byte a pixel, row by row
 * @throws RangeError where the mask does not fit the size
 */
export function outlines(
  mask: Uint8Array,
  width: number,
  height: number,
  { longSide = 512, leastCells = 4 }: OutlineOptions = {},
): RingPolygon[] {
  if (mask.length !== width * height) {
    throw new RangeError(`A mask of ${width} × ${height} does not fit ${mask.length} pixels.`);
  }
  const block = Math.max(1, Math.ceil(Math.max(width, height) / longSide));
  const columns = Math.ceil(width / block);
  const rows = Math.ceil(height / block);
  const shares = blockShares(mask, width, height, block);
  const shape = contours().size([columns, rows]).contour(shares, 0.5);
  const outers: RingPoint[][] = [];
  const holes: RingPoint[][] = [];
  for (const [first, ...others] of shape.coordinates) {
    // Sorted anew: d3-contour gives a hole to the first ring around it, which is the wrong one for islands in holes.
    for (const [kind, ring] of [[outers, first] as const, ...others.map((hole) => [holes, hole] as const)]) {
      if (!ring) continue;
      const cells = withoutStraight(ring as [number, number][]);
      if (cells.length < 3 || Math.abs(signedArea(cells)) < leastCells) continue;
      kind.push(cells.map(([x, y]) => [Math.min(width, x * block), Math.min(height, y * block)]));
    }
  }
  return withHoles(outers, holes);
}

/** Share of set pixels in each block of the picture; blocks at the edges count the pixels that they have. */
function blockShares(mask: Uint8Array, width: number, height: number, block: number): number[] {
  const columns = Math.ceil(width / block);
  const rows = Math.ceil(height / block);
  const set = new Array<number>(columns * rows).fill(0);
  for (let y = 0; y < height; y++) {
    const row = Math.floor(y / block) * columns;
    for (let x = 0; x < width; x++) {
      if (mask[y * width + x] !== 0) set[row + Math.floor(x / block)]!++;
    }
  }
  return set.map((count, i) => {
    const wide = Math.min(block, width - (i % columns) * block);
    const high = Math.min(block, height - Math.floor(i / columns) * block);
    return count / (wide * high);
  });
}

/** The ring without its repeated end and without points on a straight line between their neighbours. */
function withoutStraight(ring: readonly RingPoint[]): RingPoint[] {
  const open = ring.slice(0, -1);
  return open.filter(([x, y], i) => {
    const [ax, ay] = open[(i + open.length - 1) % open.length]!;
    const [bx, by] = open[(i + 1) % open.length]!;
    return Math.abs((x - ax) * (by - y) - (y - ay) * (bx - x)) > 1e-9;
  });
}
