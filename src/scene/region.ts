import type { Point } from '../engine/setup.ts';

/** Whether a place in pixels is inside a polygon (even-odd rule). */
export function insidePolygon(polygon: readonly Point[], x: number, y: number): boolean {
  let inside = false;
  for (let i = 0, j = polygon.length - 1; i < polygon.length; j = i++) {
    const [xi, yi] = polygon[i]!;
    const [xj, yj] = polygon[j]!;
    if (yi > y !== yj > y && x < ((xj - xi) * (y - yi)) / (yj - yi) + xi) {
      inside = !inside;
    }
  }
  return inside;
}

/** 1 on pixels whose middle is inside the polygon; everywhere when there is none. */
export function regionMask(polygon: readonly Point[] | undefined, width: number, height: number): Uint8Array {
  const mask = new Uint8Array(width * height);
  if (!polygon) {
    return mask.fill(1);
  }
  for (let row = 0; row < height; row++) {
    for (let column = 0; column < width; column++) {
      mask[row * width + column] = insidePolygon(polygon, column + 0.5, row + 0.5) ? 1 : 0;
    }
  }
  return mask;
}
