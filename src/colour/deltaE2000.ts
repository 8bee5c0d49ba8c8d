const DEGREE = Math.PI / 180;
const POWER = 25 ** 7;

/**
 * CIEDE2000 difference of colour i of `a` and colour j of `b` (CIELAB triples), kL = kC = kH = 1.
 * ISO/CIE 11664-6; in the form of Sharma, Wu, Dalal 2005, equations 2 to 22.
 */
export function deltaE2000(a: ArrayLike<number>, i: number, b: ArrayLike<number>, j: number): number {
  const L1 = a[3 * i]!;
  const L2 = b[3 * j]!;
  const b1 = a[3 * i + 2]!;
  const b2 = b[3 * j + 2]!;
  const c7 = seventhPower((length(a[3 * i + 1]!, b1) + length(b[3 * j + 1]!, b2)) / 2);
  const g = 0.5 * (1 - Math.sqrt(c7 / (c7 + POWER)));
  const a1 = (1 + g) * a[3 * i + 1]!;
  const a2 = (1 + g) * b[3 * j + 1]!;
  const C1 = length(a1, b1);
  const C2 = length(a2, b2);
  const h1 = hue(b1, a1);
  const h2 = hue(b2, a2);
  const dL = L2 - L1;
  const dC = C2 - C1;
  let turn = 0;
  let mean = h1 + h2;
  if (C1 * C2 !== 0) {
    turn = h2 - h1;
    if (turn > 180) turn -= 360;
    else if (turn < -180) turn += 360;
    if (Math.abs(h1 - h2) <= 180) mean = (h1 + h2) / 2;
    else mean = h1 + h2 < 360 ? (h1 + h2 + 360) / 2 : (h1 + h2 - 360) / 2;
  }
  const dH = 2 * Math.sqrt(C1 * C2) * Math.sin((turn / 2) * DEGREE);
  const Lm = (L1 + L2) / 2;
  const Cm = (C1 + C2) / 2;
  const T =
    1 -
    0.17 * Math.cos((mean - 30) * DEGREE) +
    0.24 * Math.cos(2 * mean * DEGREE) +
    0.32 * Math.cos((3 * mean + 6) * DEGREE) -
    0.2 * Math.cos((4 * mean - 63) * DEGREE);
  const offset = (Lm - 50) ** 2;
  const sL = 1 + (0.015 * offset) / Math.sqrt(20 + offset);
  const sC = 1 + 0.045 * Cm;
  const sH = 1 + 0.015 * Cm * T;
  const m7 = seventhPower(Cm);
  const rotation =
    -Math.sin(60 * Math.exp(-(((mean - 275) / 25) ** 2)) * DEGREE) * 2 * Math.sqrt(m7 / (m7 + POWER));
  const l = dL / sL;
  const c = dC / sC;
  const h = dH / sH;
  return Math.sqrt(Math.max(0, l * l + c * c + h * h + rotation * c * h));
}

/** Several times as fast as Math.hypot, which guards against overflow that no colour reaches. */
function length(a: number, b: number): number {
  return Math.sqrt(a * a + b * b);
}

/** As products: a general power is slower. */
function seventhPower(c: number): number {
  const square = c * c;
  return square * square * square * c;
}

function hue(b: number, a: number): number {
  if (a === 0 && b === 0) return 0;
  const h = Math.atan2(b, a) / DEGREE;
  return h < 0 ? h + 360 : h;
}
