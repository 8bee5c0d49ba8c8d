import type { Random } from './random.ts';

function bell(nm: number, peak: number, left: number, right: number): number {
  const z = (nm - peak) / (nm < peak ? left : right);
  return Math.exp(-0.5 * z * z);
}

/**
 * A plausible phone sensor that is not in the family: lopsided bells peaking near 600, 535 and 460 nm, leaks between
 * channels, an infrared filter that cuts from about 655 nm. Row-major 3 x n, each of unit sum. Shapes made up here, after
 * how such curves generally look; they follow no measured camera.
 */
export function outsideSensorCurves(wavelengthNm: Float64Array, random: Random): Float64Array {
  const n = wavelengthNm.length;
  const red = { peak: random.uniform(592, 608), left: random.uniform(22, 32), right: random.uniform(34, 48) };
  const green = {
    peak: random.uniform(528, 541),
    left: random.uniform(30, 40),
    right: random.uniform(34, 44),
  };
  const blue = {
    peak: random.uniform(453, 467),
    left: random.uniform(20, 28),
    right: random.uniform(26, 38),
  };
  const leak = Array.from({ length: 4 }, () => random.uniform(0.01, 0.07));
  const cut = { at: random.uniform(645, 668), width: random.uniform(5, 11) };
  const curves = new Float64Array(3 * n);
  for (let i = 0; i < n; i++) {
    const nm = wavelengthNm[i]!;
    const pass = 1 / (1 + Math.exp((nm - cut.at) / cut.width)) / (1 + Math.exp((408 - nm) / 6));
    const r = bell(nm, red.peak, red.left, red.right);
    const g = bell(nm, green.peak, green.left, green.right);
    const b = bell(nm, blue.peak, blue.left, blue.right);
    curves[i] = pass * (r + leak[0]! * g + leak[1]! * b);
    curves[n + i] = pass * (g + leak[2]! * b + leak[3]! * r);
    curves[2 * n + i] = pass * (b + leak[2]! * g + 0.3 * leak[1]! * r);
  }
  for (let c = 0; c < 3; c++) {
    let sum = 0;
    for (let i = 0; i < n; i++) {
      sum += curves[c * n + i]!;
    }
    for (let i = 0; i < n; i++) {
      curves[c * n + i]! /= sum;
    }
  }
  return curves;
}
