import { type Tilt, tiltFromUp } from './tilt.ts';

const DEGREE = Math.PI / 180;

/**
 * Tilt of the rear camera from a phone's own sensor: `betaDeg` and `gammaDeg` as in the W3C DeviceOrientation event
 * (turns Z-X'-Y'' by alpha, beta, gamma; device x to the right of the upright screen, y to its top, z out of it), and
 * `screenAngleDeg` as in the W3C Screen Orientation angle at the time (0 upright, 90 turned anticlockwise). The rear
 * camera looks along -z. Alpha, the compass, has no say in the tilt.
 * @throws RangeError where an angle is not a number: some browsers send null until the sensor is allowed
 */
export function tiltFromSensor(betaDeg: number, gammaDeg: number, screenAngleDeg = 0): Tilt {
  if (!Number.isFinite(betaDeg) || !Number.isFinite(gammaDeg) || !Number.isFinite(screenAngleDeg)) {
    throw new RangeError('The tilt sensor gave no reading: mark the horizon in the photo, or type the tilt.');
  }
  const beta = betaDeg * DEGREE;
  const gamma = gammaDeg * DEGREE;
  // Third row of the spec's rotation matrix: the world's up in device axes.
  const x = -Math.cos(beta) * Math.sin(gamma);
  const y = Math.sin(beta);
  const z = Math.cos(beta) * Math.cos(gamma);
  const turn = screenAngleDeg * DEGREE;
  return tiltFromUp(x * Math.cos(turn) - y * Math.sin(turn), x * Math.sin(turn) + y * Math.cos(turn), -z);
}
