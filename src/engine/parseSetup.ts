import * as v from 'valibot';
import { ILLUMINANT_IDS } from '../colour/light.ts';
import { keptCameraSchema } from './keptCameraSchema.ts';
import { SetupError } from './prepareScene.ts';
import { FILM_PRESETS, type Setup } from './setup.ts';

const finite = v.pipe(v.number(), v.finite());
const between = (low: number, high: number) => v.pipe(finite, v.minValue(low), v.maxValue(high));
const point = v.strictTuple([finite, finite]);
const rectangle = v.strictTuple([
  finite,
  finite,
  v.pipe(finite, v.minValue(1)),
  v.pipe(finite, v.minValue(1)),
]);

const material = v.union([
  v.string(),
  v.strictObject({
    nD: between(1, 5),
    abbe: v.optional(between(5, 200)),
    k: v.optional(between(0, 10)),
    spread: v.optional(between(0, 0.2)),
  }),
  v.strictObject({
    cauchyA: between(0.5, 5),
    cauchyB: between(-0.5, 0.5),
    k: v.optional(between(0, 10)),
    spread: v.optional(between(0, 0.2)),
  }),
]);

const stack = v.strictObject({
  ambient: material,
  layers: v.pipe(
    v.array(v.strictObject({ material, thicknessNm: v.optional(between(0, 1e6)) })),
    v.minLength(1, 'name at least one layer'),
  ),
  substrate: material,
});

const stroke = v.strictObject({
  paint: v.picklist(['in', 'out'] as const),
  points: v.pipe(v.array(point), v.minLength(1, 'a stroke needs a point or more')),
  widthPx: between(1, 10_000),
});

const view = v.pipe(
  v.strictObject({
    heightM: v.optional(between(0.05, 20_000)),
    focal35mm: v.optional(between(5, 2000)),
    horizon: v.optional(v.strictTuple([point, point])),
    pitchDeg: v.optional(between(-90, 90)),
    rollDeg: v.optional(between(-180, 180)),
    pixelSizeM: v.optional(between(1e-6, 1000)),
    radial: v.optional(between(-0.5, 0.5)),
    knownLength: v.optional(
      v.strictObject({
        ends: v.strictTuple([point, point]),
        lengthM: between(1e-4, 1e5),
        sets: v.optional(v.boolean()),
      }),
    ),
    heightSdShare: v.optional(between(0, 1)),
    focalSdShare: v.optional(between(0, 1)),
    pitchSdDeg: v.optional(between(0, 45)),
    rollSdDeg: v.optional(between(0, 45)),
  }),
  v.check(
    (given) =>
      given.pixelSizeM !== undefined || given.heightM !== undefined || given.knownLength?.sets === true,
    'give heightM, a known length that sets it, or pixelSizeM for a view straight down',
  ),
  v.check(
    (given) => given.pixelSizeM !== undefined || given.horizon !== undefined || given.pitchDeg !== undefined,
    'give two horizon points, or pitchDeg',
  ),
);

const schema = v.strictObject({
  film: v.union([v.picklist(FILM_PRESETS), stack]),
  water: v.optional(v.strictObject({ temperatureC: between(0, 30), salinity: between(0, 40) })),
  light: v.optional(
    v.union([
      v.strictObject({ daylightK: between(4000, 25000) }),
      v.strictObject({ illuminant: v.picklist(ILLUMINANT_IDS) }),
    ]),
  ),
  camera: v.optional(
    v.union([
      v.picklist(['cie1931', 'phone'] as const),
      v.pipe(
        v.strictObject({ fit: v.boolean(), kept: v.optional(keptCameraSchema) }),
        v.check((camera) => camera.fit || !camera.kept, 'a kept camera needs "fit": true'),
      ),
    ]),
  ),
  references: v.optional(
    v.strictObject({
      clean: v.optional(rectangle),
      white: v.optional(rectangle),
      whiteReflectance: v.optional(between(0.005, 1)),
      dark: v.optional(rectangle),
    }),
  ),
  incidenceDeg: v.optional(between(0, 89.9)),
  maxThicknessNm: v.optional(between(50, 5000)),
  region: v.optional(v.pipe(v.array(point), v.minLength(3, 'a region needs three corners or more'))),
  pins: v.optional(
    v.array(
      v.union([
        v.strictObject({ at: point, is: v.literal('bare') }),
        v.strictObject({ at: point, order: v.pipe(finite, v.integer(), v.minValue(1), v.maxValue(20)) }),
      ]),
    ),
  ),
  trend: v.optional(v.literal('thickerDown')),
  strokes: v.optional(v.array(stroke)),
  view: v.optional(view),
  windMS: v.optional(between(0, 60)),
  position: v.optional(v.strictObject({ latitudeDeg: between(-90, 90), longitudeDeg: between(-180, 180) })),
  headingDeg: v.optional(between(-360, 360)),
});

/**
 * Checks a set-up read from outside. Unknown keys are an error: a misspelt one must not pass in silence.
 * @throws SetupError with one line that names the place and what is wrong there
 */
export function parseSetup(value: unknown): Setup {
  const result = v.safeParse(schema, value);
  if (result.success) return result.output as Setup;
  throw new SetupError(`The set-up is not right: ${lineOf(result.issues[0])}.`);
}

interface Issue {
  readonly message: string;
  readonly path?: readonly { readonly key: unknown }[] | undefined;
  readonly issues?: readonly Issue[] | undefined;
}

/** The most telling line of an issue: of a union, the branch that came furthest. */
function lineOf(issue: Issue): string {
  let deepest = issue;
  const place: string[] = [];
  for (;;) {
    place.push(...(deepest.path ?? []).map((item) => String(item.key)));
    const inner = deepest.issues?.filter((candidate) => candidate.path !== undefined) ?? [];
    const next = [...inner].sort((a, b) => (b.path?.length ?? 0) - (a.path?.length ?? 0))[0];
    if (!next) break;
    deepest = next;
  }
  if (deepest.message.startsWith('Invalid key: Expected never')) {
    return `there is no key "${place.join('.')}"; see src/engine/setup.schema.json for those there are`;
  }
  const where = place.length > 0 ? `"${place.join('.')}": ` : '';
  return `${where}${deepest.message.replaceAll('\n', ' ')}`;
}
