/** A fitted camera as data: kept by name on the device or in a file, given back as `camera.kept` of a set-up. */
import type { RgbEncoding } from '../colour/types.ts';
import { type CameraKnowledge, cameraKnowledge, KEPT } from '../match/cameraKnowledge.ts';
import type { CameraFit } from '../match/fitCamera.ts';
import { PARAMETERS, type Prior } from '../match/parameters.ts';
import { choleskyInPlace, inverseOf } from '../match/symmetric.ts';

/** What a fit or a colour target tells of a camera, before it gets a name. */
export interface FittedCamera {
  /** What it was fitted to: the film's own colours, or a colour target. */
  readonly from: 'film' | 'target';
  readonly determined: 'well' | 'partly';
  /** Code space of the photo: tone curve and matrix are departures from it. */
  readonly encoding: string;
  /** The parameters that belong to the phone, 36: 9 sensor, 3 tone, 6 matrix, 18 departures of the sensor; see `match/parameters.ts`. */
  readonly mean: readonly number[];
  /** Lower triangle of their covariance, row by row: 666 numbers. */
  readonly covariance: readonly number[];
}

export const KEPT_CAMERA_FORMAT = 'tintfathom camera';
export const KEPT_CAMERA_VERSION = 1;

export interface KeptCamera extends FittedCamera {
  readonly format: typeof KEPT_CAMERA_FORMAT;
  readonly version: typeof KEPT_CAMERA_VERSION;
  readonly name: string;
  /** ISO 8601. */
  readonly madeAt: string;
  /** As the photo's EXIF names it, where it does. */
  readonly device?: { readonly make?: string; readonly model?: string };
}

/** Figures kept of each number: far finer than any of them is known. */
const DIGITS = 8;

/** The part of a fit that belongs to the phone, as data. */
export function fittedCamera(
  fit: Pick<CameraFit, 'parameters' | 'covariance'>,
  encoding: RgbEncoding,
  from: FittedCamera['from'],
  determined: FittedCamera['determined'],
): FittedCamera {
  const { mean, covariance } = cameraKnowledge(fit);
  const lower: number[] = [];
  for (let i = 0; i < KEPT; i++)
    for (let j = 0; j <= i; j++) lower.push(Number(covariance[i * KEPT + j]!.toPrecision(DIGITS)));
  return {
    from,
    determined,
    encoding: encoding.id,
    mean: Array.from(mean, (value) => Number(value.toPrecision(DIGITS))),
    covariance: lower,
  };
}

/**
 * The camera of a fit to film, whose evidence counts `factor` times less than the fit took it for while the prior counts
 * as before: covariance (P + (C^-1 - P) / factor)^-1, never wider than the prior.
 */
export function cameraOfFilm(
  fit: Pick<CameraFit, 'parameters' | 'covariance'>,
  prior: Prior,
  factor: number,
  encoding: RgbEncoding,
  determined: FittedCamera['determined'],
): FittedCamera {
  const precision = inverseOf(fit.covariance, PARAMETERS);
  const covariance = inverseOf(
    precision.map((v, k) => prior.precision[k]! + (v - prior.precision[k]!) / factor),
    PARAMETERS,
  );
  return fittedCamera({ parameters: fit.parameters, covariance }, encoding, 'film', determined);
}

/** Gives a fitted camera its name. */
export function nameCamera(
  camera: FittedCamera,
  name: string,
  madeAt: string,
  device: { readonly make?: string | undefined; readonly model?: string | undefined } = {},
): KeptCamera {
  const known = {
    ...(device.make ? { make: device.make } : {}),
    ...(device.model ? { model: device.model } : {}),
  };
  return {
    format: KEPT_CAMERA_FORMAT,
    version: KEPT_CAMERA_VERSION,
    name,
    madeAt,
    ...(Object.keys(known).length > 0 ? { device: known } : {}),
    ...camera,
  };
}

type CameraNumbers = Pick<FittedCamera, 'mean' | 'covariance'>;

/** The numbers of a kept camera as the fit had them. */
export function knowledgeOf(camera: CameraNumbers): CameraKnowledge {
  const covariance = new Float64Array(KEPT * KEPT);
  let at = 0;
  for (let i = 0; i < KEPT; i++) {
    for (let j = 0; j <= i; j++) {
      covariance[i * KEPT + j] = covariance[j * KEPT + i] = camera.covariance[at++]!;
    }
  }
  return { mean: Float64Array.from(camera.mean), covariance };
}

/** Whether the numbers of a kept camera can be a covariance at all. */
export function hasCovariance(camera: CameraNumbers): boolean {
  try {
    choleskyInPlace(knowledgeOf(camera).covariance, KEPT);
    return true;
  } catch {
    return false;
  }
}

/** The name to begin with: what the photo's EXIF calls the phone, the make only where the model does not say it. */
export function cameraNameFrom(make: string | undefined, model: string | undefined): string {
  if (!model) return make ?? '';
  return !make || model.toLowerCase().startsWith(make.toLowerCase()) ? model : `${make} ${model}`;
}
