import { expect, test } from 'vitest';
import { outlines } from '../../src/record/contours.ts';
import { isInside, type RingPolygon, signedArea } from '../../src/record/rings.ts';

function maskOf(width: number, height: number, isSet: (x: number, y: number) => boolean): Uint8Array {
  return Uint8Array.from({ length: width * height }, (_, i) =>
    isSet((i % width) + 0.5, Math.floor(i / width) + 0.5) ? 1 : 0,
  );
}
const areaOf = ({ outer, holes }: RingPolygon) =>
  Math.abs(signedArea(outer)) - holes.reduce((sum, hole) => sum + Math.abs(signedArea(hole)), 0);
const areaOfAll = (polygons: readonly RingPolygon[]) => polygons.reduce((sum, p) => sum + areaOf(p), 0);

test('a disc with a hole and an island in the hole: each hole is in its own ring', () => {
  const radius = (x: number, y: number) => Math.hypot(x - 100, y - 80);
  const mask = maskOf(200, 160, (x, y) => {
    const r = radius(x, y);
    return (r < 70 && r > 50) || (r < 35 && r > 15);
  });
  const shapes = outlines(mask, 200, 160);
  expect(shapes).toHaveLength(2);
  expect(shapes.map(({ holes }) => holes.length)).toEqual([1, 1]);
  const [big, small] = shapes;
  expect(areaOf(big!)).toBeCloseTo(Math.PI * (70 ** 2 - 50 ** 2), -2);
  expect(areaOf(small!)).toBeCloseTo(Math.PI * (35 ** 2 - 15 ** 2), -2);
  for (const { outer, holes } of shapes) expect(isInside(holes[0]![0]!, outer)).toBe(true);
});

test('a full mask is the whole picture, also where blocks do not divide it', () => {
  const shapes = outlines(new Uint8Array(1001 * 700).fill(1), 1001, 700, { longSide: 128 });
  expect(shapes).toHaveLength(1);
  // Marching squares cut half a cell off each of the four corners, an eighth of a block squared.
  expect(areaOfAll(shapes)).toBeGreaterThan(1001 * 700 - 4 * 8 ** 2);
  expect(areaOfAll(shapes)).toBeLessThanOrEqual(1001 * 700);
});

test('an empty mask has no outline', () => {
  expect(outlines(new Uint8Array(100), 10, 10)).toEqual([]);
});

test('averaging down keeps area to a percent and every point in the picture', () => {
  const [width, height] = [1600, 1200];
  const mask = maskOf(
    width,
    height,
    (x, y) => y > 300 + 120 * Math.sin(x / 90) && Math.hypot(x - 900, y - 800) > 150,
  );
  const set = mask.reduce((sum, m) => sum + m, 0);
  const shapes = outlines(mask, width, height, { longSide: 256 });
  expect(Math.abs(areaOfAll(shapes) / set - 1)).toBeLessThan(0.01);
  for (const { outer, holes } of shapes)
    for (const [x, y] of [outer, ...holes].flat()) {
      expect(x >= 0 && x <= width && y >= 0 && y <= height).toBe(true);
    }
});

test('speckle is left out', () => {
  const mask = maskOf(100, 100, (x, y) => Math.hypot(x - 50, y - 50) < 20 || (x === 5.5 && y === 5.5));
  expect(outlines(mask, 100, 100)).toHaveLength(1);
  expect(outlines(mask, 100, 100, { leastCells: 0 })).toHaveLength(2);
});

test('a mask of another size is refused', () => {
  expect(() => outlines(new Uint8Array(10), 3, 3)).toThrow(RangeError);
});
