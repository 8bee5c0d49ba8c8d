/** XYZ (D65, Y = 1) to cone-like responses, and those (cube roots) to OKLab, row-major. CSS Color 4, section 18. */
const TO_CONES = [
  0.819022437996703, 0.3619062600528904, -0.1288737815209879, 0.0329836539323885, 0.9292868615863434,
  0.0361446663506424, 0.0481771893596242, 0.2642395317527308, 0.6335478284694309,
] as const;
const TO_OKLAB = [
  0.210454268309314, 0.7936177747023054, -0.0040720430116193, 1.9779985324311684, -2.4285922420485799,
  0.450593709617411, 0.0259040424655478, 0.7827717124575296, -0.8086757549230774,
] as const;

/**
 * OKLab of XYZ triples for the white D65 of sRGB, (0.3127, 0.3290). B. Ottosson 2020, in the matrices that CSS Color 4
 * recomputed so that this white comes out as (1, 0, 0).
 * @param xyz 3 a colour, Y = 1 for white
 * @param out reused when given; must hold as many values
 * @returns L, a, b a colour; L = 1 for white
 */
export function oklabFromXyz(xyz: ArrayLike<number>, out?: Float64Array): Float64Array {
  const [m0, m1, m2, m3, m4, m5, m6, m7, m8] = TO_CONES;
  const [n0, n1, n2, n3, n4, n5, n6, n7, n8] = TO_OKLAB;
  const lab = out ?? new Float64Array(xyz.length);
  for (let i = 0; i < xyz.length; i += 3) {
    const x = xyz[i]!;
    const y = xyz[i + 1]!;
    const z = xyz[i + 2]!;
    const l = Math.cbrt(m0 * x + m1 * y + m2 * z);
    const m = Math.cbrt(m3 * x + m4 * y + m5 * z);
    const s = Math.cbrt(m6 * x + m7 * y + m8 * z);
    lab[i] = n0 * l + n1 * m + n2 * s;
    lab[i + 1] = n3 * l + n4 * m + n5 * s;
    lab[i + 2] = n6 * l + n7 * m + n8 * s;
  }
  return lab;
}
