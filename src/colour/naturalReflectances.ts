/**
 * Smooth reflectance spectra of the shapes that soils, leaves, skin, petals and paints have in the visible: a rising or
 * falling logistic edge between a dark and a bright level, with one broad Gaussian band added or taken away. Of our own
 * making, with parameters on a low-discrepancy sequence, since no measured set is bundled; no row is a model of one
 * particular surface. An image processor's colour matrix is fitted to surfaces like these.
 *
 * Checked on the 24 measured patches of a chart (tests/reference/colour-camera.test.ts): the matrix that this set gives
 * comes close to the best one for those patches. A set sorted into foliage, soil, skin, petals, sky and paint came
 * no closer.
 * @returns one row of `wavelengthNm.length` samples each, all within 0.01..0.95
 */
export function naturalReflectances(wavelengthNm: Float64Array, count = 96): Float64Array[] {
  return Array.from({ length: count }, (_, k) => {
    const u = (base: number) => radicalInverse(k + 1, base);
    const low = 0.02 + 0.18 * u(2);
    const high = low + 0.15 + 0.6 * u(3);
    const edge = 400 + 320 * u(5);
    const width = 12 + 45 * u(7);
    const falling = u(11) < 0.3;
    const band = 420 + 260 * u(13);
    const bandWidth = 20 + 60 * u(17);
    const bandHeight = (u(19) < 0.5 ? 1 : -0.6) * 0.35 * u(23);
    return wavelengthNm.map((l) => {
      const step = 1 / (1 + Math.exp((falling ? 1 : -1) * ((l - edge) / width)));
      const bump = bandHeight * Math.exp(-0.5 * ((l - band) / bandWidth) ** 2);
      return Math.min(0.95, Math.max(0.01, low + (high - low) * step + bump));
    });
  });
}

/** Van der Corput's sequence (Halton 1960): the digits of k in a base, mirrored behind the point. */
function radicalInverse(k: number, base: number): number {
  let value = 0;
  let place = 1 / base;
  for (let rest = k; rest > 0; rest = Math.floor(rest / base)) {
    value += (rest % base) * place;
    place /= base;
  }
  return value;
}
