import { orderOf } from '../chart/orders.ts';
import { buildCodeCharts, type ThicknessScale } from '../match/buildCodeChart.ts';
import type { CameraModel } from '../match/cameraModel.ts';
import type { CodeChart } from '../match/codeChart.ts';
import { type FilmScene, pathRatio } from '../match/filmBasis.ts';
import type { CameraFit } from '../match/fitCamera.ts';
import { AT } from '../match/parameters.ts';

/** What a chart colour may be off in calm, changing and lively surroundings, codes of 255: luma, chroma. */
const CHART_ERRORS = [
  { luma: 1.2, chroma: 1.2 },
  { luma: 1.5, chroma: 2 },
  { luma: 3, chroma: 5 },
] as const;
/**
 * Relative scale error left by cameras that are not of the family: 0.3 % is 1.7 nm in the place of a sensor's peak.
 * Set on seeded scenes with sensors outside the family.
 */
export const OUTSIDE_FAMILY = 0.003;

/** One chart for each activity class, at a fitted camera. */
export function drawCharts(
  model: CameraModel,
  fit: CameraFit,
  scene: FilmScene,
  noise: Float64Array,
  nominalOrdersNm: readonly number[],
  angleSd: { readonly relative: number; readonly brightness: number },
): CodeChart[] {
  const scale = scaleOf(scene, fit, Math.hypot(OUTSIDE_FAMILY, angleSd.relative));
  const boundaries = nominalOrdersNm.map((d) => d * scale.factor);
  const codes = [noise[0]!, noise[1]!, noise[2]!] as const;
  const noises = CHART_ERRORS.map((error) => ({ codes, ...error, brightness: angleSd.brightness }));
  return buildCodeCharts(model, fit, noises, scale, (d) => orderOf(d, boundaries));
}

/** Thickness by nominal thickness at a fitted camera, and how that moves with the index. */
export function scaleOf(scene: FilmScene, fit: CameraFit, relativeSd: number): ThicknessScale {
  const shift = fit.parameters[AT.index]!;
  const perIndex = -1 / (scene.stack.film.refractiveIndex(550) + shift);
  return { factor: pathRatio(scene, shift), perIndex, relativeSd };
}
