import { horizonDipRad, type Place, tiltFromHorizon } from './horizon.ts';
import type { Notice } from './notice.ts';
import { focalPxFrom35mm, type PinholeCamera, pinholeCamera } from './pinholeCamera.ts';
import { groundDistanceM, type WaterView, waterView } from './waterView.ts';

/** A known length on the water (boom section, hull, quay edge) beside what the view makes of it. */
export interface LengthCheck {
  readonly statedM: number;
  readonly measuredM: number;
  /** stated / measured; all ground lengths grow with the height of the lens, so this also corrects the height. */
  readonly factor: number;
  /** Height above the water that would make both agree, metres. */
  readonly impliedHeightM: number;
  /** measured / stated - 1. */
  readonly disagreement: number;
  /** Set where they differ by more than a tenth. */
  readonly notice: Notice | null;
}

/**
 * Compares a known length between two picture places, both at the waterline, with the view; to use it as the scale
 * instead, take `impliedHeightM`.
 * @throws RangeError where a place is at or above the horizon or the length is not positive
 */
export function scaleFromLength(view: WaterView, a: Place, b: Place, lengthM: number): LengthCheck {
  mustBeLength(lengthM);
  const measuredM = groundDistanceM(view, a, b);
  if (!(measuredM > 0)) {
    throw new RangeError(
      'Both ends of the known length must lie on the water, below the horizon, and apart.',
    );
  }
  const factor = lengthM / measuredM;
  const disagreement = 1 / factor - 1;
  const off = Math.round(100 * Math.abs(disagreement));
  return {
    statedM: lengthM,
    measuredM,
    factor,
    impliedHeightM: view.heightM * factor,
    disagreement,
    notice:
      Math.abs(disagreement) > 0.1
        ? {
            code: 'length-disagrees',
            text: `The known length comes out ${off} % too ${disagreement > 0 ? 'long' : 'short'}: check height, tilt and focal length. A height of ${(view.heightM * factor).toPrecision(3)} m would make it fit.`,
          }
        : null,
  };
}

/**
 * Fits the focal length to a known length on the water when the height and two places on the horizon are known: the
 * tilt follows the focal length, and bisection finds the one that gives the length. Lengths along the look direction
 * tell the focal length; a length across the view does not, because its scale is set by the horizon and the height.
 * @returns the camera with the fitted focal length, looked for between 10 and 400 mm (35 mm equivalent)
 * @throws RangeError where the length hardly depends on the focal length, or none fits
 */
export function focalFromLength(
  camera: PinholeCamera,
  heightM: number,
  horizon: readonly [Place, Place],
  a: Place,
  b: Place,
  lengthM: number,
): PinholeCamera {
  mustBeLength(lengthM);
  const at = (focalPx: number) => pinholeCamera(camera.widthPx, camera.heightPx, focalPx, camera.radial);
  const lengthAt = (focalPx: number) => {
    const trial = at(focalPx);
    const tilt = tiltFromHorizon(trial, horizon[0], horizon[1], horizonDipRad(heightM));
    return groundDistanceM(waterView({ camera: trial, heightM, ...tilt }), a, b);
  };
  let short = focalPxFrom35mm(10, camera.widthPx, camera.heightPx);
  let long = focalPxFrom35mm(400, camera.widthPx, camera.heightPx);
  const shortM = lengthAt(short);
  const longM = lengthAt(long);
  if (Number.isNaN(shortM) || Number.isNaN(longM)) {
    throw new RangeError('Both ends of the known length must lie on the water, below the horizon.');
  }
  if (!(longM > 2 * shortM)) {
    throw new RangeError(
      'This length runs across the view and cannot tell the focal length: mark one that runs away from the camera, or use it as the scale.',
    );
  }
  if (!(lengthM >= shortM && lengthM <= longM)) {
    throw new RangeError(
      `No focal length makes this ${lengthM} m: between 10 and 400 mm it comes out as ${shortM.toPrecision(3)} to ${longM.toPrecision(3)} m. Check the height and the horizon.`,
    );
  }
  for (let step = 0; step < 60; step++) {
    const middle = Math.sqrt(short * long);
    if (lengthAt(middle) < lengthM) {
      short = middle;
    } else {
      long = middle;
    }
  }
  return at(Math.sqrt(short * long));
}

function mustBeLength(lengthM: number): void {
  if (!(lengthM > 0 && Number.isFinite(lengthM))) {
    throw new RangeError('Give the known length in metres, more than 0.');
  }
}
