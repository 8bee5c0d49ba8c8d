import { scaleFromLength } from '../view/groundScale.ts';
import { horizonDipRad, tiltFromHorizon } from '../view/horizon.ts';
import { focalPxFrom35mm, type PinholeCamera, pinholeCamera } from '../view/pinholeCamera.ts';
import { straightDownFromPixelSize } from '../view/straightDown.ts';
import type { Tilt } from '../view/tilt.ts';
import { type WaterView, waterView } from '../view/waterView.ts';
import type { ViewSetup } from './setup.ts';

const DEGREE = Math.PI / 180;

/** Pixels that were measured, and what the photo itself says of its lens. */
export interface LensFacts {
  readonly width: number;
  readonly height: number;
  readonly focalLength35mm?: number | undefined;
}

/** What a set-up leaves open, in the order in which a person should fill it. */
export type MissingView = 'height' | 'focal' | 'tilt';

/** What is still needed before every pixel has its place on the water; empty where nothing is. */
export function missingOfView(view: ViewSetup | undefined, photo: LensFacts): readonly MissingView[] {
  const { heightM, focal35mm, horizon, pitchDeg, pixelSizeM, knownLength } = view ?? {};
  const missing: MissingView[] = [];
  if (pixelSizeM !== undefined && !horizon) return missing;
  if (heightM === undefined && !knownLength?.sets) missing.push('height');
  if (focal35mm === undefined && photo.focalLength35mm === undefined) missing.push('focal');
  if (!horizon && pitchDeg === undefined) missing.push('tilt');
  return missing;
}

/** The camera of a photo, or null without a focal length. @throws RangeError where the lens makes no sense */
export function setupCamera(view: ViewSetup | undefined, photo: LensFacts): PinholeCamera | null {
  const focal = view?.focal35mm ?? photo.focalLength35mm;
  if (focal === undefined) return null;
  const focalPx = focalPxFrom35mm(focal, photo.width, photo.height);
  return pinholeCamera(photo.width, photo.height, focalPx, view?.radial ?? 0);
}

/**
 * The camera over the water that a set-up describes, for the measured pixels of a photo; null where it says too little
 * (`missingOfView` names what), or where only a pixel size is known and no focal length (`uniformFields` serves then).
 * A horizon wins over typed angles; a known length that `sets` wins over the height.
 * @throws RangeError with a sentence where what is said contradicts itself
 */
export function setupView(view: ViewSetup | undefined, photo: LensFacts): WaterView | null {
  if (!view || missingOfView(view, photo).length > 0) return null;
  const camera = setupCamera(view, photo);
  if (!camera) return null;
  if (view.pixelSizeM !== undefined && !view.horizon)
    return straightDownFromPixelSize(camera, view.pixelSizeM);
  const length = view.knownLength?.sets ? view.knownLength : null;
  let heightM = length ? 1 : (view.heightM ?? 1);
  // The dip of the horizon follows from the height: three rounds settle it to a millimetre.
  for (let round = 0; length && round < 3; round++) {
    const trial = waterView({ camera, heightM, ...tiltOf(view, camera, heightM) });
    heightM = scaleFromLength(trial, length.ends[0], length.ends[1], length.lengthM).impliedHeightM;
  }
  return waterView({ camera, heightM, ...tiltOf(view, camera, heightM) });
}

function tiltOf({ horizon, pitchDeg, rollDeg }: ViewSetup, camera: PinholeCamera, heightM: number): Tilt {
  return horizon
    ? tiltFromHorizon(camera, horizon[0], horizon[1], horizonDipRad(heightM))
    : { pitchRad: (pitchDeg ?? 0) * DEGREE, rollRad: (rollDeg ?? 0) * DEGREE };
}
