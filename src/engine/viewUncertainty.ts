import { scaleFromLength } from '../view/groundScale.ts';
import { pinholeCamera } from '../view/pinholeCamera.ts';
import { type PoseDraw, posesFromHorizon, posesFromTilt } from '../view/poseDraws.ts';
import { straightDownFromPixelSize } from '../view/straightDown.ts';
import { type WaterView, waterView } from '../view/waterView.ts';
import type { ViewSetup } from './setup.ts';

/**
 * How sure a view is, one standard deviation each. Defaults where a set-up does not say (common practice, not
 * published): height paced or read off a quay to 5 %; focal length 2 % (makers round it and crop for stabilisation);
 * pitch 0.5 degrees from a phone's sensor; roll the same, or 1 degree where it is only taken as level; a finger's tap
 * on the horizon 0.2 % of the longer side of the photo.
 */
export interface ViewSd {
  /** Of the height, of a length that sets it, or of a stated pixel size, as a share. */
  readonly heightShare: number;
  readonly focalShare: number;
  readonly pitchRad: number;
  readonly rollRad: number;
  /** Of a tap on the horizon, across it, pixels. */
  readonly tapPx: number;
}

/** Views that what is known allows. What the set-up fixes (a length, a pixel size) stays fixed as the rest moves. */
export function poseDrawFor(given: ViewSetup, view: WaterView, sd: ViewSd): PoseDraw {
  if (given.pixelSizeM !== undefined) return posesFromPixelSize(view, given.pixelSizeM, sd);
  const length = given.knownLength?.sets === true ? given.knownLength : null;
  const heightShare = length ? 0 : sd.heightShare;
  const base = given.horizon
    ? posesFromHorizon(view, given.horizon, { ...sd, heightShare })
    : posesFromTilt(view, { ...sd, heightShare });
  if (!length) return base;
  return (random) => {
    const drawn = base(random);
    const factor = Math.exp(sd.heightShare * random.normal());
    try {
      const { impliedHeightM } = scaleFromLength(drawn, ...length.ends, length.lengthM * factor);
      return waterView({ ...drawn, heightM: impliedHeightM });
    } catch (error) {
      // A draw whose horizon lies below an end of the length cannot be scaled by it.
      if (error instanceof RangeError) return drawn;
      throw error;
    }
  };
}

/** Straight down at a stated pixel size: another focal length changes the angles but not the areas. */
function posesFromPixelSize(view: WaterView, pixelSizeM: number, sd: ViewSd): PoseDraw {
  const { widthPx, heightPx, focalPx, radial } = view.camera;
  return (random) => {
    const size = pixelSizeM * Math.exp(sd.heightShare * random.normal());
    const focal = focalPx * Math.exp(sd.focalShare * random.normal());
    const down = straightDownFromPixelSize(pinholeCamera(widthPx, heightPx, focal, radial), size);
    const pitchRad = -Math.PI / 2 + Math.abs(sd.pitchRad * random.normal());
    return waterView({ ...down, pitchRad });
  };
}
