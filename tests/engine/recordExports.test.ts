import area from '@turf/area';
import { expect, test } from 'vitest';
import { groundOf } from '../../src/engine/groundFiles.ts';
import { fileStem, recordGeoJson, recordGeoTiff, rowsCsv } from '../../src/engine/recordExports.ts';
import { pictureOf, topOf } from '../../src/engine/recordPicture.ts';
import type { Setup } from '../../src/engine/setup.ts';
import { PIXEL_STATUS, type ThicknessMap } from '../../src/match/types.ts';
import { readTiff } from '../../src/record/readTiff.ts';
import { recordFiles } from '../../src/record/recordFiles.ts';
import { withoutPosition } from '../../src/record/redact.ts';
import { nodeSha256, originalBytes, PLACE, quayObservation } from '../record/sample.ts';

const [width, height] = [160, 120];
const pixels = width * height;

function mapOfDisc(holds: (x: number, y: number) => boolean): ThicknessMap {
  const inDisc = (i: number) => holds((i % width) + 0.5, Math.floor(i / width) + 0.5);
  const of = <T>(make: (i: number) => T) => ({ length: pixels, make });
  const floats = ({ make }: ReturnType<typeof of<number>>) =>
    Float32Array.from({ length: pixels }, (_, i) => make(i));
  return {
    width,
    height,
    thicknessNm: floats(of((i) => (inDisc(i) ? 200 : 0))),
    lowNm: floats(of((i) => (inDisc(i) ? 180 : 0))),
    highNm: floats(of((i) => (inDisc(i) ? 220 : 20))),
    order: new Uint8Array(pixels).fill(1),
    status: Uint8Array.from({ length: pixels }, (_, i) =>
      inDisc(i) ? PIXEL_STATUS.measured : PIXEL_STATUS.bare,
    ),
  };
}

async function contentFor(map: ThicknessMap, view: Setup['view'], headingDeg: number) {
  const original = { fileName: 'a.jpg', mediaType: 'image/jpeg', bytes: originalBytes };
  const { listed, files } = await recordFiles({ original, map }, nodeSha256);
  const sample = quayObservation();
  const observation = {
    ...sample,
    viewpoint: { ...sample.viewpoint, headingDeg: { value: headingDeg, source: 'typed' as const } },
    setup: { film: 'diesel' as const, ...(view && { view }) },
    files: listed,
  };
  return { observation, files };
}

interface Collection {
  readonly features: readonly {
    readonly id: string;
    readonly geometry: { readonly type: string; readonly coordinates: number[][][][] } | null;
    readonly properties: { readonly areaM2: number };
  }[];
}
const parsed = (text: string) => JSON.parse(text) as Collection;

test('seen straight down, a disc of 4 m keeps its area and its place on the globe (@turf/area)', async () => {
  // A tenth of a metre a pixel; the disc's middle lies 3 m right of the camera's foot.
  const content = await contentFor(
    mapOfDisc((x, y) => Math.hypot(x - 110, y - 60) < 40),
    { pixelSizeM: 0.1 },
    90,
  );
  const { features } = parsed(recordGeoJson(content));
  const slick = features.find(({ id }) => id === 'slick')!;
  // turf takes a sphere of 6378137 m, from which the ellipsoid differs by up to 0.5 % here; an outline of 80 cells adds up to 1 %.
  expect(Math.abs(area(slick as never) / (Math.PI * 16) - 1)).toBeLessThan(0.015);
  expect(Math.abs(slick.properties.areaM2 / (Math.PI * 16) - 1)).toBeLessThan(0.005);
  // Looking east, what is to the right lies south: 3 m are 2.7e-5 degrees of latitude.
  const latitudes = slick.geometry!.coordinates[0]![0]!.map(([, latitude]) => latitude!);
  const middle = (Math.min(...latitudes) + Math.max(...latitudes)) / 2;
  expect(Math.abs((PLACE.latitudeDeg - middle) * 111_180 - 3)).toBeLessThan(0.1);
});

test('seen at a slant, a disc on the water keeps its area in the outline and on the grid', async () => {
  const view = { heightM: 5, focal35mm: 26, pitchDeg: -45, rollDeg: 2 };
  const setup: Setup = { film: 'diesel', view };
  const empty = mapOfDisc(() => false);
  const ground = groundOf({ map: empty, setup, position: null, headingDeg: null })!;
  const onDisc = (x: number, y: number) => {
    const place = ground.mapping.groundOf(x, y);
    return place !== null && Math.hypot(place[0] - 0.5, place[1] - 5) < 1.5;
  };
  const content = await contentFor(mapOfDisc(onDisc), view, 30);
  const truth = Math.PI * 1.5 ** 2;
  const slick = parsed(recordGeoJson(content)).features.find(({ id }) => id === 'slick')!;
  expect(Math.abs(area(slick as never) / truth - 1)).toBeLessThan(0.03);
  const { values, ground: placed } = readTiff(recordGeoTiff(content));
  const cells = values.filter((nm) => nm > 100).length;
  expect(Math.abs((cells * placed!.pixelM ** 2) / truth - 1)).toBeLessThan(0.05);
});

test('without its position a record gives no coordinates, and the areas stay', async () => {
  const content = await contentFor(
    mapOfDisc((x, y) => Math.hypot(x - 80, y - 60) < 40),
    { pixelSizeM: 0.1 },
    0,
  );
  const redacted = await withoutPosition(content, { keepOriginal: false, sha256: nodeSha256 });
  const { features } = parsed(recordGeoJson(redacted));
  expect(features.every(({ geometry }) => geometry === null)).toBe(true);
  expect(features.find(({ id }) => id === 'slick')!.properties.areaM2).toBeGreaterThan(50);
  const bytes = Buffer.from(recordGeoTiff(redacted)).toString('latin1');
  expect(bytes).toContain('Local ground grid');
});

test('without a scale the sentence says what to do', async () => {
  const content = await contentFor(
    mapOfDisc(() => true),
    undefined,
    0,
  );
  expect(() => recordGeoJson(content)).toThrow('give the height of the camera');
  expect(() => rowsCsv({ ...content, observation: { ...content.observation, files: [] } })).toThrow(
    'measure its photo',
  );
  expect(rowsCsv(content).split('\r\n')).toHaveLength(height + 2);
});

test('a picture says the top of its ramp; names are fit for files', () => {
  const png = pictureOf(mapOfDisc((x) => x < 30));
  expect(topOf(png)).toBe(200);
  expect(fileStem(quayObservation())).toBe('Sheen-at-the-inner-quay-north-end');
});
