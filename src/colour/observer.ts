import { CIE_1931_X, CIE_1931_Y, CIE_1931_Z } from './data/cie1931.ts';
import { CIE_1964_X, CIE_1964_Y, CIE_1964_Z } from './data/cie1964.ts';
import { lightSpectrum } from './light.ts';
import { sampleAt } from './sampled.ts';
import type { ChannelWeights, Light } from './types.ts';

export type ObserverId = 'cie1931' | 'cie1964';

const TABLES = {
  cie1931: [CIE_1931_X, CIE_1931_Y, CIE_1931_Z],
  cie1964: [CIE_1964_X, CIE_1964_Y, CIE_1964_Z],
} as const;

/** Colour-matching functions at the wavelengths given, row-major 3 x n. */
export function colourMatchingFunctions(observer: ObserverId, wavelengthNm: Float64Array): Float64Array {
  const out = new Float64Array(3 * wavelengthNm.length);
  TABLES[observer].forEach((values, c) => {
    out.set(sampleAt({ startNm: 360, stepNm: 1, values }, wavelengthNm), c * wavelengthNm.length);
  });
  return out;
}

/**
 * Weights that turn a reflectance spectrum into XYZ with Y = 1 for a perfect reflector. CIE 15:2018, section 7.1.
 */
export function observerWeights(
  observer: ObserverId,
  light: Light,
  wavelengthNm: Float64Array,
): ChannelWeights {
  const n = wavelengthNm.length;
  const power = lightSpectrum(light, wavelengthNm);
  const weights = colourMatchingFunctions(observer, wavelengthNm);
  let luminous = 0;
  for (let i = 0; i < n; i++) luminous += weights[n + i]! * power[i]!;
  for (let c = 0; c < 3; c++) for (let i = 0; i < n; i++) weights[c * n + i]! *= power[i]! / luminous;
  return { wavelengthNm, weights };
}

/** XYZ of the light itself (a perfect reflector under it), Y = 1. */
export function whiteOf(
  observer: ObserverId,
  light: Light,
  wavelengthNm: Float64Array,
): [number, number, number] {
  const { weights } = observerWeights(observer, light, wavelengthNm);
  const n = wavelengthNm.length;
  const sums: [number, number, number] = [0, 0, 0];
  for (let c = 0; c < 3; c++) for (let i = 0; i < n; i++) sums[c]! += weights[c * n + i]!;
  return sums;
}
