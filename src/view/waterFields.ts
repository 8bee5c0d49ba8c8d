import { type PinholeCamera, straighteningFactor } from './pinholeCamera.ts';
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
  const { widthPx, heightPx, focalPx } = view.camera;
  mustBeRows(rows, heightPx);
  const straighten = straightener(view.camera);
  const alongU = -view.axes.right[2];
  const alongV = view.axes.up[2];
  const alongAxis = -focalPx * view.axes.ahead[2];
  const field = new Float32Array((rows.to - rows.from) * widthPx);
  let at = 0;
  for (let row = rows.from; row < rows.to; row++) {
    const v = row + 0.5 - heightPx / 2;
    for (let column = 0; column < widthPx; column++) {
      const u = column + 0.5 - widthPx / 2;
      const off2 = u * u + v * v;
      const factor = straighten ? straighten(off2) : 1;
      const down = factor * (u * alongU + v * alongV) + alongAxis;
      field[at++] = Math.acos(down / Math.sqrt(factor * factor * off2 + focalPx * focalPx));
    }
  }
  return field;
}

/**
 * Water area that each pixel covers, square metres, row by row; NaN at and above the horizon. The projection's Jacobian
 * at the pixel's middle: a pixel of one square at focal length f subtends f / (u^2 + v^2 + f^2)^(3/2), and the water
 * lies h / cos(i) away under the cosine of the incidence, so the area is h^2 f / d^3 with d the downward component of
 * the direction (u, v, f) in pixels. Distortion multiplies it by the shrinking of the picture, 1 / ((1 + k r^2)(1 + 3 k r^2)).
 */
export function groundAreaField(view: WaterView, rows: Rows = allRows(view)): Float32Array {
  const { widthPx, heightPx, focalPx, radial } = view.camera;
  mustBeRows(rows, heightPx);
  const straighten = straightener(view.camera);
  const alongU = -view.axes.right[2];
  const alongV = view.axes.up[2];
  const alongAxis = -focalPx * view.axes.ahead[2];
  const scale = view.heightM * view.heightM * focalPx;
  const field = new Float32Array((rows.to - rows.from) * widthPx);
  let at = 0;
  for (let row = rows.from; row < rows.to; row++) {
    const v = row + 0.5 - heightPx / 2;
    for (let column = 0; column < widthPx; column++) {
      const u = column + 0.5 - widthPx / 2;
      let factor = 1;
      let shrink = 1;
      if (straighten) {
        const off2 = u * u + v * v;
        factor = straighten(off2);
        const bend = (radial * factor * factor * off2) / (focalPx * focalPx);
        shrink = (1 + bend) * (1 + 3 * bend);
      }
      const down = factor * (u * alongU + v * alongV) + alongAxis;
      field[at++] = down > 0 ? scale / (down * down * down * shrink) : Number.NaN;
    }
  }
  return field;
}

/**
 * Cosine of the incidence at the middle of a pixel, one at a time: the same angle as `incidenceField` without its arc
 * cosine. At most 0 from the horizon up. @param firstRow the view's row of row 0, for a part of a photo
 */
export function cosineReader(view: WaterView, firstRow = 0): (x: number, y: number) => number {
  const { widthPx, heightPx, focalPx } = view.camera;
  const straighten = straightener(view.camera);
  const alongU = -view.axes.right[2];
  const alongV = view.axes.up[2];
  const alongAxis = -focalPx * view.axes.ahead[2];
  const focal2 = focalPx * focalPx;
  const left = 0.5 - widthPx / 2;
  const top = firstRow + 0.5 - heightPx / 2;
  return (x, y) => {
    const u = x + left;
    const v = y + top;
    const off2 = u * u + v * v;
    const factor = straighten ? straighten(off2) : 1;
    return (factor * (u * alongU + v * alongV) + alongAxis) / Math.sqrt(factor * factor * off2 + focal2);
  };
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

/** Places of the table that stands in for Newton steps: linear between them, it is off by under 1e-7 for a bend of a tenth. */
const TABLE = 4096;

/** The straightening factor as a function of the squared distance from the middle, in pixels; null without distortion. */
function straightener(camera: PinholeCamera): ((off2: number) => number) | null {
  if (camera.radial === 0) {
    return null;
  }
  const most = (camera.widthPx * camera.widthPx + camera.heightPx * camera.heightPx) / 4;
  const table = Float64Array.from({ length: TABLE + 2 }, (_, i) =>
    straighteningFactor(camera, Math.sqrt((most * Math.min(i, TABLE)) / TABLE), 0),
  );
  const perPlace = TABLE / most;
  return (off2) => {
    const place = off2 * perPlace;
    const below = Math.floor(place);
    return table[below]! + (place - below) * (table[below + 1]! - table[below]!);
  };
}

function mustBeRows(rows: Rows, heightPx: number): void {
  if (!(rows.from >= 0 && rows.from <= rows.to && rows.to <= heightPx)) {
    throw new RangeError(`Rows ${rows.from} to ${rows.to} are not in a photo of ${heightPx} rows.`);
  }
}

function allRows(view: WaterView): Rows {
  return { from: 0, to: view.camera.heightPx };
}
