import { MAX_INCIDENCE_RAD } from '../optics/fresnel.ts';

/** Raw camera values (white = 1, 1, 1) of a film against its thickness and the angle of incidence, finely tabulated. */
export interface FilmTable {
  readonly stepNm: number;
  /** Thicknesses tabulated: 0, stepNm, ... (count - 1) stepNm. */
  readonly count: number;
  /** Writes the raw values at a thickness (clamped to the table) and an angle; linear in thickness, cubic in angle. */
  readonly lookUp: (thicknessNm: number, angleRad: number, out: Float64Array) => void;
}

export interface FilmTableInput {
  /** Reflectance at one angle, row-major thickness x wavelength, at the thicknesses 0, stepNm, ... */
  readonly reflectanceAt: (angleRad: number) => ArrayLike<number>;
  readonly stepNm: number;
  readonly count: number;
  /** Sensitivity times light, each channel of unit sum; row-major 3 x wavelength. */
  readonly rawWeights: Float64Array;
  /** Angles of incidence that will be asked for, radians. A range narrower than `angleStepRad` makes one table. */
  readonly fromRad: number;
  readonly toRad: number;
  readonly angleStepRad: number;
}

/** Sums reflectance spectra to raw values: rows x 3. */
function sumRows(reflectance: ArrayLike<number>, rows: number, weights: Float64Array): Float64Array {
  const n = weights.length / 3;
  if (reflectance.length !== rows * n) {
    throw new RangeError(
      `A table of ${rows} thicknesses by ${n} wavelengths needs ${rows * n} reflectances.`,
    );
  }
  const raw = new Float64Array(3 * rows);
  for (let row = 0; row < rows; row++) {
    let r = 0;
    let g = 0;
    let b = 0;
    for (let i = 0; i < n; i++) {
      const value = reflectance[row * n + i]!;
      r += value * weights[i]!;
      g += value * weights[n + i]!;
      b += value * weights[2 * n + i]!;
    }
    raw[3 * row] = r;
    raw[3 * row + 1] = g;
    raw[3 * row + 2] = b;
  }
  return raw;
}

/**
 * Builds the table. Interpolation error, checked in the tests: below 1e-4 of the brightest film at 0.5 nm and 1 degree.
 * Angles outside the range are clamped to it.
 */
export function buildFilmTable(input: FilmTableInput): FilmTable {
  const { stepNm, count, fromRad, toRad, angleStepRad } = input;
  const single = toRad - fromRad < 1e-6;
  // One angle more on each side, so that the cubic has its four points (below normal incidence by symmetry).
  const angleCount = single ? 1 : Math.ceil((toRad - fromRad) / angleStepRad) + 3;
  const firstRad = single ? fromRad : fromRad - angleStepRad;
  const sheets = Array.from({ length: angleCount }, (_, i) => {
    const angle = Math.min(MAX_INCIDENCE_RAD, Math.abs(firstRad + i * angleStepRad));
    return sumRows(input.reflectanceAt(angle), count, input.rawWeights);
  });

  const last = count - 1;
  return {
    stepNm,
    count,
    lookUp(thicknessNm, angleRad, out) {
      const place = Math.min(last, Math.max(0, thicknessNm / stepNm));
      const below = Math.min(last - 1, Math.floor(place));
      const part = place - below;
      const at = 3 * below;
      if (single) {
        const sheet = sheets[0]!;
        for (let c = 0; c < 3; c++) {
          out[c] = sheet[at + c]! * (1 - part) + sheet[at + 3 + c]! * part;
        }
        return;
      }
      const a = Math.min(angleCount - 2.000001, Math.max(1, (angleRad - firstRad) / angleStepRad));
      const j = Math.floor(a);
      const t = a - j;
      // Catmull-Rom weights of the four neighbouring angles.
      const w0 = 0.5 * t * (t * (2 - t) - 1);
      const w1 = 0.5 * (t * t * (3 * t - 5) + 2);
      const w2 = 0.5 * t * (t * (4 - 3 * t) + 1);
      const w3 = 0.5 * t * t * (t - 1);
      const s0 = sheets[j - 1]!;
      const s1 = sheets[j]!;
      const s2 = sheets[j + 1]!;
      const s3 = sheets[j + 2]!;
      for (let c = 0; c < 3; c++) {
        const k = at + c;
        const low = w0 * s0[k]! + w1 * s1[k]! + w2 * s2[k]! + w3 * s3[k]!;
        const high = w0 * s0[k + 3]! + w1 * s1[k + 3]! + w2 * s2[k + 3]! + w3 * s3[k + 3]!;
        out[c] = low * (1 - part) + high * part;
      }
    },
  };
}
