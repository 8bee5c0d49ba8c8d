import { checkIncidence } from './fresnel.ts';
import { foldSides } from './sides.ts';
import type { FilmStack, Polarisation } from './types.ts';

/** What a reflectance table is made for. Thicknesses step evenly; wavelengths may be any. */
export interface TableAxes {
  readonly thicknessNm: Float64Array;
  readonly wavelengthNm: Float64Array;
  readonly incidenceRad: number;
  readonly polarisation: Polarisation;
}

/** Exact sines and cosines are taken anew after this many steps, so rounding stays near 1e-14. */
const ANCHOR = 64;

/**
 * Reflectance of a film stack, thickness-major: out[j * wavelengths + i]. Equal to `filmReflectance` to 1e-12.
 *
 * Between thicknesses only a phase turns, so each step is one complex multiplication and no sine is taken.
 * @param out reused when given; must hold thicknesses x wavelengths
 * @throws RangeError for an angle outside 0..89.9 degrees, or thicknesses that do not step evenly
 */
export function reflectanceTable(stack: FilmStack, axes: TableAxes, out?: Float64Array): Float64Array {
  checkIncidence(axes.incidenceRad);
  checkEven(axes.thicknessNm);
  const table = out ?? new Float64Array(axes.thicknessNm.length * axes.wavelengthNm.length);
  if (axes.polarisation === 'unpolarised') {
    fill(stack, axes, 's', table, 0.5, false);
    fill(stack, axes, 'p', table, 0.5, true);
  } else {
    fill(stack, axes, axes.polarisation, table, 1, false);
  }
  return table;
}

function checkEven(thicknessNm: Float64Array): void {
  const step = thicknessNm.length > 1 ? thicknessNm[1]! - thicknessNm[0]! : 0;
  for (let j = 1; j < thicknessNm.length; j++) {
    if (Math.abs(thicknessNm[j]! - thicknessNm[0]! - j * step) > 1e-9 * (1 + Math.abs(thicknessNm[j]!))) {
      throw new RangeError('Thicknesses of a reflectance table must step evenly.');
    }
  }
}

function fill(
  stack: FilmStack,
  axes: TableAxes,
  polarisation: 's' | 'p',
  table: Float64Array,
  scale: number,
  accumulate: boolean,
): void {
  const { thicknessNm, wavelengthNm } = axes;
  const count = wavelengthNm.length;
  // r = (top + whole z) / (1 - under z), whole = through - top under, z turning with thickness.
  const c = new Float64Array(14 * count);
  const step = thicknessNm.length > 1 ? thicknessNm[1]! - thicknessNm[0]! : 0;
  for (let i = 0; i < count; i++) {
    const s = foldSides(stack, wavelengthNm[i]!, axes.incidenceRad, polarisation);
    const at = 14 * i;
    c[at] = s.top.re;
    c[at + 1] = s.top.im;
    c[at + 2] = s.through.re - (s.top.re * s.under.re - s.top.im * s.under.im);
    c[at + 3] = s.through.im - (s.top.re * s.under.im + s.top.im * s.under.re);
    c[at + 4] = s.under.re;
    c[at + 5] = s.under.im;
    c[at + 6] = s.bottom.re;
    c[at + 7] = s.bottom.im;
    c[at + 8] = s.doublePassPerNm.re;
    c[at + 9] = s.doublePassPerNm.im;
    const damping = Math.exp(-s.doublePassPerNm.im * step);
    c[at + 10] = damping * Math.cos(s.doublePassPerNm.re * step);
    c[at + 11] = damping * Math.sin(s.doublePassPerNm.re * step);
  }
  for (let j = 0; j < thicknessNm.length; j++) {
    if (j % ANCHOR === 0) anchor(c, count, thicknessNm[j]!);
    const row = j * count;
    for (let i = 0; i < count; i++) {
      const at = 14 * i;
      const zr = c[at + 12]!;
      const zi = c[at + 13]!;
      const nr = c[at]! + c[at + 2]! * zr - c[at + 3]! * zi;
      const ni = c[at + 1]! + c[at + 2]! * zi + c[at + 3]! * zr;
      const dr = 1 - c[at + 4]! * zr + c[at + 5]! * zi;
      const di = -c[at + 4]! * zi - c[at + 5]! * zr;
      const value = (scale * (nr * nr + ni * ni)) / (dr * dr + di * di);
      table[row + i] = accumulate ? table[row + i]! + value : value;
      const qr = c[at + 10]!;
      const qi = c[at + 11]!;
      c[at + 12] = zr * qr - zi * qi;
      c[at + 13] = zr * qi + zi * qr;
    }
  }
}

/** Sets z = bottom exp(i doublePass d) exactly. */
function anchor(c: Float64Array, count: number, thicknessNm: number): void {
  for (let i = 0; i < count; i++) {
    const at = 14 * i;
    const damping = Math.exp(-c[at + 9]! * thicknessNm);
    const cos = damping * Math.cos(c[at + 8]! * thicknessNm);
    const sin = damping * Math.sin(c[at + 8]! * thicknessNm);
    c[at + 12] = c[at + 6]! * cos - c[at + 7]! * sin;
    c[at + 13] = c[at + 6]! * sin + c[at + 7]! * cos;
  }
}
