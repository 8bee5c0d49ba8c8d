/**
 * How the camera is held. World axes: x to the right of the look direction, y ahead of it, both level; z up.
 * A positive pitch looks up; a positive roll means the camera is turned clockwise, seen from behind it.
 */
export interface Tilt {
  readonly pitchRad: number;
  readonly rollRad: number;
}

/** World directions of the camera's axes, each [x, y, z]. */
export interface CameraAxes {
  readonly right: readonly [number, number, number];
  readonly up: readonly [number, number, number];
  readonly ahead: readonly [number, number, number];
}

/** Roll about the optical axis first, then pitch about the level axis to the right. */
export function cameraAxes({ pitchRad, rollRad }: Tilt): CameraAxes {
  const cosPitch = Math.cos(pitchRad);
  const sinPitch = Math.sin(pitchRad);
  const cosRoll = Math.cos(rollRad);
  const sinRoll = Math.sin(rollRad);
  return {
    right: [cosRoll, sinRoll * sinPitch, -sinRoll * cosPitch],
    up: [sinRoll, -cosRoll * sinPitch, cosRoll * cosPitch],
    ahead: [0, cosPitch, sinPitch],
  };
}

/**
 * Tilt from the direction of the world's up in camera axes (right, up, ahead), of any length. Looking straight down or
 * up leaves roll and heading one and the same turn: roll is then 0, and "ahead" is the top of the picture.
 */
export function tiltFromUp(right: number, up: number, ahead: number): Tilt {
  const level = Math.hypot(right, up);
  return {
    pitchRad: Math.atan2(ahead, level),
    rollRad: level <= 1e-12 * Math.abs(ahead) ? 0 : Math.atan2(-right, up),
  };
}
