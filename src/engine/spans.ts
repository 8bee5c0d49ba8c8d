/** Rows of pixels covered by a shape: a pixel belongs to it when its centre does. */
import type { Point } from './setup.ts';

/** Fills pixels whose centres lie in [left, right] on row `y` of a plane `width` pixels wide. */
function fillSpan(
  plane: Uint8Array,
  width: number,
  y: number,
  left: number,
  right: number,
  value: number,
): void {
  const from = Math.max(0, Math.ceil(left - 0.5));
  const to = Math.min(width, Math.floor(right - 0.5) + 1);
  if (to > from) plane.fill(value, y * width + from, y * width + to);
}

/**
 * Fills a polygon, even-odd: where it crosses itself, what is enclosed twice is outside.
 * @param plane one byte a pixel, row by row, width x height
 */
export function fillPolygon(
  plane: Uint8Array,
  width: number,
  height: number,
  polygon: readonly Point[],
  value: number,
): void {
  let top = Number.POSITIVE_INFINITY;
  let bottom = Number.NEGATIVE_INFINITY;
  for (const [, y] of polygon) {
    if (y < top) top = y;
    if (y > bottom) bottom = y;
  }
  const crossings: number[] = [];
  const last = Math.min(height - 1, Math.floor(bottom));
  for (let row = Math.max(0, Math.floor(top)); row <= last; row++) {
    const y = row + 0.5;
    crossings.length = 0;
    for (let i = 0, j = polygon.length - 1; i < polygon.length; j = i++) {
      const [xi, yi] = polygon[i]!;
      const [xj, yj] = polygon[j]!;
      if (yi > y !== yj > y) crossings.push(((xj - xi) * (y - yi)) / (yj - yi) + xi);
    }
    crossings.sort((a, b) => a - b);
    for (let k = 0; k + 1 < crossings.length; k += 2)
      fillSpan(plane, width, row, crossings[k]!, crossings[k + 1]!, value);
  }
}

/**
 * Fills all places within `radius` of the line from `a` to `b`, ends round (a capsule); a dot where they are one place.
 * @param plane one byte a pixel, row by row, width x height
 */
export function fillCapsule(
  plane: Uint8Array,
  width: number,
  height: number,
  a: Point,
  b: Point,
  radius: number,
  value: number,
): void {
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  // Across the line, radius long: the straight sides run from a and b, each moved by plus and minus this.
  const acrossX = length > 0 ? ((a[1] - b[1]) / length) * radius : 0;
  const acrossY = length > 0 ? ((b[0] - a[0]) / length) * radius : 0;
  const first = Math.max(0, Math.floor(Math.min(a[1], b[1]) - radius));
  const last = Math.min(height - 1, Math.floor(Math.max(a[1], b[1]) + radius));
  for (let row = first; row <= last; row++) {
    const y = row + 0.5;
    let left = Number.POSITIVE_INFINITY;
    let right = Number.NEGATIVE_INFINITY;
    // A capsule is convex, so its part of a row is one span: from the least to the most of its ends' and sides'.
    for (let end = 0; end < 2; end++) {
      const [x, middle] = end === 0 ? a : b;
      const half = radius * radius - (y - middle) * (y - middle);
      if (half < 0) continue;
      left = Math.min(left, x - Math.sqrt(half));
      right = Math.max(right, x + Math.sqrt(half));
    }
    for (let side = -1; side <= 1 && b[1] !== a[1]; side += 2) {
      const share = (y - a[1] - side * acrossY) / (b[1] - a[1]);
      if (share < 0 || share > 1) continue;
      const x = a[0] + side * acrossX + share * (b[0] - a[0]);
      left = Math.min(left, x);
      right = Math.max(right, x);
    }
    if (left <= right) fillSpan(plane, width, row, left, right, value);
  }
}
