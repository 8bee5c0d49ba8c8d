import { groundAreaAtM2 } from './waterFields.ts';
import { incidenceAtRad, type WaterView } from './waterView.ts';

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
  const { widthPx, heightPx } = view.camera;
  for (let row = 0; row < cells.rows; row++) {
    const y = ((row + 0.5) * heightPx) / cells.rows;
    for (let column = 0; column < cells.columns; column++) {
      const x = ((column + 0.5) * widthPx) / cells.columns;
      const cell = row * cells.columns + column;
      out.areaM2[cell] = groundAreaAtM2(view, x, y);
      out.incidenceRad[cell] = incidenceAtRad(view, x, y);
    }
  }
}
