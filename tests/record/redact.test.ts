import { expect, test } from 'vitest';
import { readArchive, writeArchive } from '../../src/record/archive.ts';
import { archiveExports } from '../../src/record/archiveExports.ts';
import { writeObservation } from '../../src/record/readObservation.ts';
import { readTiff } from '../../src/record/readTiff.ts';
import { withoutPosition } from '../../src/record/redact.ts';
import { originalBytes, PLACE, quayObservation, sampleFiles, nodeSha256 as sha256 } from './sample.ts';

const content = () => ({
  observation: {
    ...quayObservation(),
    // Later set-ups carry the position too.
    setup: { ...quayObservation().setup!, position: PLACE },
  },
  files: sampleFiles(),
});

/** The position as text and as doubles, to the tenth of a degree. */
function holdsPlace(bytes: Uint8Array): boolean {
  if (/47\.25|21\.40/.test(Buffer.from(bytes).toString('latin1'))) return true;
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  for (let i = 0; i + 8 <= bytes.length; i++) {
    const value = Math.abs(view.getFloat64(i, true));
    if (Math.abs(value - 47.251) < 0.1 || Math.abs(value - 21.403) < 0.1) return true;
  }
  return false;
}

test('the position is found before and nowhere after, in the record and in every file', async () => {
  const before = content();
  expect(holdsPlace(new TextEncoder().encode(writeObservation(before.observation)))).toBe(true);
  expect([...before.files].filter(([, bytes]) => holdsPlace(bytes)).map(([path]) => path)).toEqual([
    'results/thickness_geo.tif',
    'results/observation.geojson',
  ]);
  const { observation, files } = await withoutPosition(before, { keepOriginal: false, sha256 });
  const text = writeObservation(observation);
  expect(holdsPlace(new TextEncoder().encode(text))).toBe(false);
  for (const bytes of files.values()) expect(holdsPlace(bytes)).toBe(false);
  expect(text).not.toMatch(/Inner quay|azimuthDeg|elevationDeg|altitudeM/);
});

test('report, table and message hold the position before, and not after', async () => {
  const before = content();
  const holdsPlaceWords = (text: string) => /47\.25|21\.40|47 degrees|21 degrees|Inner quay/.test(text);
  expect([...archiveExports(before.observation).values()].map(holdsPlaceWords)).toEqual([true, true, true]);
  const { observation } = await withoutPosition(before, { keepOriginal: false, sha256 });
  expect([...archiveExports(observation).values()].map(holdsPlaceWords)).toEqual([false, false, false]);
});

test('the original is left out, its hash stays, and both are said', async () => {
  const { observation, files, notices } = await withoutPosition(content(), { keepOriginal: false, sha256 });
  expect([...files.keys()].some((path) => path.startsWith('original/'))).toBe(false);
  expect(observation.files.some(({ role }) => role === 'original')).toBe(false);
  expect(observation.photo?.metadata.sha256).toBe(await sha256(originalBytes));
  expect(observation.leftOut).toEqual(['position', 'original']);
  expect(observation.notKnown).toContain('The position: it was left out on purpose.');
  expect(observation.notKnown).toContain('The original photo: it was left out on purpose.');
  expect(notices[0]).toContain('SHA-256 stays');
});

test('kept on purpose, the original keeps its bytes, and the notice says what it holds', async () => {
  const { files, notices, observation } = await withoutPosition(content(), { keepOriginal: true, sha256 });
  expect(files.get('original/Quay 1 "north".jpg')).toEqual(originalBytes);
  expect(observation.leftOut).toEqual(['position']);
  expect(notices[0]).toBe('The original photo is included and holds the position in its own data.');
});

test('what is measured stays: the ground map keeps its metres, the outlines their properties', async () => {
  const { files } = await withoutPosition(content(), { keepOriginal: false, sha256 });
  const before = readTiff(sampleFiles().get('results/thickness_geo.tif')!);
  expect(readTiff(files.get('results/thickness_geo.tif')!)).toEqual(before);
  const { features } = JSON.parse(new TextDecoder().decode(files.get('results/observation.geojson')));
  expect(features).toEqual([
    { type: 'Feature', geometry: null, properties: { kind: 'slick', areaM2: 415 } },
    { type: 'Feature', geometry: null, properties: { kind: 'camera' } },
  ]);
});

test('it exports and imports as any other, and a second time changes nothing', async () => {
  const once = await withoutPosition(content(), { keepOriginal: false, sha256 });
  const zip = Buffer.concat(await writeArchive(once, { sha256 }));
  const back = await readArchive(zip, sha256);
  expect(back.observation).toEqual(once.observation);
  const twice = await withoutPosition(back, { keepOriginal: false, sha256 });
  expect(writeObservation(twice.observation)).toBe(writeObservation(once.observation));
});

test('the observation at hand is not changed', async () => {
  const before = content();
  const text = writeObservation(before.observation);
  await withoutPosition(before, { keepOriginal: false, sha256 });
  expect(writeObservation(before.observation)).toBe(text);
  expect(before.files.size).toBe(5);
});
