import type { Notice } from './notice.ts';
import type { SunPosition } from './sun.ts';
import { lookAt, type WaterView } from './waterView.ts';

const DEGREE = Math.PI / 180;

/**
 * How far a facet of the surface must lean from level to mirror the sun into a line of sight, radians: half the angle
 * between level water's mirror direction and the sun, which is the angle of (to the sun + to the viewer) from the vertical.
 * `look` is the unit line of sight and `toSun` the unit direction of the sun, in the same axes with z up.
 */
export function glintTiltRad(look: ArrayLike<number>, toSun: ArrayLike<number>): number {
  const x = toSun[0]! - look[0]!;
  const y = toSun[1]! - look[1]!;
  const z = toSun[2]! - look[2]!;
  return Math.atan2(Math.hypot(x, y), z);
}

/** Unit direction of the sun in the view's axes (x right, y ahead, z up) for a camera whose axis bears `headingDeg`. */
export function sunInView(sun: SunPosition, headingDeg: number): readonly [number, number, number] {
  const bearing = (sun.azimuthDeg - headingDeg) * DEGREE;
  const level = Math.cos(sun.elevationDeg * DEGREE);
  return [level * Math.sin(bearing), level * Math.cos(bearing), Math.sin(sun.elevationDeg * DEGREE)];
}

/** Facets that lean by up to this many root mean square slopes make a visible glitter. */
const GLITTER_SDS = 2;

export interface GlintReport {
  /** Share of the water in the photo, by pixels, where glitter is likely. */
  readonly share: number;
  /** Least lean that mirrors the sun anywhere on the water in the photo, radians; NaN without water or sun. */
  readonly leastTiltRad: number;
  readonly notice: Notice | null;
}

/**
 * Looks for sun glitter on a grid over the photo. `slopeVariance` is the mean square slope of the surface (see
 * `slopeVariance`); glitter is likely where facets leaning less than twice its root send the sun into the lens.
 */
export function glintReport(
  view: WaterView,
  sun: SunPosition,
  headingDeg: number,
  slopeVariance: number,
): GlintReport {
  if (sun.elevationDeg <= 0) {
    return { share: 0, leastTiltRad: Number.NaN, notice: null };
  }
  const toSun = sunInView(sun, headingDeg);
  const limitRad = Math.atan(GLITTER_SDS * Math.sqrt(slopeVariance));
  const look = new Float64Array(3);
  let water = 0;
  let glitter = 0;
  let least = Number.POSITIVE_INFINITY;
  for (let row = 0; row < GRID; row++) {
    for (let column = 0; column < GRID; column++) {
      lookAt(
        view,
        ((column + 0.5) * view.camera.widthPx) / GRID,
        ((row + 0.5) * view.camera.heightPx) / GRID,
        look,
      );
      if (look[2]! < 0) {
        const tilt = glintTiltRad(look, toSun);
        water++;
        least = Math.min(least, tilt);
        glitter += tilt < limitRad ? 1 : 0;
      }
    }
  }
  const share = water > 0 ? glitter / water : 0;
  return {
    share,
    leastTiltRad: water > 0 ? least : Number.NaN,
    notice:
      share > 0
        ? {
            code: 'sun-glint',
            text: `Sun glitter is likely on ${Math.max(1, Math.round(100 * share))} % of the water in this photo: it hides the film there. Take one from another side, if you can.`,
          }
        : null,
  };
}

const GRID = 40;
