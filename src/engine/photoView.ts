import type { PhotoMetadata } from '../photo/types.ts';
import { focalFromLength, type LengthCheck, scaleFromLength } from '../view/groundScale.ts';
import { horizonDipRad, tiltFromHorizon } from '../view/horizon.ts';
import type { Notice } from '../view/notice.ts';
import { focalPxFrom35mm, type PinholeCamera, pinholeCamera } from '../view/pinholeCamera.ts';
import type { PoseDraw } from '../view/poseDraws.ts';
import { straightDownFromPixelSize, uniformFields } from '../view/straightDown.ts';
import type { Tilt } from '../view/tilt.ts';
import { groundAreaField, incidenceField, type Rows } from '../view/waterFields.ts';
import { type WaterView, waterView } from '../view/waterView.ts';
import { SetupError } from './prepareScene.ts';
import type { Setup, ViewSetup } from './setup.ts';
import { poseDrawFor, type ViewSd } from './viewUncertainty.ts';

/** A set-up's view over one photo: where each of its pixels looks, and how sure that is. */
export interface PhotoView {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Null where only a pixel's size on the water is known: then all pixels count as seen from straight above. */
  readonly view: WaterView | null;
  /** Width of a pixel on the water; null unless the set-up gives it. */
  readonly pixelSizeM: number | null;
  /** Other views that what is known allows; null without a view. */
  readonly poses: PoseDraw | null;
  /** One standard deviation each: as stated in the set-up, else the defaults of `viewUncertainty.ts`. */
  readonly sd: ViewSd;
  /** The known length against the view; null without one. */
  readonly lengthCheck: LengthCheck | null;
  readonly notices: readonly Notice[];
}

/**
 * The set-up with the photo's own focal length filled in where its view does not say one. Pure; a set-up without a view,
 * or one that states its focal length, comes back as it is.
 */
export function withPhotoFocal(setup: Setup, metadata: Pick<PhotoMetadata, 'focalLength35mm'>): Setup {
  const focal35mm = metadata.focalLength35mm;
  if (!setup.view || setup.view.focal35mm !== undefined || !(focal35mm && focal35mm > 0)) return setup;
  return { ...setup, view: { ...setup.view, focal35mm } };
}

/**
 * Works out where a photo looks. All picture places of the set-up, and `pixelSizeM`, are in pixels of the photo as
 * measured, `widthPx` x `heightPx`, like its region and its references; the focal length is scaled to that size.
 * Two horizon points go before `pitchDeg` and `rollDeg`.
 * @returns null where the set-up has no view
 * @throws SetupError with a sentence that says what to do
 */
export function photoViewOf(setup: Setup, widthPx: number, heightPx: number): PhotoView | null {
  const given = setup.view;
  if (!given) return null;
  try {
    return viewOver(given, widthPx, heightPx);
  } catch (error) {
    if (error instanceof RangeError) throw new SetupError(error.message);
    throw error;
  }
}

/** The same for a view alone. @throws RangeError, SetupError with a sentence that says what to do */
export function viewOver(given: ViewSetup, widthPx: number, heightPx: number): PhotoView {
  const sd = sdOf(given, widthPx, heightPx);
  const size = { widthPx, heightPx, sd };
  const focalPx = focalPxOf(given, widthPx, heightPx);
  if (given.pixelSizeM !== undefined) {
    const { pixelSizeM } = given;
    if (focalPx === null) {
      const { notices } = uniformFields(1, 1, pixelSizeM);
      return { ...size, view: null, pixelSizeM, poses: null, lengthCheck: null, notices };
    }
    const view = straightDownFromPixelSize(
      pinholeCamera(widthPx, heightPx, focalPx, given.radial),
      pixelSizeM,
    );
    return finish(given, size, view, pixelSizeM);
  }
  const camera =
    focalPx === null
      ? focalFromKnownLength(given, widthPx, heightPx)
      : pinholeCamera(widthPx, heightPx, focalPx, given.radial);
  const settling = given.knownLength?.sets === true ? given.knownLength : null;
  let heightM = given.heightM ?? 1;
  let view = lookingFrom(given, camera, heightM);
  if (settling) {
    // The dip of the horizon depends weakly on the height that is sought: three times round settle it to a millimetre.
    for (let round = 0; round < 3; round++) {
      heightM = scaleFromLength(view, ...settling.ends, settling.lengthM).impliedHeightM;
      view = lookingFrom(given, camera, heightM);
    }
  }
  return finish(given, size, view, null);
}

