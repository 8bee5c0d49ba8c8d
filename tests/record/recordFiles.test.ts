import { expect, test } from 'vitest';
import { PIXEL_STATUS } from '../../src/match/types.ts';
import { writeGeoJson } from '../../src/record/geojson.ts';
import { readObservation } from '../../src/record/readObservation.ts';
import { mapOf, recordFiles, safeName } from '../../src/record/recordFiles.ts';
import { slickFeatures } from '../../src/record/slickFeatures.ts';
import { nodeSha256, originalBytes, quayObservation } from './sample.ts';

const [width, height] = [60, 40];
const pixels = width * height;
const inDisc = (i: number) => Math.hypot((i % width) - 30, Math.floor(i / width) - 20) < 15;
const map = {
  width,
  height,
  thicknessNm: Float32Array.from({ length: pixels }, (_, i) =>
    inDisc(i) ? (i % width < 30 ? 150 : 450) : 0,
  ),
  lowNm: Float32Array.from({ length: pixels }, (_, i) => (inDisc(i) ? 100 : Number.NaN)),
  highNm: Float32Array.from({ length: pixels }, (_, i) => i / 7),
  order: Uint8Array.from({ length: pixels }, (_, i) => (inDisc(i) ? 1 : 0)),
  status: Uint8Array.from({ length: pixels }, (_, i) =>
    inDisc(i) ? PIXEL_STATUS.measured : PIXEL_STATUS.bare,
  ),
};

test('a map comes back bit for bit from its files, and the list is fit for an observation', async () => {
  const original = { fileName: 'C:\\fakepath\\IMG 1.jpg', mediaType: 'image/jpeg', bytes: originalBytes };
  const { listed, files } = await recordFiles({ original, map }, nodeSha256);
  expect(mapOf(listed, files)).toEqual(map);
  expect(listed[0]).toMatchObject({ path: 'original/IMG 1.jpg', role: 'original', byteLength: 5000 });
  expect(files.get('original/IMG 1.jpg')).toBe(originalBytes);
  expect(readObservation({ ...quayObservation(), files: listed }).files).toEqual(listed);
});

test('no map, no layers; a lost layer is named', async () => {
  expect(mapOf([], new Map())).toBeNull();
  const { listed, files } = await recordFiles({ map }, nodeSha256);
  const without = new Map(files);
  without.delete('results/order.tif');
  expect(() => mapOf(listed, without)).toThrow('lacks its layer "order"');
});

test.each([
  ['a/b/c.jpg', 'c.jpg'],
  ['..', 'photo'],
  ['', 'photo'],
  ['x\u0000y\n.png', 'xy.png'],
])('%j becomes %j', (given, name) => {
  expect(safeName(given)).toBe(name);
});

test('a slick has an outline, its codes and the camera; areas are the pixels’ own', () => {
  const areaM2 = new Float32Array(pixels).fill(0.25);
  const toPosition = (x: number, y: number) => [10 + x * 1e-6, 50 - y * 1e-6] as const;
  const features = slickFeatures({ map, areaM2, toPosition }, [10, 50], { utc: '2025-05-14T11:32:07Z' });
  expect(features.map(({ id }) => id)).toEqual(['slick', 'code-1', 'code-2', 'camera']);
  const count = map.status.filter((s) => s === PIXEL_STATUS.measured).length;
  expect(features[0]?.properties).toMatchObject({ areaM2: 0.25 * count, utc: '2025-05-14T11:32:07Z' });
  expect((features[1]?.properties.areaM2 as number) + (features[2]?.properties.areaM2 as number)).toBe(
    0.25 * count,
  );
  const { features: written } = JSON.parse(writeGeoJson(features));
  expect(written.every(({ geometry }: { geometry: unknown }) => geometry)).toBe(true);
  // Of a picture of which nothing lies on the water, nothing is drawn.
  const none = JSON.parse(writeGeoJson(slickFeatures({ map, areaM2, toPosition: () => null }, null)));
  expect(none.features.map(({ geometry }: { geometry: unknown }) => geometry)).toEqual([
    null,
    null,
    null,
    null,
  ]);
});
