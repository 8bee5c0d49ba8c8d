/**
 * Film thickness in nanometres at a place; 0 where the surface is bare, NaN where there is none (frame, cloth, quay).
 * Upright pictures: x to the right from 0 to 1, y down from 0 to 1. Level water: metres on the ground, see `harbour.ts`.
 */
export type ThicknessField = (x: number, y: number) => number;

/** Values of a field at pixel centres, row by row from the top left. */
export function sampleField(field: ThicknessField, width: number, height: number): Float32Array {
  const values = new Float32Array(width * height);
  for (let row = 0; row < height; row++) {
    const y = (row + 0.5) / height;
    for (let column = 0; column < width; column++) {
      values[row * width + column] = field((column + 0.5) / width, y);
    }
  }
  return values;
}
