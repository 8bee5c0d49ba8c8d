/** Evenly sampled figures of a standard, read between their nodes by straight lines (the CIE's rule). */
export interface Sampled {
  readonly startNm: number;
  readonly stepNm: number;
  readonly values: ArrayLike<number>;
}

/**
 * Values at any wavelengths; zero outside the range of the figures.
 * @param wavelengthNm wavelengths in nm, any order
 */
export function sampleAt(figures: Sampled, wavelengthNm: Float64Array): Float64Array {
  const { startNm, stepNm, values } = figures;
  const last = values.length - 1;
  return wavelengthNm.map((l) => {
    const place = (l - startNm) / stepNm;
    if (place < 0 || place > last) return 0;
    const i = Math.min(last - 1, Math.floor(place));
    const part = place - i;
    return values[i]! * (1 - part) + values[i + 1]! * part;
  });
}

/** Even wavelengths from `startNm` to `endNm`, both included. */
export function wavelengths(startNm: number, endNm: number, stepNm: number): Float64Array {
  return Float64Array.from(
    { length: Math.round((endNm - startNm) / stepNm) + 1 },
    (_, i) => startNm + i * stepNm,
  );
}

/** The grid of all film sums: 1 nm, because the fringes of thick films are narrow. 401 samples. */
export const FILM_WAVELENGTHS_NM = wavelengths(380, 780, 1);
