type Place = readonly [number, number];

/**
 * The plane perspective that takes the unit square to a quadrilateral, in closed form (Heckbert 1989, Fundamentals of
 * Texture Mapping and Image Warping, 2.2.3).
 * @param corners where (0, 0), (1, 0), (1, 1) and (0, 1) go
 * @returns a place of the unit square (or beyond) to a place of the plane
 */
export function squareTo(corners: readonly [Place, Place, Place, Place]): (u: number, v: number) => Place {
  const [a, b, c, d] = corners;
  const dx1 = b[0] - c[0];
  const dy1 = b[1] - c[1];
  const dx2 = d[0] - c[0];
  const dy2 = d[1] - c[1];
  const sx = a[0] - b[0] + c[0] - d[0];
  const sy = a[1] - b[1] + c[1] - d[1];
  const determinant = dx1 * dy2 - dx2 * dy1;
  const g = (sx * dy2 - dx2 * sy) / determinant;
  const h = (dx1 * sy - sx * dy1) / determinant;
  return (u, v) => {
    const w = g * u + h * v + 1;
    return [
      ((b[0] - a[0] + g * b[0]) * u + (d[0] - a[0] + h * d[0]) * v + a[0]) / w,
      ((b[1] - a[1] + g * b[1]) * u + (d[1] - a[1] + h * d[1]) * v + a[1]) / w,
    ];
  };
}

/** Whether four corners in a row go round a quadrilateral without a dent or a crossing. */
export function isConvex(corners: readonly Place[]): boolean {
  let sign = 0;
  for (let k = 0; k < corners.length; k++) {
    const [a, b, c] = [0, 1, 2].map((step) => corners[(k + step) % corners.length]!);
    const turn = (b![0] - a![0]) * (c![1] - b![1]) - (b![1] - a![1]) * (c![0] - b![0]);
    if (turn === 0 || turn * sign < 0) return false;
    sign = Math.sign(turn);
  }
  return true;
}
