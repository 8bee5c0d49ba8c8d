import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { LEFT_OUT, leftOutOf } from '../../src/engine/leftOut.ts';
import type { Setup } from '../../src/engine/setup.ts';
import { textureMap } from '../../src/match/texture.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';
import { SCENES, type SceneName } from '../../src/scene/catalogue.ts';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { regionMask } from '../../src/scene/region.ts';
import { TRUE_KIND } from '../../src/scene/types.ts';

const WIDTH = 320;
const HEIGHT = 240;

type Paint = (x: number, y: number) => readonly [number, number, number];

/** A photo as a phone writes it: noise of 1.5 codes, JPEG of quality 90 with colour at half size. */
async function photo(paint: Paint): Promise<PhotoPixels> {
  const random = seededRandom(7);
  const codes = new Uint8Array(WIDTH * HEIGHT * 3);
  for (let i = 0; i < WIDTH * HEIGHT; i++) {
    const colour = paint(i % WIDTH, Math.floor(i / WIDTH));
    for (let c = 0; c < 3; c++)
      codes[3 * i + c] = Math.min(255, Math.max(0, Math.round(colour[c]! + 1.5 * random.normal())));
  }
  return {
    width: WIDTH,
    height: HEIGHT,
    codes: await jpeg(codes, WIDTH, HEIGHT),
    channels: 3,
    maxCode: 255,
    encoding: SRGB,
  };
}

async function jpeg(codes: Uint8Array, width: number, height: number): Promise<Uint8Array> {
  const file = await sharp(codes, { raw: { width, height, channels: 3 } })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .toBuffer();
  return new Uint8Array(await sharp(file).raw().toBuffer());
}

const share = (rough: Uint8Array) => rough.reduce((sum, v) => sum + v, 0) / rough.length;
/** Concrete on the left half: grey grains of 12 codes, three pixels wide. */
const grains = (() => {
  const random = seededRandom(3);
  return Float64Array.from({ length: WIDTH * HEIGHT }, () => random.normal());
})();
const concrete: Paint = (x, y) => {
  if (x >= WIDTH / 2) return [90, 95, 100];
  const v = 120 + 12 * grains[Math.floor(y / 3) * WIDTH + Math.floor(x / 3)]!;
  return [v, v, v];
};

describe('texture', () => {
  it('is grey grain over an area, and nothing beside it', async () => {
    const { rough, columns } = textureMap(await photo(concrete));
    let left = 0;
    let right = 0;
    rough.forEach((v, i) => {
      if (i % columns < columns / 2 - 2) left += v;
      if (i % columns >= columns / 2 + 2) right += v;
    });
    expect(left / (rough.length * (0.5 - 2 / columns))).toBeGreaterThan(0.95);
    expect(right).toBe(0);
  });

  it('is neither noise, nor an edge, nor narrow coloured fringes', async () => {
    expect(share(textureMap(await photo(() => [100, 100, 100])).rough)).toBe(0);
    expect(share(textureMap(await photo((x) => (x < 150 ? [60, 60, 60] : [150, 150, 150]))).rough)).toBe(0);
    // Fringes five pixels apart, their three colours out of step as those of a film are.
    const fringes: Paint = (x, y) => {
      const phase = (2 * Math.PI * (x + 0.4 * y)) / 5;
      return [
        110 + 40 * Math.cos(phase),
        110 + 40 * Math.cos(phase * 1.2),
        110 + 40 * Math.cos(phase * 1.45),
      ];
    };
    expect(share(textureMap(await photo(fringes)).rough)).toBeLessThan(0.005);
  });

  it('is painted in again by a finger, and by nothing else', async () => {
    const pixels = await photo(concrete);
    const at = (setup: Omit<Setup, 'film'>, x: number, y: number) =>
      leftOutOf(pixels, { film: 'diesel', ...setup })[y * WIDTH + x];
    const over = { paint: 'in' as const, points: [[40, 120] as const], widthPx: 30 };
    const beside = { paint: 'out' as const, points: [[300, 20] as const], widthPx: 10 };
    expect(at({}, 40, 120)).toBe(LEFT_OUT.texture);
    expect(at({ strokes: [beside, over] }, 40, 120)).toBe(LEFT_OUT.no);
    expect(at({ strokes: [beside, over] }, 40, 180)).toBe(LEFT_OUT.texture);
    expect(at({ strokes: [beside] }, 40, 120)).toBe(LEFT_OUT.texture);
    expect(at({}, 250, 120)).toBe(LEFT_OUT.no);
  });

  it.each<readonly [SceneName, number]>([
    ['oil-harbour', 1],
    ['oil-sheen', 1],
    ['oil-lens', 2],
    ['soap-draining', 1],
    ['soap-black-film', 2],
  ])('costs less than half a percent of the film of %s, seed %i', async (name, seed) => {
    const { width, height, ...scene } = SCENES[name]({
      width: 640,
      height: 480,
      seed,
      conditions: CONDITIONS.stated,
    });
    const codes = await jpeg(scene.codes, width, height);
    const { side, columns, rough } = textureMap({ width, height, codes, channels: 3, maxCode: 255 });
    const inRegion = regionMask(scene.setup.region, width, height);
    const film = { all: 0, lost: 0 };
    const quay = { all: 0, found: 0 };
    for (let i = 0; i < width * height; i++) {
      const x = i % width;
      const y = Math.floor(i / width);
      const isRough = rough[Math.floor(y / side) * columns + Math.floor(x / side)] ?? 0;
      if (scene.kind[i] === TRUE_KIND.film && inRegion[i] === 1) {
        film.all++;
        film.lost += isRough;
      } else if (
        name === 'oil-harbour' &&
        scene.kind[i] === TRUE_KIND.other &&
        x < 0.2 * width &&
        y > 0.35 * height
      ) {
        quay.all++;
        quay.found += isRough;
      }
    }
    expect(film.all).toBeGreaterThan(20_000);
    expect(film.lost / film.all).toBeLessThan(0.005);
    if (name === 'oil-harbour') expect(quay.found / quay.all).toBeGreaterThan(0.6);
  });
});
