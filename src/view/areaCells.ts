import { straighteningFactor } from './pinholeCamera.ts';
import type { WaterView } from './waterView.ts';

/**
 * A photo cut into a few hundred rectangles, over each of which a change of height, tilt or focal length changes all
 * pixel areas by nearly one factor. What a Monte Carlo trial has to work out is then one factor a cell, not one a pixel.
 */
export interface AreaCells {
  readonly columns: number;
  readonly rows: number;
  readonly count: number;
  /** Cell column of each pixel column and cell row of each pixel row: the cell is rowOf * columns + columnOf. */
  readonly columnOf: Uint16Array;
  readonly rowOf: Uint16Array;
}

/** Cells for a photo of `widthPx` x `heightPx`. Rows are narrow because tilt acts along them. */
export function areaCells(widthPx: number, heightPx: number, columns = 8, rows = 48): AreaCells {
  const across = Math.min(columns, widthPx);
  const down = Math.min(rows, heightPx);
  return {
    columns: across,
    rows: down,
    count: across * down,
    columnOf: Uint16Array.from({ length: widthPx }, (_, x) => Math.floor((x * across) / widthPx)),
    rowOf: Uint16Array.from({ length: heightPx }, (_, y) => Math.floor((y * down) / heightPx)),
  };
}

/** Area and incidence at the middle of each cell. */
export interface CellView {
  readonly areaM2: Float64Array;
  readonly incidenceRad: Float64Array;
}

/** Working space for `lookFromCells`. */
export function newCellView(cells: AreaCells): CellView {
  return { areaM2: new Float64Array(cells.count), incidenceRad: new Float64Array(cells.count) };
}

/**
 * Writes area and incidence at the middle of each cell for this view. Cells at or above the horizon get area NaN.
 * Only ratios of areas between views of the same photo are of use, so the pixel size cancels.
 */
export function lookFromCells(view: WaterView, cells: AreaCells, out: CellView): void {
  const { camera, axes, heightM } = view;
  const { widthPx, heightPx, focalPx, radial } = camera;
  const scale = heightM * heightM * focalPx;
  for (let row = 0; row < cells.rows; row++) {
    const v = ((row + 0.5) / cells.rows - 0.5) * heightPx;
    for (let column = 0; column < cells.columns; column++) {
      const u = ((column + 0.5) / cells.columns - 0.5) * widthPx;
      const cell = row * cells.columns + column;
      const factor = straighteningFactor(camera, u, v);
      const off2 = factor * factor * (u * u + v * v);
      const down = -factor * (u * axes.right[2] - v * axes.up[2]) - focalPx * axes.ahead[2];
      const bend = (radial * off2) / (focalPx * focalPx);
      out.areaM2[cell] = down > 0 ? scale / (down * down * down * (1 + bend) * (1 + 3 * bend)) : Number.NaN;
      out.incidenceRad[cell] = Math.acos(down / Math.sqrt(off2 + focalPx * focalPx));
    }
  }
}
