/**
 * A pinhole camera whose axis goes through the middle of the picture. Picture places (x, y) are in pixels from the top
 * left corner, y downwards; the middle of the first pixel is (0.5, 0.5). Camera axes: right, up, ahead.
 */
export interface PinholeCamera {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Distance of the picture plane, in pixels. */
  readonly focalPx: number;
  /**
   * One radial distortion coefficient k: a ray that leaves the axis by r (tangent of its angle) falls at r (1 + k r^2).
   * Negative is barrel distortion. Zero for phones that straighten their photos, which is nearly all.
   */
  readonly radial: number;
}

/** Diagonal of the 36 mm x 24 mm frame. */
export const FULL_FRAME_DIAGONAL_MM = Math.hypot(36, 24);

/**
 * What a "35 mm equivalent" keeps equal. CIPA DCG-001 (and with it the EXIF tag FocalLengthIn35mmFilm) means the
 * diagonal angle of view; some makers state it by the long side instead, which for a 4:3 photo is 4 % off.
 */
export type Equivalence = 'diagonal' | 'longSide';

/**
 * Focal length in pixels from its 35 mm equivalent in millimetres. The size must be that of the whole, uncropped photo.
 * @throws RangeError where a number is not positive
 */
export function focalPxFrom35mm(
  focal35mm: number,
  widthPx: number,
  heightPx: number,
  equivalence: Equivalence = 'diagonal',
): number {
  mustBePositive('35 mm equivalent focal length', focal35mm);
  return equivalence === 'diagonal'
    ? (focal35mm * Math.hypot(widthPx, heightPx)) / FULL_FRAME_DIAGONAL_MM
    : (focal35mm * Math.max(widthPx, heightPx)) / 36;
}

/** Focal length in pixels from the full angle of view over `spanPx` pixels (width, height or diagonal). */
export function focalPxFromFieldOfView(fieldOfViewRad: number, spanPx: number): number {
  if (!(fieldOfViewRad > 0 && fieldOfViewRad < Math.PI)) {
    throw new RangeError('The angle of view must lie between 0 and 180 degrees.');
  }
  return spanPx / (2 * Math.tan(fieldOfViewRad / 2));
}

/** Full angle of view over `spanPx` pixels about the axis, radians; distortion not counted. */
export function fieldOfViewRad(focalPx: number, spanPx: number): number {
  return 2 * Math.atan(spanPx / (2 * focalPx));
}

/**
 * A camera, checked.
 * @throws RangeError where a size is not positive, or where the distortion folds the picture's corners over
 */
export function pinholeCamera(widthPx: number, heightPx: number, focalPx: number, radial = 0): PinholeCamera {
  mustBePositive('photo width', widthPx);
  mustBePositive('photo height', heightPx);
  mustBePositive('focal length', focalPx);
  const corner = Math.hypot(widthPx, heightPx) / (2 * focalPx);
  // r (1 + k r^2) stops growing at r = sqrt(-1 / 3k), where it is two thirds of that: no ray falls further out.
  if (!Number.isFinite(radial) || (radial < 0 && corner >= (2 / 3) * Math.sqrt(-1 / (3 * radial)))) {
    throw new RangeError(
      `A radial distortion of ${radial} folds the corners of this photo over: check its sign and its unit (tangent squared).`,
    );
  }
  return { widthPx, heightPx, focalPx, radial };
}

/** The same camera for the photo shrunk or enlarged to another width; proportions are kept. */
export function resizeCamera(camera: PinholeCamera, widthPx: number): PinholeCamera {
  const factor = widthPx / camera.widthPx;
  return pinholeCamera(widthPx, Math.round(camera.heightPx * factor), camera.focalPx * factor, camera.radial);
}

/** Divides a distorted place (u, v from the middle, in pixels) into the factor that makes it straight. */
export function straighteningFactor(camera: PinholeCamera, u: number, v: number): number {
  if (camera.radial === 0) {
    return 1;
  }
  const seen = Math.hypot(u, v) / camera.focalPx;
  return seen === 0 ? 1 : straightRadius(seen, camera.radial) / seen;
}

/** Solves r (1 + k r^2) = seen by Newton steps; `pinholeCamera` has made sure that there is one answer. */
function straightRadius(seen: number, radial: number): number {
  let r = seen;
  for (let step = 0; step < 20; step++) {
    const change = (r * (1 + radial * r * r) - seen) / (1 + 3 * radial * r * r);
    r -= change;
    if (Math.abs(change) <= 1e-15 * seen) {
      break;
    }
  }
  return r;
}

/** Writes the direction (right, up, ahead; not of unit length) in which a picture place looks. */
export function lookThrough(camera: PinholeCamera, x: number, y: number, out: Float64Array): void {
  const u = x - camera.widthPx / 2;
  const v = y - camera.heightPx / 2;
  const factor = straighteningFactor(camera, u, v);
  out[0] = u * factor;
  out[1] = -v * factor;
  out[2] = camera.focalPx;
}

/** Where a direction (right, up, ahead) falls in the picture's plane; null from behind the camera or past a barrel's edge. */
export function fallOn(
  camera: PinholeCamera,
  right: number,
  up: number,
  ahead: number,
): readonly [number, number] | null {
  if (!(ahead > 0)) {
    return null;
  }
  const r2 = (right * right + up * up) / (ahead * ahead);
  if (1 + 3 * camera.radial * r2 <= 0) {
    return null;
  }
  const scale = (camera.focalPx * (1 + camera.radial * r2)) / ahead;
  return [camera.widthPx / 2 + right * scale, camera.heightPx / 2 - up * scale];
}

function mustBePositive(name: string, value: number): void {
  if (!(value > 0 && Number.isFinite(value))) {
    throw new RangeError(`The ${name} must be a positive number, not ${value}.`);
  }
}
