/** 3 x 3 matrices, row-major, and the Bradford change of white that ICC profiles are made with. */
export type Matrix3 = Float64Array;
export type Triple = readonly [number, number, number];

/** The white of the ICC profile connection space as its header states it (ICC.1:2022, 7.2.16). */
export const PCS_WHITE: Triple = [0.9642, 1, 0.8249];

/** Bradford cone responses (Lam 1985; ICC.1:2022, annex E.3). */
const BRADFORD = Float64Array.of(0.8951, 0.2664, -0.1614, -0.7502, 1.7135, 0.0367, 0.0389, -0.0685, 1.0296);

export function multiply(a: Matrix3, b: Matrix3): Matrix3 {
  const out = new Float64Array(9);
  for (let row = 0; row < 3; row++)
    for (let column = 0; column < 3; column++)
      out[row * 3 + column] =
        a[row * 3]! * b[column]! + a[row * 3 + 1]! * b[3 + column]! + a[row * 3 + 2]! * b[6 + column]!;
  return out;
}

export function apply(m: Matrix3, [x, y, z]: Triple): Triple {
  return [
    m[0]! * x + m[1]! * y + m[2]! * z,
    m[3]! * x + m[4]! * y + m[5]! * z,
    m[6]! * x + m[7]! * y + m[8]! * z,
  ];
}

/** Inverse by cofactors, or undefined where the matrix has none to speak of. */
export function invert(m: Matrix3): Matrix3 | undefined {
  const [a, b, c, d, e, f, g, h, i] = m as unknown as [
    ...Triple,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const determinant = a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
  if (!(Math.abs(determinant) > 1e-6)) return undefined;
  return Float64Array.of(
    e * i - f * h,
    c * h - b * i,
    b * f - c * e,
    f * g - d * i,
    a * i - c * g,
    c * d - a * f,
    d * h - e * g,
    b * g - a * h,
    a * e - b * d,
  ).map((cofactor) => cofactor / determinant);
}

/** The matrix that takes colours seen under `from` to colours seen under `to`. */
export function bradford(from: Triple, to: Triple): Matrix3 {
  const source = apply(BRADFORD, from);
  const target = apply(BRADFORD, to);
  const gains = Float64Array.of(
    target[0] / source[0],
    0,
    0,
    0,
    target[1] / source[1],
    0,
    0,
    0,
    target[2] / source[2],
  );
  return multiply(invert(BRADFORD)!, multiply(gains, BRADFORD));
}

/** XYZ of a chromaticity at Y = 1. */
export const whiteOf = (x: number, y: number): Triple => [x / y, 1, (1 - x - y) / y];

/** Linear RGB to XYZ from the primaries' and the white's chromaticities (SMPTE RP 177-1993, 3.3). */
export function primariesToXyz(
  primaries: readonly [number, number, number, number, number, number],
  white: Triple,
): Matrix3 | undefined {
  const [rx, ry, gx, gy, bx, by] = primaries;
  if (!(ry > 0 && gy > 0 && by > 0)) return undefined;
  const [r, g, b] = [whiteOf(rx, ry), whiteOf(gx, gy), whiteOf(bx, by)];
  const unscaled = Float64Array.of(r[0], g[0], b[0], r[1], g[1], b[1], r[2], g[2], b[2]);
  const inverse = invert(unscaled);
  if (!inverse) return undefined;
  const scale = apply(inverse, white);
  return unscaled.map((value, index) => value * scale[index % 3]!);
}
