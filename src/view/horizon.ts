import { fallOn, lookThrough, type PinholeCamera } from './pinholeCamera.ts';
import { cameraAxes, type Tilt, tiltFromUp } from './tilt.ts';

/** Mean radius of the Earth (IUGG, R1 of GRS 80), metres. */
export const EARTH_RADIUS_M = 6_371_008.8;

/** With refraction: 1.76' times the root of the height in metres (Nautical Almanac, dip table and its formula). */
const ALMANAC_DIP_RAD = ((1.76 / 60) * Math.PI) / 180;

/**
 * How far the sea horizon lies below the horizontal, radians, from `heightM` above the water. With `refraction` the
 * almanac's figure for ordinary air; without, the geometry of a sphere (about 1.93' times the root of the height).
 * @throws RangeError where the height is negative
 */
export function horizonDipRad(heightM: number, refraction = true): number {
  if (!(heightM >= 0)) {
    throw new RangeError('The height above the water must not be negative.');
  }
  return refraction
    ? ALMANAC_DIP_RAD * Math.sqrt(heightM)
    : Math.atan2(Math.sqrt(heightM * (2 * EARTH_RADIUS_M + heightM)), EARTH_RADIUS_M);
}

/** A place in the picture, pixels from the top left. */
export type Place = readonly [number, number];

/**
 * Pitch and roll from two places on the sea horizon, exactly: the up direction makes the same angle with both lines of
 * sight, 90 degrees plus the dip. Of the two such directions the one nearer the top of the picture is meant.
 * `dipRad` is 0 for a waterline on a far shore at the level of the lens, `horizonDipRad(height)` for open sea.
 * @throws RangeError where the places are closer than a twentieth of the width, which leaves the roll to the tremor
 * of a finger
 */
export function tiltFromHorizon(camera: PinholeCamera, first: Place, second: Place, dipRad: number): Tilt {
  const apartPx = Math.hypot(second[0] - first[0], second[1] - first[1]);
  if (!(apartPx >= camera.widthPx / 20)) {
    throw new RangeError(
      'The two places on the horizon are too close together: tap one near each side of the photo.',
    );
  }
  const a = unitLook(camera, first);
  const b = unitLook(camera, second);
  const cross = [a[1]! * b[2]! - a[2]! * b[1]!, a[2]! * b[0]! - a[0]! * b[2]!, a[0]! * b[1]! - a[1]! * b[0]!];
  const along = -Math.sin(dipRad) / (1 + a[0]! * b[0]! + a[1]! * b[1]! + a[2]! * b[2]!);
  const sum = [a[0]! + b[0]!, a[1]! + b[1]!, a[2]! + b[2]!];
  const left = 1 - along * along * (sum[0]! * sum[0]! + sum[1]! * sum[1]! + sum[2]! * sum[2]!);
  const size = Math.hypot(cross[0]!, cross[1]!, cross[2]!);
  const across = (Math.sqrt(Math.max(0, left)) / size) * (cross[1]! < 0 ? -1 : 1);
  return tiltFromUp(
    along * sum[0]! + across * cross[0]!,
    along * sum[1]! + across * cross[1]!,
    along * sum[2]! + across * cross[2]!,
  );
}

/**
 * The horizon as it should appear: picture places at `count` evenly spaced bearings across the photo, left to right,
 * those off the photo left out. Empty where the horizon is not in the photo.
 */
export function horizonInPhoto(camera: PinholeCamera, tilt: Tilt, dipRad: number, count = 33): Place[] {
  const axes = cameraAxes(tilt);
  const halfRad = Math.min(1.5, Math.atan(Math.hypot(camera.widthPx, camera.heightPx) / camera.focalPx));
  const places: Place[] = [];
  for (let i = 0; i < count; i++) {
    const bearing = halfRad * ((2 * i) / (count - 1) - 1);
    const x = Math.cos(dipRad) * Math.sin(bearing);
    const y = Math.cos(dipRad) * Math.cos(bearing);
    const z = -Math.sin(dipRad);
    const at = fallOn(camera, dot(axes.right, x, y, z), dot(axes.up, x, y, z), dot(axes.ahead, x, y, z));
    if (at && at[0] >= 0 && at[0] <= camera.widthPx && at[1] >= 0 && at[1] <= camera.heightPx) {
      places.push(at);
    }
  }
  return places;
}

/** One standard deviation of pitch and roll when each tap strays by `tapSdPx` across the horizon. */
export function horizonTiltSd(camera: PinholeCamera, first: Place, second: Place, tapSdPx: number): Tilt {
  const base = tiltFromHorizon(camera, first, second, 0);
  const apartPx = Math.hypot(second[0] - first[0], second[1] - first[1]);
  const stepX = (-(second[1] - first[1]) / apartPx) * tapSdPx;
  const stepY = ((second[0] - first[0]) / apartPx) * tapSdPx;
  const one = tiltFromHorizon(camera, [first[0] + stepX, first[1] + stepY], second, 0);
  const other = tiltFromHorizon(camera, first, [second[0] + stepX, second[1] + stepY], 0);
  return {
    pitchRad: Math.hypot(one.pitchRad - base.pitchRad, other.pitchRad - base.pitchRad),
    rollRad: Math.hypot(one.rollRad - base.rollRad, other.rollRad - base.rollRad),
  };
}

function unitLook(camera: PinholeCamera, place: Place): Float64Array {
  const look = new Float64Array(3);
  lookThrough(camera, place[0], place[1], look);
  const size = Math.hypot(look[0]!, look[1]!, look[2]!);
  return look.map((part) => part / size);
}

function dot(axis: readonly [number, number, number], x: number, y: number, z: number): number {
  return axis[0] * x + axis[1] * y + axis[2] * z;
}
