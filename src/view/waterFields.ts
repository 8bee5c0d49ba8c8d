import { straighteningFactor } from './pinholeCamera.ts';
import type { WaterView } from './waterView.ts';

/** Rows `from` up to but not including `to`, so that workers can share a photo. */
export interface Rows {
  readonly from: number;
  readonly to: number;
}

/**
 * Incidence on level water at each pixel's middle, radians, row by row; at least pi/2 above the horizon. Single
 * precision keeps it to 1e-7 rad. One arc cosine a pixel, no allocation but the answer.
 */
export function incidenceField(view: WaterView, rows: Rows = allRows(view)): Float32Array {
  const { widthPx, focalPx } = view.camera;
  const field = new Float32Array((rows.to - rows.from) * widthPx);
  let at = 0;
  eachPixel(view, rows, (down, off2) => {
    field[at++] = Math.acos(down / Math.sqrt(off2 + focalPx * focalPx));
  });
  return field;
}

/**
 * Water area that each pixel covers, square metres, row by row; NaN at and above the horizon. The projection's Jacobian
 * at the pixel's middle: a pixel of one square at focal length f subtends f / (u^2 + v^2 + f^2)^(3/2), and the water
 * lies h / cos(i) away under the cosine of the incidence, so the area is h^2 f / d^3 with d the downward component of
 * the direction (u, v, f) in pixels. Distortion multiplies it by the shrinking of the picture, 1 / ((1 + k r^2)(1 + 3 k r^2)).
 */
export function groundAreaField(view: WaterView, rows: Rows = allRows(view)): Float32Array {
  const { widthPx, focalPx, radial } = view.camera;
  const field = new Float32Array((rows.to - rows.from) * widthPx);
  const scale = view.heightM * view.heightM * focalPx;
  let at = 0;
  eachPixel(view, rows, (down, off2) => {
    const bend = (radial * off2) / (focalPx * focalPx);
    field[at++] = down > 0 ? scale / (down * down * down * (1 + bend) * (1 + 3 * bend)) : Number.NaN;
  });
  return field;
}

/** Water area of one pixel about the picture place (x, y), square metres; NaN at and above the horizon. */
export function groundAreaAtM2(view: WaterView, x: number, y: number): number {
  const { camera, axes, heightM } = view;
  const u = x - camera.widthPx / 2;
  const v = y - camera.heightPx / 2;
  const factor = straighteningFactor(camera, u, v);
  const down = -(u * factor * axes.right[2] - v * factor * axes.up[2] + camera.focalPx * axes.ahead[2]);
  const bend = (camera.radial * (u * u + v * v) * factor * factor) / (camera.focalPx * camera.focalPx);
  return down > 0
    ? (heightM * heightM * camera.focalPx) / (down * down * down * (1 + bend) * (1 + 3 * bend))
    : Number.NaN;
}

/** Hands on the downward component of each pixel's direction and its squared distance from the axis, both in pixels. */
function eachPixel(view: WaterView, rows: Rows, take: (down: number, off2: number) => void): void {
  const { camera, axes } = view;
  const { widthPx, heightPx, focalPx } = camera;
  if (!(rows.from >= 0 && rows.from <= rows.to && rows.to <= heightPx)) {
    throw new RangeError(`Rows ${rows.from} to ${rows.to} are not in a photo of ${heightPx} rows.`);
  }
  const straight = camera.radial === 0;
  for (let row = rows.from; row < rows.to; row++) {
    const v = row + 0.5 - heightPx / 2;
    for (let column = 0; column < widthPx; column++) {
      const u = column + 0.5 - widthPx / 2;
      const factor = straight ? 1 : straighteningFactor(camera, u, v);
      take(
        -factor * (u * axes.right[2] - v * axes.up[2]) - focalPx * axes.ahead[2],
        factor * factor * (u * u + v * v),
      );
    }
  }
}

function allRows(view: WaterView): Rows {
  return { from: 0, to: view.camera.heightPx };
}
