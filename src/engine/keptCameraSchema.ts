import * as v from 'valibot';
import { KEPT } from '../match/cameraKnowledge.ts';
import { hasCovariance, KEPT_CAMERA_FORMAT, KEPT_CAMERA_VERSION, type KeptCamera } from './keptCamera.ts';

const numbers = (count: number, largest: number) =>
  v.pipe(
    v.array(v.pipe(v.number(), v.finite(), v.minValue(-largest), v.maxValue(largest))),
    v.length(count, `expects ${count} numbers`),
  );
const words = (longest: number) => v.pipe(v.string(), v.minLength(1), v.maxLength(longest));

/** A kept camera read from outside: a set-up, a file, the device's store. */
export const keptCameraSchema = v.pipe(
  v.strictObject({
    format: v.literal(KEPT_CAMERA_FORMAT),
    version: v.literal(KEPT_CAMERA_VERSION),
    name: words(100),
    madeAt: words(40),
    device: v.optional(v.strictObject({ make: v.optional(words(200)), model: v.optional(words(200)) })),
    from: v.picklist(['film', 'target'] as const),
    determined: v.picklist(['well', 'partly'] as const),
    encoding: words(200),
    mean: numbers(KEPT, 100),
    covariance: numbers((KEPT * (KEPT + 1)) / 2, 100),
  }),
  v.check(
    (camera) => hasCovariance(camera),
    'the covariance of this kept camera is not a covariance; keep the camera anew',
  ),
);

/** The kept camera in a value from outside, or null where it is none. */
export function readKeptCamera(value: unknown): KeptCamera | null {
  const result = v.safeParse(keptCameraSchema, value);
  return result.success ? (result.output as KeptCamera) : null;
}
