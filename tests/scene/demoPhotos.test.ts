import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { decode } from 'fast-png';
import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { decodePhotoFile } from '../../src/cli/decodePhoto.ts';
import { quantileOfSorted } from '../../src/cli/validate/statistics.ts';
import { parseSetup } from '../../src/engine/parseSetup.ts';
import { DEMO_SIZE, demoHarbour, demoSoapFilm } from '../../src/scene/demoScenes.ts';
import { NO_TRUTH, TRUTH_CODES_PER_NM, thinOutTruth } from '../../src/scene/truthPicture.ts';
import { TRUE_KIND } from '../../src/scene/types.ts';

const path = (relative: string) => fileURLToPath(new URL(`../../${relative}`, import.meta.url));
const SMALL = { width: DEMO_SIZE.width / 8, height: DEMO_SIZE.height / 8 };

/**
 * Rendering in full takes half a minute a photo, so the photos are held against a rendering at an eighth of the size: the
 * same draws, the same scene, other pixels. Made anew by `npx tsx src/cli/makeDemoPhotos.ts`.
 */
describe.each([
  ['harbour', demoHarbour],
  ['soap-film', demoSoapFilm],
] as const)('demo photo %s', (name, make) => {
  const scene = make(SMALL);
  const file = path(`public/demo/${name}.jpg`);

  it('shows what the forward model renders today', async () => {
    const shrunk = await sharp(file)
      .resize({ width: SMALL.width, height: SMALL.height, kernel: 'linear' })
      .removeAlpha()
      .raw()
      .toBuffer();
    const off = Float64Array.from(shrunk, (code, i) => Math.abs(code - scene.codes[i]!)).sort();
    // Noise of 2 codes in the small rendering and next to none in the shrunk photo: half of the pixels within 2 codes.
    expect(quantileOfSorted(off, 0.5)).toBeLessThanOrEqual(2);
    expect(quantileOfSorted(off, 0.9)).toBeLessThanOrEqual(12);
  });

  it('has its true thickness on file', () => {
    const png = decode(readFileSync(path(`tests/scene/data/${name}-truth.png`)));
    expect([png.width, png.height, png.depth, png.channels]).toEqual([SMALL.width, SMALL.height, 16, 1]);
    const now = thinOutTruth(scene, 1);
    const off: number[] = [];
    let [one, both] = [0, 0];
    png.data.forEach((code, i) => {
      const here = code !== NO_TRUTH;
      const there = now.data[i] !== NO_TRUTH;
      one += here || there ? 1 : 0;
      if (here && there) {
        both++;
        off.push(Math.abs(code - now.data[i]!) / TRUTH_CODES_PER_NM);
      }
    });
    off.sort((a, b) => a - b);
    // Half a full-size pixel apart, on slopes of some nanometres a pixel; the outlines differ by a pixel of the small one.
    expect(quantileOfSorted(off, 0.5)).toBeLessThan(1.5);
    expect(quantileOfSorted(off, 0.9)).toBeLessThan(15);
    expect(both / one).toBeGreaterThan(0.9);
  });

  it('comes with a set-up that the reader accepts, its marks inside the picture', () => {
    const text = readFileSync(path(`public/demo/${name}.setup.json`), 'utf8');
    const setup = parseSetup(JSON.parse(text));
    for (const [x, y] of setup.region ?? []) {
      expect(x).toBeGreaterThanOrEqual(0);
      expect(y).toBeGreaterThanOrEqual(0);
      expect(x).toBeLessThanOrEqual(DEMO_SIZE.width);
      expect(y).toBeLessThanOrEqual(DEMO_SIZE.height);
    }
    expect(setup.region?.length).toBeGreaterThanOrEqual(4);
    // The mark lies on what it says: bare water, or the grey card beside the film.
    const [x, y, w, h] = (setup.references?.clean ?? setup.references?.white)!;
    for (const [px, py] of [
      [x, y],
      [x + w, y],
      [x, y + h],
      [x + w, y + h],
    ] as const) {
      const at = Math.floor(py / 8) * SMALL.width + Math.floor(px / 8);
      expect(scene.kind[at]).toBe(setup.references?.clean ? TRUE_KIND.bare : TRUE_KIND.other);
    }
  });

  it('says when, where and with what lens it was taken', async () => {
    const { pixels, metadata } = await decodePhotoFile(file);
    expect([pixels.width, pixels.height]).toEqual([DEMO_SIZE.width, DEMO_SIZE.height]);
    expect(metadata.takenAt).toMatch(/^2025-05-1\dT\d\d:\d\d:\d\d-01:00$/);
    expect(metadata.takenAtHasOffset).toBe(true);
    expect(metadata.focalLength35mm).toBe(26);
    expect(metadata.position?.latitudeDeg).toBeCloseTo(47.251, 4);
    expect(metadata.position?.longitudeDeg).toBeCloseTo(-21.403, 4);
    expect(metadata.headingReference).toBe('true');
    expect(metadata.byteLength).toBeLessThan(400_000);
  });
});
