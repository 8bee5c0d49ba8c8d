/** A homogeneous medium. Indices are relative to vacuum; `extinction` is k >= 0 in n + ik. */
export interface Material {
  readonly id: string;
  /** Plain English, as shown to a person. */
  readonly name: string;
  /** Who measured or published the formula, and its reference; "from memory" where it is. */
  readonly source: string;
  /** Wavelengths the source covers, in nanometres. Outside it the formula is extrapolated. */
  readonly rangeNm: readonly [number, number];
  /** One standard deviation of the index, common to all wavelengths: what the name alone does not tell. */
  readonly indexSpread: number;
  readonly refractiveIndex: (wavelengthNm: number) => number;
  readonly extinction: (wavelengthNm: number) => number;
}

/** A layer whose thickness is known (a coating, say). */
export interface FixedLayer {
  readonly material: Material;
  readonly thicknessNm: number;
}

/** Light comes from `ambient`; `film` is the layer whose thickness is asked for. */
export interface FilmStack {
  readonly ambient: Material;
  /** Known layers between ambient and film, outermost first. Mostly empty. */
  readonly above: readonly FixedLayer[];
  readonly film: Material;
  /** Known layers between film and substrate, outermost first. Mostly empty. */
  readonly below: readonly FixedLayer[];
  readonly substrate: Material;
}

export type Polarisation = 'unpolarised' | 's' | 'p';

/** What happens inside one pixel: reflectance is averaged over it, before any colour is made. */
export interface Blur {
  /** Incidence angles in radians with weights that sum to one; null means the single nominal angle. */
  readonly incidence: { readonly angleRad: Float64Array; readonly weight: Float64Array } | null;
  /** One standard deviation of thickness inside a pixel as a share of the thickness (0.05 = 5 %). */
  readonly relativeThicknessSpread: number;
}
