import type { Random } from './random.ts';

/**
 * Smooth random reflectance spectra for the in-camera colour matrix: `count` rows of `wavelengthNm.length` values within
 * 0.02..0.98. Steps and humps as dyes, leaves, soils and skins have (sums of logistic edges and bells 25 to 90 nm wide).
 *
 * Deliberately another recipe than the reader's own set in `src/colour/`: a real camera's matrix was fitted on colours
 * that the reader does not know.
 */
export function randomReflectances(wavelengthNm: Float64Array, count: number, random: Random): Float64Array {
  const n = wavelengthNm.length;
  const spectra = new Float64Array(count * n);
  for (let row = 0; row < count; row++) {
    const floor = random.uniform(0.02, 0.35);
    const parts = Array.from({ length: 1 + Math.floor(3 * random.next()) }, () => ({
      edge: random.next() < 0.5,
      centreNm: random.uniform(410, 690),
      widthNm: random.uniform(25, 90),
      sign: random.next() < 0.7 ? 1 : -1,
      size: random.uniform(0.1, 0.6),
      rising: random.next() < 0.65,
    }));
    for (let i = 0; i < n; i++) {
      let value = floor;
      for (const part of parts) {
        const z = (wavelengthNm[i]! - part.centreNm) / part.widthNm;
        value += part.edge
          ? part.size / (1 + Math.exp(part.rising ? -4 * z : 4 * z))
          : part.sign * part.size * Math.exp(-0.5 * z * z);
      }
      spectra[row * n + i] = Math.min(0.98, Math.max(0.02, value));
    }
  }
  return spectra;
}
