const LINEAR_BELOW = 216 / 24389;

function lightness(t: number): number {
  return t > LINEAR_BELOW ? Math.cbrt(t) : ((24389 / 27) * t + 16) / 116;
}

/**
 * CIELAB of XYZ triples for a white. CIE 15:2018, section 8.2.1 (ISO/CIE 11664-4).
 * @param xyz 3 a colour, in the units of `white`
 * @param out reused when given; must hold as many values
 * @returns L*, a*, b* a colour
 */
export function labFromXyz(
  xyz: ArrayLike<number>,
  white: ArrayLike<number>,
  out?: Float64Array,
): Float64Array {
  const lab = out ?? new Float64Array(xyz.length);
  for (let i = 0; i < xyz.length; i += 3) {
    const fx = lightness(xyz[i]! / white[0]!);
    const fy = lightness(xyz[i + 1]! / white[1]!);
    const fz = lightness(xyz[i + 2]! / white[2]!);
    lab[i] = 116 * fy - 16;
    lab[i + 1] = 500 * (fx - fy);
    lab[i + 2] = 200 * (fy - fz);
  }
  return lab;
}
