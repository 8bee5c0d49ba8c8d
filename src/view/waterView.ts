import { fallOn, lookThrough, type PinholeCamera } from './pinholeCamera.ts';
import { type CameraAxes, cameraAxes, type Tilt } from './tilt.ts';

/**
 * A camera over level water. Ground places are metres on the water, x to the right and y ahead of the point below the
 * lens. The water is taken as flat: at 75 degrees from the vertical the line of sight ends 3.7 heights away, where the
 * Earth has curved down by 7 heights squared over its radius, 10 cm from 300 m up.
 */
export interface WaterView extends Tilt {
  readonly camera: PinholeCamera;
  /** Height of the lens above the water, metres. */
  readonly heightM: number;
  readonly axes: CameraAxes;
}

export interface WaterPose extends Tilt {
  readonly camera: PinholeCamera;
  readonly heightM: number;
}

/** @throws RangeError where the height is not positive or an angle is not a number */
export function waterView({ camera, heightM, pitchRad, rollRad }: WaterPose): WaterView {
  if (!(heightM > 0 && Number.isFinite(heightM))) {
    throw new RangeError('Give the height of the lens above the water in metres, more than 0.');
  }
  if (!(Math.abs(pitchRad) <= Math.PI / 2 && Number.isFinite(rollRad))) {
    throw new RangeError('The pitch must lie between -90 and 90 degrees, and the roll must be a number.');
  }
  return { camera, heightM, pitchRad, rollRad, axes: cameraAxes({ pitchRad, rollRad }) };
}

/** Writes the unit direction, in world axes, in which a picture place looks. */
export function lookAt(view: WaterView, x: number, y: number, out: Float64Array): void {
  lookThrough(view.camera, x, y, out);
  const [right, up, ahead] = [out[0]!, out[1]!, out[2]!];
  const size = Math.hypot(right, up, ahead);
  const { axes } = view;
  for (let i = 0; i < 3; i++) {
    out[i] = (right * axes.right[i]! + up * axes.up[i]! + ahead * axes.ahead[i]!) / size;
  }
}

/** Angle between the line of sight and the vertical, radians: the incidence on level water; above pi/2 it meets the sky. */
export function incidenceAtRad(view: WaterView, x: number, y: number): number {
  const look = new Float64Array(3);
  lookAt(view, x, y, look);
  return Math.atan2(Math.hypot(look[0]!, look[1]!), -look[2]!);
}

/** Where on the water a picture place looks, [xM, yM]; null at and above the horizon. */
export function groundAt(view: WaterView, x: number, y: number): readonly [number, number] | null {
  const look = new Float64Array(3);
  lookAt(view, x, y, look);
  if (!(look[2]! < 0)) {
    return null;
  }
  const reach = view.heightM / -look[2]!;
  return [look[0]! * reach, look[1]! * reach];
}

/** Where in the picture's plane a place on the water falls; null from behind the camera. It may lie off the photo. */
export function placeOf(view: WaterView, xM: number, yM: number): readonly [number, number] | null {
  const { right, up, ahead } = view.axes;
  const z = -view.heightM;
  return fallOn(
    view.camera,
    right[0] * xM + right[1] * yM + right[2] * z,
    up[0] * xM + up[1] * yM + up[2] * z,
    ahead[0] * xM + ahead[1] * yM + ahead[2] * z,
  );
}

/** Distance along the water between two picture places, metres; NaN where one of them is not on the water. */
export function groundDistanceM(
  view: WaterView,
  a: readonly [number, number],
  b: readonly [number, number],
): number {
  const from = groundAt(view, a[0], a[1]);
  const to = groundAt(view, b[0], b[1]);
  return from && to ? Math.hypot(to[0] - from[0], to[1] - from[1]) : Number.NaN;
}
