import { describe, expect, it } from 'vitest';
import { SRGB } from '../../src/colour/rgb.ts';
import { SAMPLE_VARIANCE_SHARE, sampleFilm } from '../../src/match/sampleFilm.ts';
import type { PhotoPixels } from '../../src/photo/types.ts';
import { seededRandom } from '../../src/scene/random.ts';

const WIDTH = 240;
const HEIGHT = 160;

function photo(colour: (x: number, y: number, c: number) => number): PhotoPixels {
  const codes = new Uint8Array(3 * WIDTH * HEIGHT);
  for (let i = 0; i < codes.length; i++) {
    const pixel = Math.floor(i / 3);
    codes[i] = Math.max(
      0,
      Math.min(255, Math.round(colour(pixel % WIDTH, Math.floor(pixel / WIDTH), i % 3))),
    );
  }
  return { width: WIDTH, height: HEIGHT, codes, channels: 3, maxCode: 255, encoding: SRGB };
}

/** Colours that run smoothly over the photo, with noise of 3 codes. */
function smooth(noise = 3): PhotoPixels {
  const random = seededRandom('sample');
  return photo((x, y, c) => 60 + 0.4 * x + 0.3 * y + 15 * c + noise * random.normal());
}

describe('film colours for the fit', () => {
  it('are the same for the same photo', () => {
    const pixels = smooth();
    expect(sampleFilm(pixels, null, 500)).toEqual(sampleFilm(pixels, null, 500));
  });

  it('tell the noise of a pixel, and are themselves as quiet as a quadratic over 5 x 5 makes them', () => {
    // So many colours, evenly spread, that none is thinned: thinning keeps what noise threw far out, as rare.
    const random = seededRandom('quiet');
    const pixels = photo((x, y, c) => [10 + 0.95 * x, 20 + 1.3 * y, 100][c]! + 3 * random.normal());
    const sample = sampleFilm(pixels, null, 20_000);
    const variance = 9 + 1 / 12; // rounding to whole codes adds 1/12
    for (const sd of sample.pixelNoise) {
      expect(sd / Math.sqrt(variance)).toBeGreaterThan(0.93);
      expect(sd / Math.sqrt(variance)).toBeLessThan(1.07);
    }
    let square = 0;
    for (let i = 0; i < sample.count; i++) {
      square += (sample.codes[3 * i]! - 10 - 0.95 * sample.at[2 * i]!) ** 2 / sample.count;
    }
    expect(square / variance / SAMPLE_VARIANCE_SHARE).toBeGreaterThan(0.9);
    expect(square / variance / SAMPLE_VARIANCE_SHARE).toBeLessThan(1.1);
  });

  it('come from usable pixels only, with their whole surroundings', () => {
    const usable = new Uint8Array(WIDTH * HEIGHT);
    for (let y = 40; y < 120; y++) usable.fill(1, y * WIDTH + 60, y * WIDTH + 180);
    const sample = sampleFilm(smooth(), usable, 300);
    expect(sample.count).toBeGreaterThan(100);
    for (let i = 0; i < sample.count; i++) {
      expect(sample.at[2 * i]!).toBeGreaterThanOrEqual(62);
      expect(sample.at[2 * i]!).toBeLessThan(178);
      expect(sample.at[2 * i + 1]!).toBeGreaterThanOrEqual(42);
      expect(sample.at[2 * i + 1]!).toBeLessThan(118);
    }
  });

  it('leave out texture, edges and clipped light', () => {
    const random = seededRandom('texture');
    const pixels = photo((x, _, c) => {
      // Texture is the smaller part: the noise of a photo is judged by the median of its surroundings.
      if (x < 140) return 80 + 10 * c + 2 * random.normal();
      if (x < 180) return 120 + 40 * random.normal();
      return 255;
    });
    const sample = sampleFilm(pixels, null, 400);
    expect(sample.count).toBeGreaterThan(30);
    for (let i = 0; i < sample.count; i++) expect(sample.at[2 * i]!).toBeLessThan(140);
  });

  it('give rare colours their say: a strip of a twentieth of the photo is far more of the sample', () => {
    const random = seededRandom('rare');
    const pixels = photo((x, y, c) => (y < 8 ? 60 + 0.6 * x + 20 * c : 150 + 5 * c) + random.normal());
    const sample = sampleFilm(pixels, null, 400);
    let rare = 0;
    for (let i = 0; i < sample.count; i++) if (sample.at[2 * i + 1]! < 8) rare++;
    expect(rare / sample.count).toBeGreaterThan(3 / 20);
  });

  it('are none where nothing is usable', () => {
    expect(sampleFilm(smooth(), new Uint8Array(WIDTH * HEIGHT), 100).count).toBe(0);
  });
});