function finish(
  given: ViewSetup,
  size: Pick<PhotoView, 'widthPx' | 'heightPx' | 'sd'>,
  view: WaterView,
  pixelSizeM: number | null,
): PhotoView {
  const length = given.knownLength;
  const lengthCheck = length ? scaleFromLength(view, ...length.ends, length.lengthM) : null;
  const notices = lengthCheck?.notice ? [lengthCheck.notice] : [];
  return { ...size, view, pixelSizeM, poses: poseDrawFor(given, view, size.sd), lengthCheck, notices };
}

function lookingFrom(given: ViewSetup, camera: PinholeCamera, heightM: number): WaterView {
  const tilt: Tilt = given.horizon
    ? tiltFromHorizon(camera, ...given.horizon, horizonDipRad(heightM))
    : { pitchRad: radians(given.pitchDeg ?? -90), rollRad: radians(given.rollDeg ?? 0) };
  return waterView({ camera, heightM, ...tilt });
}

/** Focal length in pixels of the measured photo; null where neither set-up nor photo says. */
function focalPxOf(given: ViewSetup, widthPx: number, heightPx: number): number | null {
  if (given.focal35mm !== undefined) return focalPxFrom35mm(given.focal35mm, widthPx, heightPx);
  // Straight down, pixel size and height together fix the focal length.
  if (given.pixelSizeM !== undefined && given.heightM !== undefined) return given.heightM / given.pixelSizeM;
  return null;
}

/** Without a focal length: a length that runs away from the camera tells it, with the height and the horizon. */
function focalFromKnownLength(given: ViewSetup, widthPx: number, heightPx: number): PinholeCamera {
  const { heightM, horizon, knownLength, radial } = given;
  if (!(heightM && horizon && knownLength && knownLength.sets !== true)) {
    throw new SetupError(
      'The photo does not say its focal length: type the 35 mm equivalent focal length (a phone’s main camera has 24 to 28 mm).',
    );
  }
  const start = pinholeCamera(widthPx, heightPx, focalPxFrom35mm(26, widthPx, heightPx), radial);
  return focalFromLength(start, heightM, horizon, ...knownLength.ends, knownLength.lengthM);
}

/** Stated uncertainties, else defaults. */
function sdOf(given: ViewSetup, widthPx: number, heightPx: number): ViewSd {
  return {
    heightShare: given.heightSdShare ?? 0.05,
    focalShare: given.focalSdShare ?? 0.02,
    pitchRad: radians(given.pitchSdDeg ?? 0.5),
    // Not stated means taken as level, which a hand keeps less well than a sensor tells it.
    rollRad: radians(given.rollSdDeg ?? (given.rollDeg === undefined ? 1 : 0.5)),
    tapPx: Math.max(1.5, 0.002 * Math.max(widthPx, heightPx)),
  };
}

/** Incidence on level water at each pixel's middle, radians, row by row; at least pi/2 above the horizon. */
export function incidenceOf(photoView: PhotoView, rows?: Rows): Float32Array {
  if (photoView.view) return incidenceField(photoView.view, rows);
  return new Float32Array(photoView.widthPx * rowCount(photoView, rows));
}

/** Water area of each pixel, square metres, row by row; NaN at and above the horizon. */
export function groundAreaOf(photoView: PhotoView, rows?: Rows): Float32Array {
  if (photoView.view) return groundAreaField(photoView.view, rows);
  const areaM2 = (photoView.pixelSizeM ?? Number.NaN) ** 2;
  return new Float32Array(photoView.widthPx * rowCount(photoView, rows)).fill(areaM2);
}

function rowCount(photoView: PhotoView, rows?: Rows): number {
  return rows ? rows.to - rows.from : photoView.heightPx;
}

function radians(degrees: number): number {
  return (degrees * Math.PI) / 180;
}
