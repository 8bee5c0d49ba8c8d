import type { Random } from './random.ts';

/** Cosines a spectrum is made of, and one standard deviation of each one's amplitude (logits). */
const AMPLITUDES = [1.1, 1.3, 0.9, 0.55, 0.3, 0.15];

/**
 * Smooth random reflectance spectra for the in-camera colour matrix: `count` rows of `wavelengthNm.length` values in
 * 0..1. A few cosines over the visible range with random amplitudes, squeezed by the logistic function.
 *
 * Deliberately another recipe than the reader's own set in `src/colour/`: a real camera's matrix was fitted on colours
 * that the reader does not know.
 */
export function randomReflectances(wavelengthNm: Float64Array, count: number, random: Random): Float64Array {
  const n = wavelengthNm.length;
  const spectra = new Float64Array(count * n);
  for (let row = 0; row < count; row++) {
    const amplitude = AMPLITUDES.map((sd, order) => sd * random.normal() - (order === 0 ? 0.8 : 0));
    for (let i = 0; i < n; i++) {
      const turn = (Math.PI * (wavelengthNm[i]! - 380)) / 400;
      let logit = 0;
      for (let order = 0; order < amplitude.length; order++) {
        logit += amplitude[order]! * Math.cos(order * turn);
      }
      spectra[row * n + i] = 1 / (1 + Math.exp(-logit));
    }
  }
  return spectra;
}
