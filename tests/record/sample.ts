/** Observations of an invented harbour and an invented bench, for the tests. */
import { createHash } from 'node:crypto';
import { encodeByteTiff, encodeFloatTiff } from '../../src/record/floatTiff.ts';
import { writeGeoJson } from '../../src/record/geojson.ts';
import { notKnown } from '../../src/record/notKnown.ts';
import {
  OBSERVATION_KIND,
  type Observation,
  type RecordedFile,
  SCHEMA_VERSION,
} from '../../src/record/observation.ts';
import { recordResult } from '../../src/record/recordResult.ts';
import { volumeByCode } from '../../src/tally/appearanceCode.ts';
import { weighLookAlikes } from '../../src/tally/lookAlikes.ts';
import { DEFAULT_VOLUME_INPUTS } from '../../src/tally/volumeByThickness.ts';

export const nodeSha256 = async (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');
const shaOf = (bytes: Uint8Array) => createHash('sha256').update(bytes).digest('hex');

export const PLACE = { latitudeDeg: 47.251, longitudeDeg: -21.403 };

/** Not a photo: bytes of every value, which must come back as they are. */
export const originalBytes = Uint8Array.from({ length: 5000 }, (_, i) => (i * i + (i >> 3)) & 255);

const [width, height] = [40, 30];

export function sampleFiles(): Map<string, Uint8Array> {
  const thickness = Float32Array.from({ length: width * height }, (_, i) =>
    i % 11 === 0 ? Number.NaN : 200 + (i % 90),
  );
  const order = Uint8Array.from({ length: width * height }, (_, i) => (i % 11 === 0 ? 255 : 1));
  const { latitudeDeg, longitudeDeg } = PLACE;
  const outline = [
    [longitudeDeg, latitudeDeg],
    [longitudeDeg + 1e-4, latitudeDeg],
    [longitudeDeg + 1e-4, latitudeDeg + 1e-4],
  ] as const;
  return new Map<string, Uint8Array>([
    ['original/Quay 1 "north".jpg', originalBytes],
    [
      'results/thickness_nm.tif',
      encodeFloatTiff({ width, height, values: thickness, compression: 'deflate' }),
    ],
    ['results/order.tif', encodeByteTiff({ width, height, values: order })],
    [
      'results/thickness_geo.tif',
      encodeFloatTiff({
        width,
        height,
        values: thickness,
        geo: { system: { kind: 'aboutPoint', ...PLACE }, westM: -8, northM: 12, pixelM: 0.2 },
      }),
    ],
    [
      'results/observation.geojson',
      new TextEncoder().encode(
        writeGeoJson([
          {
            properties: { kind: 'slick', areaM2: 415 },
            shape: { polygons: [{ outer: outline, holes: [] }] },
          },
          { properties: { kind: 'camera' }, shape: { point: [longitudeDeg, latitudeDeg] } },
        ]),
      ),
    ],
  ]);
}

const ROLES = {
  'original/Quay 1 "north".jpg': ['original', 'image/jpeg'],
  'results/thickness_nm.tif': ['thicknessNm', 'image/tiff'],
  'results/order.tif': ['order', 'image/tiff'],
  'results/thickness_geo.tif': ['groundThicknessNm', 'image/tiff'],
  'results/observation.geojson': ['outlines', 'application/geo+json'],
} as const;

export function filesOf(files: ReadonlyMap<string, Uint8Array>): RecordedFile[] {
  return [...files].map(([path, bytes]) => {
    const [role, mediaType] = ROLES[path as keyof typeof ROLES];
    return { path, role, mediaType, byteLength: bytes.length, sha256: shaOf(bytes) };
  });
}

const answers = { closesAgain: 'yes', colourBands: 'yes', fuelSmellNoticed: 'unknown' } as const;

/** A responder's observation from a quay, with everything known but a few things. */
export function quayObservation(): Observation {
  const shares = [0.7, 0.3, 0, 0, 0] as const;
  const { conclusion, reason } = weighLookAlikes(answers);
  const observation: Observation = {
    kind: OBSERVATION_KIND,
    schemaVersion: SCHEMA_VERSION,
    id: '3f1c2a7e-0000-4000-8000-000000000001',
    title: 'Sheen at the inner quay, "north" end',
    createdUtc: '2025-05-14T11:40:00Z',
    changedUtc: '2025-05-14T11:45:30.5Z',
    madeWith: { app: '0.1.0', model: '1' },
    observer: { role: 'harbour watch', organisation: 'Port of Ambrel', incident: 'AM-2025-007' },
    time: {
      utc: '2025-05-14T11:32:07Z',
      recorded: '2025-05-14T10:32:07-01:00',
      offset: '-01:00',
      source: 'exif',
      offsetSource: 'exif',
    },
    position: { ...PLACE, errorM: 6, source: 'exif' },
    placeName: 'Inner quay',
    viewpoint: {
      from: 'shore',
      heightM: { value: 3.2, source: 'typed' },
      headingDeg: { value: 214.5, source: 'exif' },
      headingReference: 'true',
      pitchDeg: { value: -37.5, source: 'photo' },
      rollDeg: { value: 1.25, source: 'photo' },
      focalLength35mm: { value: 26, source: 'exif' },
    },
    conditions: {
      windMS: 3,
      windFromDeg: 240,
      seaState: 1,
      sky: 'overcast',
      sun: { value: { elevationDeg: 52.1, azimuthDeg: 141.7 }, source: 'computed' },
      polariser: 'off',
      waterRemarks: 'greenish, a little foam',
    },
    substance: { name: 'diesel', howKnown: 'label of a drum on the quay' },
    slickByEye: null,
    lookAlikes: { answers, conclusion, reason },
    photo: {
      metadata: {
        fileName: 'Quay 1 "north".jpg',
        mimeType: 'image/jpeg',
        byteLength: originalBytes.length,
        sha256: shaOf(originalBytes),
        originalWidth: width,
        originalHeight: height,
        takenAt: '2025-05-14T10:32:07-01:00',
        takenAtHasOffset: true,
        position: PLACE,
        altitudeM: 4,
        headingDeg: 214.5,
        headingReference: 'true',
        focalLength35mm: 26,
        whiteBalance: 'auto',
        cameraMake: 'Invented Optics',
        cameraModel: 'Field Two',
        profileName: 'sRGB',
      },
      measuredWidth: width,
      measuredHeight: height,
    },
    setup: {
      film: 'diesel',
      light: { daylightK: 6800 },
      camera: 'phone',
      references: { clean: [30, 2, 6, 6] },
      region: [
        [0, 5],
        [39, 5],
        [39, 29],
        [0, 29],
      ],
      pins: [{ at: [12, 9], is: 'bare' }],
    },
    result: recordResult({
      summary: {
        calibrated: true,
        counts: {
          total: 1200,
          inRegion: 1000,
          measured: 700,
          bare: 200,
          ambiguous: 40,
          atLeast: 20,
          noFilmColour: 40,
        },
        quantilesNm: { p05: 0, p25: 120.25, p50: 210.5, p75: 260.125, p95: 288 },
        resolvableNm: { fromNm: 60, toNm: 870 },
        fit: {
          determined: 'well',
          spanNm: [40, 900],
          residualCodes: 1.75,
          parameters: [{ name: 'gain red', value: 1.02, sd: 0.004, priorSd: 0.1 }],
          advice: 'This photo’s film spans 40 to 900 nm: the camera could be fitted well.',
        },
        notices: [],
        timingsMs: { fit: 310.5, map: 120 },
      },
      area: {
        regionM2: 640,
        oiledM2: 415,
        bareM2: 200,
        unreadM2: 25,
        atLeastM2: 11,
        ambiguousM2: 21,
        excludedPixels: 120,
        coverage: 0.675,
        coverageLeast: 0.648,
        coverageMost: 0.688,
        histogram: { stepNm: 10, areaM2: new Float64Array(3) },
      },
      byThickness: {
        volumeM3: { least: 6.1e-5, best: 8.4e-5, most: 1.15e-4 },
        oiledM2: { least: 371, best: 415, most: 466 },
        atLeast: true,
        atLeastM3: 9e-6,
        atLeastShare: 0.027,
        ambiguousShare: 0.05,
        meanThicknessNm: 202.4,
        inputs: DEFAULT_VOLUME_INPUTS,
      },
      byCode: volumeByCode(415, shares),
      comparison: {
        thicknessFactor: 1.9,
        codeFactor: 10,
        overlap: true,
        reasons: [{ code: 'compare-at-least', text: '3 % of the oiled area is past what colour can tell.' }],
      },
      notices: [
        { code: 'view-beyond-60', text: 'Part of the region is seen at more than 60° from the vertical.' },
      ],
    }),
    toldTo: [],
    remarks: 'Seen again at 12:10, "smaller".\nNo wildlife.',
    notKnown: [],
    leftOut: [],
    files: filesOf(sampleFiles()),
  };
  return { ...observation, notKnown: notKnown(observation) };
}

/** Nothing but a notebook: no photo, no place, no result by thickness. */
export function notebookObservation(): Observation {
  const observation: Observation = {
    ...quayObservation(),
    id: '3f1c2a7e-0000-4000-8000-000000000002',
    title: 'Slick off the point',
    time: null,
    position: null,
    viewpoint: { from: 'aircraft' },
    conditions: {},
    substance: null,
    slickByEye: { lengthM: 2000, widthM: 300, coverage: 0.4, shares: [0.9, 0.1, 0, 0, 0] },
    lookAlikes: null,
    photo: null,
    setup: null,
    result: recordResult({ byCode: volumeByCode(240_000, [0.9, 0.1, 0, 0, 0]) }),
    remarks: '',
    files: [],
  };
  return { ...observation, notKnown: notKnown(observation) };
}
