import { MAX_INCIDENCE_RAD } from './fresnel.ts';
import { reflectanceTable, type TableAxes } from './reflectanceTable.ts';
import type { Blur, FilmStack } from './types.ts';

/** No blur: one angle, one thickness a pixel. */
export const SHARP: Blur = { incidence: null, relativeThicknessSpread: 0 };

/** Five-point Gauss-Hermite rule for a standard normal: exact for polynomials up to degree 9 (Abramowitz & Stegun 25.4.46). */
const HERMITE: readonly (readonly [number, number])[] = [
  [-2.856970013872806, 0.011257411327720691],
  [-1.355626179974266, 0.2220759220056126],
  [0, 0.5333333333333333],
  [1.355626179974266, 0.2220759220056126],
  [2.856970013872806, 0.011257411327720691],
];
/** Phase spread (rad) that five nodes resolve; wider spreads go by the trapezium rule. */
const RESOLVED_PHASE = 1;

/**
 * Reflectance averaged over what one pixel holds: angles first, then a Gaussian spread of thickness of
 * `relativeThicknessSpread` times the thickness. The average is of reflectance, before any colour is made.
 *
 * The thickness average is taken by Gauss-Hermite nodes of the exact reflectance at scaled thicknesses, as many as
 * the widest phase spread needs, so that it is right near zero thickness and for absorbing films too.
 */
export function blurredReflectanceTable(
  stack: FilmStack,
  axes: TableAxes,
  blur: Blur,
  out?: Float64Array,
): Float64Array {
  const size = axes.thicknessNm.length * axes.wavelengthNm.length;
  if (blur.relativeThicknessSpread === 0 && blur.incidence === null)
    return reflectanceTable(stack, axes, out);
  const table = (out ?? new Float64Array(size)).fill(0);
  const part = new Float64Array(size);
  const angles = blur.incidence?.angleRad ?? Float64Array.of(axes.incidenceRad);
  const weights = blur.incidence?.weight ?? Float64Array.of(1);
  for (const [factor, share] of thicknessNodes(stack, axes, blur.relativeThicknessSpread)) {
    const thicknessNm = axes.thicknessNm.map((d) => d * factor);
    for (let k = 0; k < angles.length; k++) {
      reflectanceTable(stack, { ...axes, thicknessNm, incidenceRad: angles[k]! }, part);
      const w = weights[k]! * share;
      for (let i = 0; i < size; i++) table[i]! += w * part[i]!;
    }
  }
  return table;
}

/** Thickness factors and their weights. */
function thicknessNodes(stack: FilmStack, axes: TableAxes, spread: number): (readonly [number, number])[] {
  if (spread === 0) return [[1, 1]];
  if (!(spread > 0 && spread < 0.35)) {
    throw new RangeError('The thickness spread inside a pixel must lie between 0 and 0.35 of the thickness.');
  }
  const thickest = axes.thicknessNm[axes.thicknessNm.length - 1] ?? 0;
  const shortest = axes.wavelengthNm[0] ?? 400;
  const phaseSpread = (spread * 4 * Math.PI * thickest * stack.film.refractiveIndex(shortest)) / shortest;
  if (phaseSpread <= RESOLVED_PHASE) return HERMITE.map(([x, w]) => [1 + spread * x, w] as const);
  // Wide spreads: the trapezium rule over +-4 sd is exponentially accurate for a Gaussian once a step turns the
  // phase by less than about 2 (Trefethen & Weideman 2014).
  const steps = Math.min(401, 2 * Math.ceil((4 * phaseSpread) / 1.5) + 1);
  const nodes: [number, number][] = [];
  let total = 0;
  for (let k = 0; k < steps; k++) {
    const x = -4 + (8 * k) / (steps - 1);
    const factor = 1 + spread * x;
    if (factor < 0) continue;
    const w = Math.exp((-x * x) / 2);
    nodes.push([factor, w]);
    total += w;
  }
  return nodes.map(([factor, w]) => [factor, w / total] as const);
}

/**
 * A small quadrature of incidence angles: Gaussian about a mean, folded at the normal and held below 89.9 degrees.
 * @param nodes odd number of angles
 */
export function incidenceSpread(meanRad: number, sdRad: number, nodes = 7): NonNullable<Blur['incidence']> {
  const angleRad = new Float64Array(nodes);
  const weight = new Float64Array(nodes);
  let total = 0;
  for (let k = 0; k < nodes; k++) {
    const x = nodes === 1 ? 0 : -2.5 + (5 * k) / (nodes - 1);
    angleRad[k] = Math.min(MAX_INCIDENCE_RAD, Math.abs(meanRad + sdRad * x));
    weight[k] = Math.exp((-x * x) / 2);
    total += weight[k]!;
  }
  for (let k = 0; k < nodes; k++) weight[k]! /= total;
  return { angleRad, weight };
}
