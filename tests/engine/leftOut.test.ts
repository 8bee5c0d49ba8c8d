import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { LEFT_OUT, leftOutOf, paintedOutside } from '../../src/engine/leftOut.ts';
import type { Point, Setup, Stroke } from '../../src/engine/setup.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';

const WIDTH = 120;
const HEIGHT = 90;

function photo(paint: (x: number, y: number) => number = () => 100): PhotoPixels {
  const codes = new Uint8Array(WIDTH * HEIGHT * 3);
  for (let i = 0; i < WIDTH * HEIGHT; i++) codes.fill(paint(i % WIDTH, (i / WIDTH) | 0), 3 * i, 3 * i + 3);
  return { width: WIDTH, height: HEIGHT, codes, channels: 3, maxCode: 255 } as unknown as PhotoPixels;
}

const inside = (setup: Pick<Setup, 'region' | 'strokes'>) =>
  [...paintedOutside(WIDTH, HEIGHT, setup)].filter((v) => v === LEFT_OUT.no).length;
const at = (out: Uint8Array, x: number, y: number) => out[y * WIDTH + x];
const stroke = (paint: Stroke['paint'], widthPx: number, ...points: Point[]): Stroke => ({
  paint,
  widthPx,
  points,
});

/** Coverage 0..255 of a shape as librsvg (through sharp) draws it, black on nothing: the outside opinion. */
async function drawn(shape: string): Promise<Uint8Array> {
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="${WIDTH}" height="${HEIGHT}">${shape}</svg>`;
  const { data } = await sharp(Buffer.from(svg))
    .extractChannel('alpha')
    .raw()
    .toBuffer({ resolveWithObject: true });
  return data;
}

/** Pixels that are clearly in or out (drawn by more than 7/8 or less than 1/8) and yet judged the other way. */
function wrong(out: Uint8Array, coverage: Uint8Array): number {
  expect(coverage.length).toBe(out.length);
  let count = 0;
  for (let i = 0; i < out.length; i++) {
    const isIn = out[i] === LEFT_OUT.no;
    if ((coverage[i]! > 224 && !isIn) || (coverage[i]! < 32 && isIn)) count++;
  }
  return count;
}

const path = (points: readonly Point[]) => points.map(([x, y]) => `${x},${y}`).join(' ');

describe('the region', () => {
  it('holds the pixels that an SVG renderer fills, even-odd', async () => {
    // Concave, and it crosses itself.
    const region: Point[] = [
      [10.2, 5.1],
      [100.7, 20.3],
      [60.4, 41.9],
      [110.8, 80.6],
      [30.1, 85.7],
      [90.3, 60.2],
    ];
    const coverage = await drawn(`<polygon points="${path(region)}" fill-rule="evenodd"/>`);
    expect(inside({ region })).toBeGreaterThan(2000);
    expect(wrong(paintedOutside(WIDTH, HEIGHT, { region }), coverage)).toBe(0);
  });

  it('may reach past the edges of the photo', () => {
    const region: Point[] = [
      [-50, -50],
      [60, -50],
      [60, 500],
      [-50, 500],
    ];
    expect(inside({ region })).toBe(60 * HEIGHT);
  });
});

describe('strokes', () => {
  it('cover the pixels that an SVG renderer draws with round ends and joins', async () => {
    const points: Point[] = [
      [12.3, 20.1],
      [60.8, 18.4],
      [58.2, 70.9],
      [20.5, 50.5],
      [20.5, 75.2],
    ];
    const coverage = await drawn(
      `<polyline points="${path(points)}" fill="none" stroke="#000" stroke-width="13" stroke-linecap="round" stroke-linejoin="round"/>`,
    );
    const strokes = [stroke('in', 13, ...points)];
    expect(inside({ strokes })).toBeGreaterThan(1500);
    expect(wrong(paintedOutside(WIDTH, HEIGHT, { strokes }), coverage)).toBe(0);
  });

  it('cover what lies within half their width of their line: area by the closed form of a capsule', () => {
    const radius = 15;
    const strokes = [stroke('in', 2 * radius, [30.3, 29.6], [80.9, 54.7])];
    // Not a slope of small whole numbers: there the pixels' centres would fall in line with the edge.
    const length = Math.hypot(50.6, 25.1);
    const area = Math.PI * radius ** 2 + 2 * radius * length;
    // A boundary of about 210 pixels decided at pixel centres errs by far less than one pixel in ten.
    expect(Math.abs(inside({ strokes }) - area)).toBeLessThan(12);
    const out = paintedOutside(WIDTH, HEIGHT, { strokes });
    for (const [x, y, isIn] of [
      [30, 30, true],
      [55, 42, true],
      [30, 16, true],
      [30, 14, false],
      [94, 55, true],
      [96, 55, false],
    ] as const)
      expect(at(out, x, y) === LEFT_OUT.no, `${x}, ${y}`).toBe(isIn);
  });

  it('are a dot where a finger only touches, and level or upright lines as well', () => {
    expect(Math.abs(inside({ strokes: [stroke('in', 40, [60, 45])] }) - Math.PI * 400)).toBeLessThan(15);
    const level = inside({ strokes: [stroke('in', 10, [40, 45], [80, 45])] });
    const upright = inside({ strokes: [stroke('in', 10, [60, 25], [60, 65])] });
    expect(Math.abs(level - (400 + Math.PI * 25))).toBeLessThan(8);
    expect(upright).toBe(level);
  });

  it('lie later over earlier, and over the region', () => {
    const region: Point[] = [
      [0, 0],
      [60, 0],
      [60, 90],
      [0, 90],
    ];
    const out = stroke('out', 20, [30, 20], [30, 70]);
    const back = stroke('in', 10, [30, 45]);
    const beyond = stroke('in', 10, [100, 45]);
    const painted = paintedOutside(WIDTH, HEIGHT, { region, strokes: [out, back, beyond] });
    expect(at(painted, 30, 25)).toBe(LEFT_OUT.outsideRegion);
    expect(at(painted, 30, 45)).toBe(LEFT_OUT.no);
    expect(at(painted, 100, 45)).toBe(LEFT_OUT.no);
    expect(at(painted, 100, 60)).toBe(LEFT_OUT.outsideRegion);
    const otherWay = paintedOutside(WIDTH, HEIGHT, { region, strokes: [back, out] });
    expect(at(otherWay, 30, 45)).toBe(LEFT_OUT.outsideRegion);
  });

  it('begin with nothing where the first paints in, with the whole photo where it paints out', () => {
    expect(inside({ strokes: [stroke('out', 10, [60, 45])] })).toBeGreaterThan(WIDTH * HEIGHT - 100);
    expect(inside({ strokes: [stroke('in', 10, [60, 45])] })).toBeLessThan(100);
    expect(inside({})).toBe(WIDTH * HEIGHT);
  });
});

describe('what takes no part', () => {
  it('is clipped pixels and the card, also where they are painted in', () => {
    const pixels = photo((x) => (x < 10 ? 255 : 100));
    const setup: Setup = {
      film: 'soap',
      references: { white: [50, 10, 20, 20] },
      strokes: [stroke('in', 300, [60, 45])],
    };
    const out = leftOutOf(pixels, setup);
    expect(at(out, 5, 45)).toBe(LEFT_OUT.noColour);
    expect(at(out, 60, 15)).toBe(LEFT_OUT.noColour);
    expect(at(out, 60, 45)).toBe(LEFT_OUT.no);
    const cut = leftOutOf(pixels, { ...setup, strokes: [stroke('out', 300, [60, 45])] });
    expect(cut.every((v) => v === LEFT_OUT.outsideRegion)).toBe(true);
  });
});
