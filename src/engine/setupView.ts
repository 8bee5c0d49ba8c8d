import { scaleFromLength } from '../view/groundScale.ts';
import { horizonDipRad, tiltFromHorizon } from '../view/horizon.ts';
import { focalPxFrom35mm, type PinholeCamera, pinholeCamera } from '../view/pinholeCamera.ts';
import { straightDownFromPixelSize } from '../view/straightDown.ts';
import type { Tilt } from '../view/tilt.ts';
import { type WaterView, waterView } from '../view/waterView.ts';
import type { Setup, ViewSetup } from './setup.ts';

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
  if (pixelSizeM !== undefined) return [];
  const missing: MissingView[] = [];
  if (heightM === undefined && !knownLength?.sets) missing.push('height');
  if (focal35mm === undefined && photo.focalLength35mm === undefined) missing.push('focal');
  if (!horizon && pitchDeg === undefined) missing.push('tilt');
  return missing;
}

/** The set-up as the engine takes it: a view that is only half filled in is left out, so that nothing is made up. */
export function withWholeView(setup: Setup, photo: LensFacts): Setup {
  if (!setup.view || missingOfView(setup.view, photo).length === 0) return setup;
  const { view: _, ...rest } = setup;
  return rest;
}

/** The camera of a photo, or null without a focal length. @throws RangeError where the lens makes no sense */
export function setupCamera(view: ViewSetup | undefined, photo: LensFacts): PinholeCamera | null {
  const focal = view?.focal35mm ?? photo.focalLength35mm;
  if (focal === undefined) return null;
  const focalPx = focalPxFrom35mm(focal, photo.width, photo.height);
  return pinholeCamera(photo.width, photo.height, focalPx, view?.radial ?? 0);
}

/** A view to draw over the photo while it is still being told: angles are right as soon as the tilt is known. */
export interface SketchedView {
  readonly view: WaterView;
  /** False while the height is open: then `view` has a height of 1 m and no distance is to be shown. */
  readonly hasScale: boolean;
}

/**
 * The camera over the water as far as a set-up describes it; null without focal length or tilt.
 * A pixel size means straight down; a horizon wins over typed angles; a known length that `sets` wins over the height.
 * @throws RangeError with a sentence where what is said contradicts itself
 */
export function sketchView(view: ViewSetup | undefined, photo: LensFacts): SketchedView | null {
  const camera = setupCamera(view, photo);
  if (!view || !camera) return null;
  if (view.pixelSizeM !== undefined)
    return { view: straightDownFromPixelSize(camera, view.pixelSizeM), hasScale: true };
  if (!view.horizon && view.pitchDeg === undefined) return null;
  const length = view.knownLength?.sets ? view.knownLength : null;
  let heightM = length ? 1 : (view.heightM ?? 1);
  // The dip of the horizon follows from the height: three rounds settle it to a millimetre.
  for (let round = 0; length && round < 3; round++) {
    const trial = waterView({ camera, heightM, ...tiltOf(view, camera, heightM) });
    heightM = scaleFromLength(trial, length.ends[0], length.ends[1], length.lengthM).impliedHeightM;
  }
  return {
    view: waterView({ camera, heightM, ...tiltOf(view, camera, heightM) }),
    hasScale: view.heightM !== undefined || length !== null,
  };
}

function tiltOf({ horizon, pitchDeg, rollDeg }: ViewSetup, camera: PinholeCamera, heightM: number): Tilt {
  return horizon
    ? tiltFromHorizon(camera, horizon[0], horizon[1], horizonDipRad(heightM))
    : { pitchRad: (pitchDeg ?? 0) * DEGREE, rollRad: (rollDeg ?? 0) * DEGREE };
}
