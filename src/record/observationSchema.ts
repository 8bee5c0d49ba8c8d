/** The shape of an observation as it must come in from outside; see observation.ts for what the fields mean. */
import * as v from 'valibot';
import { DRAINAGE_LAWS, type DrainageLawId } from '../tally/drainageLaw.ts';
import { LOOK_ALIKE_QUESTIONS, type LookAlikeQuestionId } from '../tally/lookAlikes.ts';
import { FILE_ROLES, OBSERVATION_KIND, SCHEMA_VERSION } from './observation.ts';
import { summarySchema } from './summarySchema.ts';

const finite = v.pipe(v.number(), v.finite());
const atLeast0 = v.pipe(finite, v.minValue(0));
const between = (low: number, high: number) => v.pipe(finite, v.minValue(low), v.maxValue(high));
const share = between(0, 1);
const count = v.pipe(atLeast0, v.integer());
const sha256 = v.pipe(v.string(), v.regex(/^[0-9a-f]{64}$/, 'a SHA-256 in lower-case hexadecimal'));
const utc = v.pipe(
  v.string(),
  v.regex(/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}(\.\d+)?Z$/, 'a time in UTC, like 2025-05-14T09:30:00Z'),
);
const optional = v.exactOptional;

const source = v.picklist(['exif', 'geolocation', 'sensor', 'device', 'typed', 'computed', 'photo']);
const sourced = <T extends v.GenericSchema>(value: T) => v.strictObject({ value, source });
const notice = v.strictObject({ code: v.string(), text: v.string() });
const spread = v.strictObject({ least: finite, best: finite, most: finite });
const shares = v.pipe(v.strictTuple([share, share, share, share, share]));

const time = v.strictObject({
  utc: v.nullable(utc),
  recorded: v.string(),
  offset: v.nullable(v.pipe(v.string(), v.regex(/^(Z|[+-]\d{2}:\d{2})$/, 'an offset like +02:00'))),
  source,
  offsetSource: v.nullable(source),
});

const position = v.strictObject({
  latitudeDeg: between(-90, 90),
  longitudeDeg: between(-180, 180),
  errorM: optional(atLeast0),
  source,
});

const viewpoint = v.strictObject({
  from: v.picklist(['aircraft', 'drone', 'vessel', 'shore', 'bench', 'unknown']),
  heightM: optional(sourced(atLeast0)),
  headingDeg: optional(sourced(between(0, 360))),
  headingReference: optional(v.picklist(['true', 'magnetic'])),
  pitchDeg: optional(sourced(between(-90, 90))),
  rollDeg: optional(sourced(between(-180, 180))),
  focalLength35mm: optional(sourced(atLeast0)),
});

const conditions = v.strictObject({
  windMS: optional(atLeast0),
  windFromDeg: optional(between(0, 360)),
  seaState: optional(v.picklist([0, 1, 2, 3, 4, 5, 6, 7, 8, 9])),
  waveHeightM: optional(atLeast0),
  sky: optional(v.picklist(['clear', 'partlyCloudy', 'overcast', 'fog', 'rain', 'night'])),
  sun: optional(sourced(v.strictObject({ elevationDeg: between(-90, 90), azimuthDeg: between(0, 360) }))),
  visibilityKm: optional(atLeast0),
  airTemperatureC: optional(finite),
  waterTemperatureC: optional(finite),
  polariser: optional(v.picklist(['on', 'off'])),
  waterRemarks: optional(v.string()),
});

const questionIds = LOOK_ALIKE_QUESTIONS.map(({ id }) => id) as [
  LookAlikeQuestionId,
  ...LookAlikeQuestionId[],
];
const lookAlikes = v.strictObject({
  answers: v.record(v.picklist(questionIds), v.picklist(['yes', 'no', 'unknown'])),
  conclusion: v.picklist(['petroleumLikely', 'biogenicLikely', 'cannotSay']),
  reason: v.string(),
});

const area = v.strictObject({
  regionM2: atLeast0,
  oiledM2: atLeast0,
  bareM2: atLeast0,
  unreadM2: atLeast0,
  atLeastM2: atLeast0,
  ambiguousM2: atLeast0,
  excludedPixels: count,
  coverage: v.nullable(share),
  coverageLeast: v.nullable(share),
  coverageMost: v.nullable(share),
});

