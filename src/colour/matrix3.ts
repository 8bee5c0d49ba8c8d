/** Row-major 3 x 3 matrices in Float64Array(9). */
export type Matrix3 = Float64Array;
export type Triple = readonly [number, number, number];

export function multiply3(a: ArrayLike<number>, b: ArrayLike<number>): Matrix3 {
  const out = new Float64Array(9);
  for (let r = 0; r < 3; r++) {
    for (let c = 0; c < 3; c++) {
      out[3 * r + c] = a[3 * r]! * b[c]! + a[3 * r + 1]! * b[3 + c]! + a[3 * r + 2]! * b[6 + c]!;
    }
  }
  return out;
}

export function apply3(m: ArrayLike<number>, v: ArrayLike<number>): [number, number, number] {
  return [
    m[0]! * v[0]! + m[1]! * v[1]! + m[2]! * v[2]!,
    m[3]! * v[0]! + m[4]! * v[1]! + m[5]! * v[2]!,
    m[6]! * v[0]! + m[7]! * v[1]! + m[8]! * v[2]!,
  ];
}

/** @throws RangeError when the matrix is singular */
export function invert3(m: ArrayLike<number>): Matrix3 {
  const [a, b, c, d, e, f, g, h, i] = [m[0]!, m[1]!, m[2]!, m[3]!, m[4]!, m[5]!, m[6]!, m[7]!, m[8]!];
  const [A, B, C] = [e * i - f * h, f * g - d * i, d * h - e * g];
  const determinant = a * A + b * B + c * C;
  if (determinant === 0) throw new RangeError('A colour matrix cannot be inverted.');
  return Float64Array.of(
    A,
    c * h - b * i,
    b * f - c * e,
    B,
    a * i - c * g,
    c * d - a * f,
    C,
    b * g - a * h,
    a * e - b * d,
  ).map((v) => v / determinant);
}

const BRADFORD = Float64Array.of(0.8951, 0.2664, -0.1614, -0.7502, 1.7135, 0.0367, 0.0389, -0.0685, 1.0296);

/** Linear Bradford adaptation from one white to another (XYZ). ICC.1:2022 annex E. */
export function bradford(from: Triple, to: Triple): Matrix3 {
  const source = apply3(BRADFORD, from);
  const target = apply3(BRADFORD, to);
  const scaled = BRADFORD.map((v, k) => (v * target[Math.floor(k / 3)]!) / source[Math.floor(k / 3)]!);
  return multiply3(invert3(BRADFORD), scaled);
}
