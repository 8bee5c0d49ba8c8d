/** Thickness differences between neighbours above this are a step: finer than a photo with 4:2:0 colour can show. */
export const STEP_NM = 30;
/** Pixels to each side of a step that JPEG's colour samples mix with it. */
export const STEP_REACH_PX = 3;

/**
 * 1 on pixels within `STEP_REACH_PX` (each way) of a neighbour pair that differs by more than `STEP_NM`; NaN thickness
 * (no film, no bare surface) makes no step. Row by row, width x height.
 */
export function nearSteps(thicknessNm: Float32Array, width: number, height: number): Uint8Array {
  const near = new Uint8Array(width * height);
  const mark = (column: number, row: number) => {
    for (let y = Math.max(0, row - STEP_REACH_PX); y <= Math.min(height - 1, row + STEP_REACH_PX); y++) {
      const from = y * width + Math.max(0, column - STEP_REACH_PX);
      near.fill(1, from, y * width + Math.min(width - 1, column + STEP_REACH_PX) + 1);
    }
  };
  for (let row = 0; row < height; row++) {
    for (let column = 0; column < width; column++) {
      const at = row * width + column;
      const nm = thicknessNm[at]!;
      const right = column < width - 1 && Math.abs(thicknessNm[at + 1]! - nm) > STEP_NM;
      const below = row < height - 1 && Math.abs(thicknessNm[at + width]! - nm) > STEP_NM;
      if (right || below) {
        mark(column, row);
        mark(column + (right ? 1 : 0), row + (below ? 1 : 0));
      }
    }
  }
  return near;
}