const byThickness = v.strictObject({
  volumeM3: spread,
  oiledM2: spread,
  atLeast: v.boolean(),
  atLeastM3: finite,
  atLeastShare: finite,
  ambiguousShare: finite,
  meanThicknessNm: v.nullable(finite),
  inputs: v.strictObject({
    trials: count,
    coverage: share,
    thicknessShare: finite,
    thicknessShiftNm: finite,
    correlatedPixels: finite,
    unreadMost: v.optional(finite, 0),
  }),
});

const code = v.picklist([1, 2, 3, 4, 5]);
const byCode = v.strictObject({
  oiledM2: atLeast0,
  shares,
  parts: v.array(v.strictObject({ code, areaM2: atLeast0, minM3: atLeast0, maxM3: atLeast0 })),
  minM3: atLeast0,
  maxM3: atLeast0,
  atLeast: v.boolean(),
  version: v.string(),
});

const drainage = v.strictObject({
  law: v.picklist(Object.keys(DRAINAGE_LAWS) as [DrainageLawId, ...DrainageLawId[]]),
  parameters: v.array(
    v.strictObject({ name: v.string(), unit: v.string(), value: finite, sd: v.nullable(finite) }),
  ),
  rootMeanSquareNm: finite,
  birgeRatio: v.nullable(finite),
  degreesOfFreedom: finite,
});

const result = v.strictObject({
  summary: v.nullable(summarySchema),
  area: v.nullable(area),
  byThickness: v.nullable(byThickness),
  byCode: v.nullable(byCode),
  reasons: v.array(notice),
  drainage: v.array(drainage),
  notices: v.array(notice),
});

const file = v.strictObject({
  path: v.pipe(
    v.string(),
    // No way out of the archive, nothing that a listing would have to escape.
    v.regex(/^(?!.*(^|\/)\.{1,2}(\/|$))[^\\/\p{Cc}]+(\/[^\\/\p{Cc}]+)*$/u, 'a path inside the archive'),
  ),
  role: v.picklist(FILE_ROLES),
  mediaType: v.string(),
  byteLength: count,
  sha256,
});

const photo = v.strictObject({
  // Loose: what a camera says of itself grows with the photo reader and must come back whole.
  metadata: v.looseObject({
    fileName: v.string(),
    mimeType: v.string(),
    byteLength: count,
    sha256,
    originalWidth: count,
    originalHeight: count,
    takenAtHasOffset: v.boolean(),
    profileName: v.string(),
  }),
  measuredWidth: count,
  measuredHeight: count,
});

export const observationSchema = v.strictObject({
  kind: v.literal(OBSERVATION_KIND),
  schemaVersion: v.literal(SCHEMA_VERSION),
  id: v.pipe(v.string(), v.minLength(1)),
  title: v.string(),
  createdUtc: utc,
  changedUtc: utc,
  madeWith: v.strictObject({ app: v.string(), model: v.string() }),
  observer: v.strictObject({
    role: optional(v.string()),
    organisation: optional(v.string()),
    platform: optional(v.string()),
    incident: optional(v.string()),
  }),
  time: v.nullable(time),
  position: v.nullable(position),
  placeName: optional(v.string()),
  viewpoint,
  conditions,
  substance: v.nullable(v.strictObject({ name: v.string(), howKnown: optional(v.string()) })),
  slickByEye: v.nullable(
    v.strictObject({
      lengthM: optional(atLeast0),
      widthM: optional(atLeast0),
      coverage: optional(share),
      shares: optional(shares),
      structure: optional(v.string()),
      driftRemarks: optional(v.string()),
      sourceRemarks: optional(v.string()),
    }),
  ),
  lookAlikes: v.nullable(lookAlikes),
  photo: v.nullable(photo),
  // The engine checks a set-up before it reads with it; here it must only come back whole.
  setup: v.nullable(v.looseObject({ film: v.union([v.string(), v.looseObject({})]) })),
  result: v.nullable(result),
  toldTo: v.array(v.strictObject({ who: v.string(), utc: optional(utc), reference: optional(v.string()) })),
  remarks: v.string(),
  notKnown: v.array(v.string()),
  leftOut: v.array(v.picklist(['position', 'original'])),
  files: v.array(file),
});
